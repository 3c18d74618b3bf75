import { demonstratedCount, demonstrationUnits } from '../bound/critical-count.ts';
import { fractionLower } from '../bound/nonconforming-fraction.ts';
import { OutOfDomain, requireInside, requireWhole } from '../bound/out-of-domain.ts';
import { lnBinomialUpper } from '../numerics/binomial-tail.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Fraction, Tail } from '../units.ts';

/** A guarantee on a nonconforming fraction, and how seldom a well line may lose its demonstration. */
export interface SteadyWish {
  /** guaranteed fraction, above 0, below 1 */
  readonly line: number;
  readonly tail: Tail;
  /** share of the time a well line may stand not demonstrated, above 0, below 1; 0.01 unless there is a reason */
  readonly lost: Tail;
}

/** More nonconforming units in a window than anyone wants; a normal rate that near the line is refused. */
const mostCount = 1_000_000;

/**
 * The window from which on every larger one, too, keeps a well line demonstrated. Counts are whole, so
 * a smaller window may do by luck (the proposal for a limit sheet is the first of those) and fail
 * when it is rounded up; this one can be rounded up.
 *
 * @param normal the declared normal rate, 0 to below the line
 * @returns units, whole
 * @throws OutOfDomain, also where the normal rate is so near the line that a million nonconforming units would not tell them apart
 * @coverage of the window's bound: at one look
 * @source own derivation: P(X > count | units, normal) <= lost, at the last window that has each count
 */
export function steadyWindow({ line, tail, lost }: SteadyWish, normal: number): number {
  requireInside('line', line);
  requireInside('lost', lost);
  if (!(normal >= 0 && normal < line)) throw new OutOfDomain('normal', normal, `0 to below the line ${line}`);
  if (normal === 0) return demonstrationUnits(0, line, tail);
  const short = (count: number): boolean => lostAt(demonstrationUnits(count + 1, line, tail) - 1, count, normal) > lost;
  const gap = 1 - normal / line;
  const count = lastWhere(short, 0, mostCount, 8 / (gap * gap)) + 1;
  if (count > mostCount) throw new OutOfDomain('normal', normal, `farther below the line ${line}`);
  return demonstrationUnits(count, line, tail);
}

/**
 * Share of the time a line at a given rate stands not demonstrated in a given window.
 *
 * @param units of the window, whole, 1 or more
 * @param rate nonconforming fraction, above 0, below 1
 * @returns in [0, 1]; 1 where even a faultless window demonstrates nothing yet
 * @throws OutOfDomain
 */
export function lostShare(units: number, rate: number, line: number, tail: Tail): number {
  requireInside('rate', rate);
  return lostAt(units, demonstratedCount(units, line, tail), rate);
}

/**
 * The highest normal rate at which a given window keeps a line demonstrated.
 *
 * @param units of the window, whole, 1 or more
 * @returns in [0, line); 0 where even a faultless window demonstrates nothing yet
 * @throws OutOfDomain
 * @source own derivation: the rate with P(X > count | units, rate) = lost is an exact lower bound at that tail
 */
export function highestNormalRate({ line, tail, lost }: SteadyWish, units: number): Fraction {
  requireWhole('units', units, 1);
  const count = demonstratedCount(units, line, tail);
  return count < 0 ? (0 as Fraction) : fractionLower(count + 1, units, lost);
}

function lostAt(units: number, count: number, rate: number): number {
  return Math.exp(lnBinomialUpper(count + 1, units, rate));
}
