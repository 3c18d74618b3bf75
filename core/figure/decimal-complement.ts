import { complementOf, doubleOf, exactOfText } from './exact.ts';

/**
 * 1 - value, formed on the decimal that the double is written as: 0.985 gives exactly 0.015, where the difference of
 * doubles does not.
 *
 * @param value finite
 */
export function decimalComplement(value: number): number {
  const exact = exactOfText(String(value));
  return exact === undefined ? 1 - value : doubleOf(complementOf(exact));
}
