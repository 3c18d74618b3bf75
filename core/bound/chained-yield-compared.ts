import { betaOdds } from '../numerics/beta-quantile.ts';
import type { Fraction, Tail } from '../units.ts';
import { requireStations, type StationCount } from './chained-yield.ts';
import { yieldLower } from './yield.ts';

/*
 * The two older bounds on a chain's yield, kept for comparison with `chainedYieldLower`, which is
 * never wider than the first and far less wide than the second.
 */

/**
 * Lindstrom-Madden lower bound: the chain as one station with the fewest units and the combined loss.
 *
 * @returns in [0, 1)
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage measured at 0.965 or more for 95 % (methods), not proved; one look fixed in advance
 * @source H. L. Lindstrom, J. H. Madden (formula from memory)
 */
export function lindstromMaddenLower(stations: readonly StationCount[], tail: Tail): Fraction {
  requireStations(stations, tail);
  const fewest = Math.min(...stations.map(({ inspected }) => inspected));
  const passed = stations.reduce((product, { nonconforming, inspected }) => product * (1 - nonconforming / inspected), 1);
  if (passed === 0) return 0 as Fraction;
  const odds = betaOdds(fewest * passed, fewest * (1 - passed) + 1, tail);
  return (1 / (1 + 1 / odds)) as Fraction;
}

/**
 * Product of exact bounds, each at the level that makes all of them hold together.
 *
 * @returns in [0, 1)
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage never below 1 - tail for independent stations, mostly far above; one look fixed in advance
 * @source Z. Sidak 1967 (memory)
 */
export function sidakYieldLower(stations: readonly StationCount[], tail: Tail): Fraction {
  requireStations(stations, tail);
  const alpha: number = tail;
  const each = -Math.expm1(Math.log1p(-alpha) / stations.length) as Tail;
  return stations.reduce((product, { nonconforming, inspected }) => product * yieldLower(nonconforming, inspected, each), 1) as Fraction;
}
