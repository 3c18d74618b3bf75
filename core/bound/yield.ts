import { decimalComplement } from '../numerics/exact-decimal.ts';
import type { Fraction, Tail } from '../units.ts';
import { fractionLower, fractionUpper, requireSample } from './nonconforming-fraction.ts';
import { OutOfDomain } from './out-of-domain.ts';

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

/**
 * The nonconforming fraction that a guaranteed yield allows, complemented in decimals: a yield of at
 * least 0.985 means at most 0.015 nonconforming, so the limits of `critical-count` serve both.
 *
 * @param yieldLine above 0, below 1
 * @throws OutOfDomain
 */
export function lineOfYield(yieldLine: number): Fraction {
  const line = decimalComplement(yieldLine);
  if (line === undefined || !(line > 0)) throw new OutOfDomain('yieldLine', yieldLine, 'a number above 0 and below 1');
  return line as Fraction;
}
