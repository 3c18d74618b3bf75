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
 * @coverage near 1 - tail on average, never below 1 - 2 tail (reached); at one look fixed in advance
 * @source H. O. Lancaster 1961 (memory)
 */
export function midPUpper(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionOfOdds(1 / missOdds(nonconforming, inspected, tail));
}

/**
 * Mid-P lower bound, the mirror of `midPUpper`; arguments and errors as there.
 *
 * @returns in [0, 1]; for tails up to 1/2 exactly 0 if no unit is nonconforming
 * @coverage near 1 - tail on average, never below 1 - 2 tail (reached); at one look fixed in advance
 * @source H. O. Lancaster 1961 (memory)
 */
export function midPLower(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionOfOdds(missOdds(inspected - nonconforming, inspected, tail));
}

/** Odds (1 - p)/p of the upper bound p. */
function missOdds(x: number, n: number, tail: number): number {
  if (x === 0) {
    const lnMiss = Math.log(2 * tail) / n;
    return tail < 0.5 ? Math.exp(lnMiss) / -Math.expm1(lnMiss) : Infinity;
  }
  if (tail > 0.5) return 1 / missOdds(n - x, n, 1 - tail);
  return x === n ? 0 : midBinomialOdds(x, n, tail);
}
