import { gammaOfLowerTail, gammaOfUpperTail } from '../numerics/gamma-quantile.ts';
import type { Tail } from '../units.ts';
import { mostMeasurements } from './mean.ts';
import { OutOfDomain, requireInside, requireWhole } from './out-of-domain.ts';

/**
 * Upper bound on the standard deviation of a normal measurement.
 *
 * @param n    measurements, whole, 2 to 1e12
 * @param sd   their sample standard deviation (n - 1), finite, 0 or more
 * @param tail above 0, below 1
 * @returns in the unit of `sd`
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage exactly 1 - tail at one look fixed in advance, for independent measurements of a normal distribution only
 * @source chi-square distribution of (n - 1) sd^2 / sigma^2
 */
export function sdUpper(n: number, sd: number, tail: Tail): number {
  requireSd(n, sd, tail);
  return sd * Math.sqrt((n - 1) / 2 / gammaOfLowerTail((n - 1) / 2, tail));
}

/** Lower bound on the standard deviation; arguments, errors, coverage and source as of `sdUpper`. */
export function sdLower(n: number, sd: number, tail: Tail): number {
  requireSd(n, sd, tail);
  return sd * Math.sqrt((n - 1) / 2 / gammaOfUpperTail((n - 1) / 2, tail));
}

function requireSd(n: number, sd: number, tail: number): void {
  requireWhole('n', n, 2, mostMeasurements);
  if (!(sd >= 0 && sd < Infinity)) throw new OutOfDomain('sd', sd, 'a finite number, 0 or more');
  requireInside('tail', tail);
}
