import { normalQuantileOfTail } from '../numerics/normal.ts';
import { fault, ok, type Result } from '../result.ts';
import type { Fraction, Tail } from '../units.ts';
import { requireSample } from './nonconforming-fraction.ts';

/** Why the normal approximation is refused: too few units of the scarcer kind. */
export interface TooFewForNormal {
  readonly kind: 'too-few-for-normal';
  /** units of the scarcer kind, nonconforming or conforming */
  readonly scarce: number;
  readonly needed: number;
  /** what it would have said; can be 0 wide or reach outside [0, 1] */
  readonly wouldSay: number;
}

/** Fewer units than this of either kind, and the approximation is refused (common practice, no source). */
export const normalApproximationNeeds = 10;

/**
 * The textbook upper bound x/n + z sqrt(x (n - x)/n^3), shown only to say why it is not used: at no
 * nonconforming unit it claims a perfect line.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 1 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns the bound in [0, 1], or the refusal with the figure refused
 * @throws OutOfDomain naming the argument
 * @coverage below 1 - tail for small fractions, by far; at one look fixed in advance
 * @source A. Wald's interval, textbook knowledge
 */
export function normalApproximationUpper(nonconforming: number, inspected: number, tail: Tail): Result<Fraction, TooFewForNormal> {
  return judged(nonconforming, inspected, tail, 1);
}

/** The lower bound likewise; all as of `normalApproximationUpper`. @coverage as there */
export function normalApproximationLower(nonconforming: number, inspected: number, tail: Tail): Result<Fraction, TooFewForNormal> {
  return judged(nonconforming, inspected, tail, -1);
}

function judged(x: number, n: number, tail: Tail, side: 1 | -1): Result<Fraction, TooFewForNormal> {
  requireSample(x, n, tail);
  const wouldSay = x / n + side * normalQuantileOfTail(tail) * Math.sqrt((x * ((n - x) / n)) / n / n);
  const scarce = Math.min(x, n - x);
  if (scarce >= normalApproximationNeeds && wouldSay >= 0 && wouldSay <= 1) return ok(wouldSay as Fraction);
  return fault({ kind: 'too-few-for-normal', scarce, needed: normalApproximationNeeds, wouldSay });
}
