import type { Fraction, Tail } from '../units.ts';
import { fractionLower, fractionUpper } from './nonconforming-fraction.ts';
import { requireInside, requireWhole } from './out-of-domain.ts';

/**
 * Exact upper bound on a nonconforming fraction when inspection stopped at the x-th nonconforming
 * unit: the last unit was bound to be nonconforming and says nothing, P(N >= n) = P(X <= x - 1 | n - 1).
 *
 * @param nonconforming units at which inspection was to stop; whole, 1 to inspected
 * @param inspected units until then, the last one included; whole, 1 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in (0, 1]; exactly 1 if every unit was nonconforming
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage never below 1 - tail when the stop was fixed in advance; one look, at the stop
 * @source negative binomial waiting time, own derivation; checked against published values
 */
export function stoppedFractionUpper(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireStopped(nonconforming, inspected, tail);
  return nonconforming === inspected ? (1 as Fraction) : fractionUpper(nonconforming - 1, inspected - 1, tail);
}

/**
 * Exact lower bound in the same case: P(N <= n) = P(X >= x | n), so it is the bound of a fixed sample.
 *
 * @returns in (0, 1)
 * @coverage never below 1 - tail when the stop was fixed in advance; one look, at the stop
 * @source as `stoppedFractionUpper`; arguments and errors too
 */
export function stoppedFractionLower(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireStopped(nonconforming, inspected, tail);
  return fractionLower(nonconforming, inspected, tail);
}

function requireStopped(nonconforming: number, inspected: number, tail: number): void {
  requireWhole('inspected', inspected, 1);
  requireWhole('nonconforming', nonconforming, 1, inspected);
  requireInside('tail', tail);
}
