import { betaOdds } from '../numerics/beta-quantile.ts';
import type { Fraction, Tail } from '../units.ts';
import { fractionOfOdds, requireSample } from './nonconforming-fraction.ts';

/**
 * Upper quantile of the Jeffreys posterior Beta(x + 1/2, n - x + 1/2) of a nonconforming fraction.
 * The quantile itself, also at no or only nonconforming units.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 1 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in (0, 1]
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage 1 - tail on average only; at 95 % and 1 to 300 units down to 0.83 for fractions up to 1/2, and 0 above its value for a
 *   wholly nonconforming sample (enumerated); one look fixed in advance
 * @source H. Jeffreys 1961; L. D. Brown, T. T. Cai, A. DasGupta 2001 (memory)
 */
export function jeffreysUpper(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionOfOdds(1 / betaOdds(inspected - nonconforming + 0.5, nonconforming + 0.5, tail));
}

/**
 * Lower quantile of the same posterior; arguments, errors and source as of `jeffreysUpper`.
 *
 * @returns in [0, 1)
 * @coverage the mirror of `jeffreysUpper`: 0 below its value for a faultless sample
 */
export function jeffreysLower(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionOfOdds(betaOdds(nonconforming + 0.5, inspected - nonconforming + 0.5, tail));
}
