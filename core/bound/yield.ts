import type { Fraction, Tail } from '../units.ts';
import { fractionLower, fractionUpper, requireSample } from './nonconforming-fraction.ts';

/**
 * Exact lower bound on a line's yield, from the conforming side, so that it keeps all its digits
 * where one minus the nonconforming bound would lose them.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 1 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in [0, 1); exactly 0 if every unit is nonconforming
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage never below 1 - tail, at one look fixed in advance
 * @source mirror of the exact binomial bound, see `fractionUpper`
 */
export function yieldLower(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionLower(inspected - nonconforming, inspected, tail);
}

/**
 * Exact upper bound on a line's yield; arguments, errors and coverage as of `yieldLower`.
 *
 * @returns in (0, 1]; exactly 1 if no unit is nonconforming
 * @coverage never below 1 - tail, at one look fixed in advance
 * @source mirror of the exact binomial bound, see `fractionLower`
 */
export function yieldUpper(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return fractionUpper(inspected - nonconforming, inspected, tail);
}
