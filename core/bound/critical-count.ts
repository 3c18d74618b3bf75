import { tailAtMost } from '../numerics/exact-binomial.ts';
import { lnBinomialLower, lnBinomialUpper } from '../numerics/binomial-tail.ts';
import { gammaLowerStart, gammaUpperStart } from '../numerics/gamma-start.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import { normalStart } from '../numerics/normal-start.ts';
import type { Tail } from '../units.ts';
import { OutOfDomain, requireInside, requireWhole } from './out-of-domain.ts';

/*
 * The bounds of `fractionUpper` and `fractionLower` turned round: whole numbers that the record path
 * compares without computing a bound. Line and tail are taken as the decimals they are written as,
 * so ties come out exactly; all four figures ask the same two questions and cannot disagree.
 */

/**
 * The most nonconforming units with which `inspected` units still demonstrate that the fraction is at
 * most `line`: the largest x with P(X <= x | inspected, line) <= tail.
 *
 * @param inspected whole, 1 or more
 * @param line guaranteed fraction, above 0, below 1
 * @param tail above 0, below 1
 * @returns whole, -1 (not even a faultless sample demonstrates it: still gathering) to inspected - 1
 * @throws OutOfDomain
 * @coverage at one look fixed in advance, as the bound
 * @source methods of C. J. Clopper, E. S. Pearson 1934 (memory): the bound is <= line exactly up to this count
 */
export function demonstratedCount(inspected: number, line: number, tail: Tail): number {
  requireLine(inspected, line, tail, 1);
  const guess = countNear(inspected, line, -normalStart(Math.log(tail))) - 0.5;
  return lastWhere((x) => demonstrates(x, inspected, line, tail), 0, inspected - 1, guess);
}

/**
 * The fewest nonconforming units with which `inspected` units show that the fraction is above `line`:
 * the smallest x with P(X >= x | inspected, line) <= tail. Arguments and errors as of `demonstratedCount`.
 *
 * @returns whole, 1 to inspected + 1; inspected + 1 means that no sample of this size can show it
 * @coverage at one look fixed in advance, as the bound
 * @source as `demonstratedCount`
 */
export function violatedCount(inspected: number, line: number, tail: Tail): number {
  requireLine(inspected, line, tail, 1);
  const guess = countNear(inspected, line, normalStart(Math.log(tail))) + 0.5;
  return lastWhere((x) => !violates(x, inspected, line, tail), 0, inspected, guess) + 1;
}

/**
 * The fewest units that demonstrate a fraction of at most `line` with this many nonconforming ones:
 * the smallest n with P(X <= nonconforming | n, line) <= tail.
 *
 * @param nonconforming whole, 0 or more
 * @returns whole, nonconforming + 1 or more
 * @throws OutOfDomain, also when the answer would not be a safe whole number
 * @coverage at one look fixed in advance, as the bound
 * @source as `demonstratedCount`
 */
export function demonstrationUnits(nonconforming: number, line: number, tail: Tail): number {
  requireLine(nonconforming, line, tail, 0);
  const mean = gammaUpperStart(nonconforming + 1, Math.log(tail));
  const guess = unitsNear(mean, nonconforming, line);
  return lastWhere((n) => n <= nonconforming || !demonstrates(nonconforming, n, line, tail), nonconforming, mostUnits, guess) + 1;
}

/**
 * The most units of which this many nonconforming ones still show a fraction above `line`:
 * the largest n with P(X >= nonconforming | n, line) <= tail.
 *
 * @param nonconforming whole, 0 or more
 * @returns whole; 0 when no number of units does, else nonconforming or more
 * @throws OutOfDomain, also when the answer would not be a safe whole number
 * @coverage at one look fixed in advance, as the bound
 * @source as `demonstratedCount`
 */
export function violationUnits(nonconforming: number, line: number, tail: Tail): number {
  requireLine(nonconforming, line, tail, 0);
  if (nonconforming === 0) return 0;
  const mean = gammaLowerStart(nonconforming, Math.log(tail));
  const guess = unitsNear(mean, nonconforming - 1, line);
  const last = lastWhere((n) => violates(nonconforming, n, line, tail), nonconforming, mostUnits, guess);
  return last < nonconforming ? 0 : last;
}

const mostUnits = Number.MAX_SAFE_INTEGER - 1;

function demonstrates(x: number, n: number, line: number, tail: number): boolean {
  return tailAtMost(lnBinomialLower(x, n, line), tail, 0, x, n, line);
}

function violates(x: number, n: number, line: number, tail: number): boolean {
  return tailAtMost(lnBinomialUpper(x, n, line), tail, x, n, n, line);
}

function requireLine(count: number, line: number, tail: number, least: number): void {
  requireWhole(least === 1 ? 'inspected' : 'nonconforming', count, least);
  requireInside('line', line);
  requireInside('tail', tail);
}

/** The count that z standard deviations reach, with the skewness allowed for (Cornish and Fisher). */
function countNear(n: number, p: number, z: number): number {
  return n * p + z * Math.sqrt(n * p * (1 - p)) + ((1 - 2 * p) * (z * z - 1)) / 6;
}

function unitsNear(mean: number, count: number, line: number): number {
  const units = mean / line + (count - mean) / 2;
  if (units < mostUnits / 2) return units;
  throw new OutOfDomain('line', line, 'a fraction that fewer than 2^52 units can settle');
}
