import { noncentralTQuantileOfTail } from '../numerics/noncentral-t-root.ts';
import { normalQuantileOfTail } from '../numerics/normal.ts';
import type { Tail } from '../units.ts';
import { demonstratedCount, demonstrationUnits } from './critical-count.ts';
import { mostMeasurements } from './mean.ts';
import { requireInside, requireWhole } from './out-of-domain.ts';
import { tailOfConfidence } from './tail-of.ts';

/**
 * Factor k of a one-sided tolerance bound: with confidence 1 - tail at least the share `coverage` of all units
 * lies below mean + k sd (or above mean - k sd).
 *
 * @param n        measurements, whole, 2 to 1e12
 * @param coverage share of the units, above 0, below 1; read as its decimal text, so 0.999999 leaves 1e-6 exactly
 * @param tail     above 0, below 1
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage exactly 1 - tail at one look fixed in advance, for independent measurements of a normal distribution only
 * @source k sqrt(n) is the (1 - tail) quantile of the noncentral t, n - 1 degrees of freedom, noncentrality
 *   z(coverage) sqrt(n); D. B. Owen, Technometrics 10 (1968) (memory)
 */
export function toleranceFactor(n: number, coverage: number, tail: Tail): number {
  requireWhole('n', n, 2, mostMeasurements);
  requireInside('coverage', coverage);
  requireInside('tail', tail);
  const root = Math.sqrt(n);
  return noncentralTQuantileOfTail(tail, n - 1, normalQuantileOfTail(tailOfConfidence(coverage)) * root) / root;
}

/**
 * Rank of the measurement that is a one-sided tolerance bound without any distribution: the r-th
 * largest (for a bound above) or r-th smallest (below). The largest r with P(X <= r - 1 | n, 1 - coverage) <= tail.
 *
 * @param n        measurements, whole, 1 or more
 * @param coverage as of `toleranceFactor`
 * @param tail     above 0, below 1
 * @returns whole, 1 to n; 0 when not even the outermost of n measurements bounds this share
 * @throws OutOfDomain naming the argument
 * @coverage at least 1 - tail at one look fixed in advance, for independent measurements of any distribution
 * @source S. S. Wilks, Ann. Math. Statist. 12 (1941) 91-96 (memory); the count limit of the exact binomial bound
 */
export function toleranceRank(n: number, coverage: number, tail: Tail): number {
  requireWhole('n', n, 1);
  requireInside('coverage', coverage);
  return demonstratedCount(n, tailOfConfidence(coverage), tail) + 1;
}

/**
 * Fewest measurements whose r-th outermost one is a tolerance bound without any distribution.
 *
 * @param rank whole, 1 or more; 1 is the outermost measurement
 * @returns whole
 * @throws OutOfDomain naming the argument
 * @coverage as `toleranceRank`
 * @source as `toleranceRank`
 */
export function toleranceRankUnits(rank: number, coverage: number, tail: Tail): number {
  requireWhole('rank', rank, 1);
  requireInside('coverage', coverage);
  return demonstrationUnits(rank - 1, tailOfConfidence(coverage), tail);
}
