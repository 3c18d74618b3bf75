import { midBinomialOdds } from '../numerics/mid-tail.ts';
import type { Fraction, Tail } from '../units.ts';
import { fractionOfOdds, requireSample } from './nonconforming-fraction.ts';

/**
 * Mid-P upper bound on a nonconforming fraction: the rate at which P(X < x) + P(X = x)/2 = tail.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 1 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in [0, 1]; for tails up to 1/2 exactly 1 if every unit is nonconforming; for tails from 1/2 up exactly 0 if none is
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage near 1 - tail on average over rates, below it at some; at one look fixed in advance
 * @source H. O. Lancaster 1961 (memory)
 */
export function midPUpper(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionOfOdds(upperOdds(nonconforming, inspected, tail));
}

/**
 * Mid-P lower bound, the mirror of `midPUpper`; arguments and errors as there.
 *
 * @returns in [0, 1]; for tails up to 1/2 exactly 0 if no unit is nonconforming
 * @coverage near 1 - tail on average over rates, below it at some; at one look fixed in advance
 * @source H. O. Lancaster 1961 (memory)
 */
export function midPLower(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionOfOdds(1 / upperOdds(inspected - nonconforming, inspected, tail));
}

function upperOdds(x: number, n: number, tail: number): number {
  if (x === 0) return tail < 0.5 ? Math.expm1(-Math.log(2 * tail) / n) : 0;
  if (x === n || tail > 0.5) return tail > 0.5 ? 1 / upperOdds(n - x, n, 1 - tail) : Infinity;
  return midBinomialOdds(x, n, tail);
}
