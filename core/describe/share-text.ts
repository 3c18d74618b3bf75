import { complementOf, doubleOf, exactOfText } from '../figure/exact.ts';
import { writtenNumber, writtenTo, type Rounding } from './rounded.ts';

/**
 * A share of units as people say it: small ones in ppm, from 1 % up in per cent, each with '1 in N' behind; large ones,
 * as yields are, in per cent with the digits that their complement needs.
 *
 * @param share 0 to 1
 * @param rounding 'up' for an upper bound, 'down' for a lower one
 */
export function shareText(share: number, rounding: Rounding = 'nearest'): string {
  const brief = briefShare(share, rounding);
  if (share > 0.5 || share === 0) return brief;
  const oneIn = `1 in ${writtenNumber(1 / share, 4, opposite[rounding])}`;
  return share < leastPercent ? `${brief} (${writtenNumber(scaled(share, 2), 4, rounding)} %, ${oneIn})` : `${brief} (${oneIn})`;
}

/** The same in one unit only: ppm below 1 %, else per cent. */
export function briefShare(share: number, rounding: Rounding = 'nearest'): string {
  if (share > 0.5) return largeShare(share, rounding);
  return share < leastPercent ? `${writtenNumber(scaled(share, 6), 4, rounding)} ppm` : `${writtenNumber(scaled(share, 2), 4, rounding)} %`;
}

const leastPercent = 0.01;
const opposite: Readonly<Record<Rounding, Rounding>> = { up: 'down', down: 'up', nearest: 'nearest' };

/** A confidence level by its tail, without losing a digit: a tail of 0.0005 is 99.95 %. */
export function confidenceText(tail: number): string {
  const exact = exactOfText(String(tail));
  if (exact === undefined) return `all but ${tail}`;
  const { numerator, denominator } = complementOf(exact);
  return `${String(denominator).length > 17 ? longPercent(numerator, denominator) : doubleOf({ numerator: numerator * 100n, denominator })} %`;
}

/** Per cent of a share with more digits than a double holds; the denominator is a power of ten. */
function longPercent(numerator: bigint, denominator: bigint): string {
  const decimals = String(denominator).length - 3;
  const digits = String(numerator).padStart(decimals + 1, '0');
  return `${digits.slice(0, -decimals)}.${digits.slice(-decimals)}`;
}

function largeShare(share: number, rounding: Rounding): string {
  const gap = 100 - 100 * share;
  const decimals = gap > 0 ? Math.min(12, Math.max(1, 2 - Math.floor(Math.log10(gap)))) : 0;
  return `${writtenTo(scaled(share, 2), decimals, rounding)} %`;
}

/** Moved by decimal places on the digits it is written with, so that 0.0002 is 200 ppm and not 199.99999999999997. */
function scaled(share: number, places: number): number {
  const exact = exactOfText(String(share));
  return exact === undefined ? share * 10 ** places : doubleOf({ numerator: exact.numerator * 10n ** BigInt(places), denominator: exact.denominator });
}
