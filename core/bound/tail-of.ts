import { decimalComplement } from '../numerics/exact-decimal.ts';
import type { Tail } from '../units.ts';
import { OutOfDomain, requireInside } from './out-of-domain.ts';

/**
 * The tail that belongs to a confidence level, complemented in decimal digits: a confidence of
 * 0.999999 means a tail of 1e-6, while 1 - 0.999999 in doubles is off in the eleventh digit.
 * Text keeps digits that a double cannot hold ('0.99999999999999999999').
 *
 * @param confidence above 0, below 1; a number is read as its shortest decimal text
 * @returns the double nearest to the decimal complement
 * @throws OutOfDomain when it is no decimal number above 0 and below 1
 * @source own derivation
 */
export function tailOfConfidence(confidence: number | string): Tail {
  const tail = decimalComplement(confidence);
  if (tail === undefined) throw new OutOfDomain('confidence', confidence, 'a decimal number above 0 and below 1');
  requireInside('tail', tail);
  return tail as Tail;
}
