import { demonstratedCount, demonstrationUnits } from '../bound/critical-count.ts';
import { fractionLower } from '../bound/nonconforming-fraction.ts';
import { OutOfDomain, requireInside, requireWhole } from '../bound/out-of-domain.ts';
import { lnBinomialUpper } from '../numerics/binomial-tail.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Fraction, Tail } from '../units.ts';

/** A guarantee on a nonconforming fraction, and how seldom a well line may lose its demonstration. */
export interface WindowWish {
  /** guaranteed fraction, above 0, below 1 */
  readonly line: number;
  readonly tail: Tail;
  /** share of the time a well line may stand not demonstrated, above 0, below 1; 0.01 unless there is a reason */
  readonly lost: Tail;
}

/** A window with what it does on the well line. */
export interface WindowProposal {
  /** units of the window */
  readonly units: number;
  /** nonconforming units it can hold and still demonstrate the guarantee */
  readonly count: number;
  /** share of the time the well line stands not demonstrated */
  readonly lost: number;
}

/** More nonconforming units in a window than any proposal needs; a normal rate that near the line is refused. */
const mostCount = 1_000_000;

/**
 * The smallest window that keeps a well line demonstrated, and of which every larger window does too:
 * since counts are whole, some smaller windows do by luck.
 *
 * @param normal the declared normal rate, above 0, below the line
 * @throws OutOfDomain, also where the normal rate is so near the line that a million nonconforming units would not tell them apart
 * @coverage of the window's bound: at one look
 * @source own derivation: P(X > count | units, normal) <= lost, at the last window that has each count
 */
export function windowProposal({ line, tail, lost }: WindowWish, normal: number): WindowProposal {
  requireInside('line', line);
  requireInside('lost', lost);
  if (!(normal > 0 && normal < line)) throw new OutOfDomain('normal', normal, `above 0 and below the line ${line}`);
  const short = (count: number): boolean => lostShare(demonstrationUnits(count + 1, line, tail) - 1, count, normal) > lost;
  const gap = 1 - normal / line;
  const count = lastWhere(short, 0, mostCount, 8 / (gap * gap)) + 1;
  if (count > mostCount) throw new OutOfDomain('normal', normal, `farther below the line ${line}`);
  const units = demonstrationUnits(count, line, tail);
  return { units, count, lost: lostShare(units, count, normal) };
}

/**
 * The reverse: the highest normal rate at which a given window keeps a line demonstrated.
 *
 * @param units of the window, whole, 1 or more
 * @returns in [0, line); 0 where even a faultless window demonstrates nothing yet
 * @throws OutOfDomain
 * @source own derivation: the rate with P(X > count | units, rate) = lost is an exact lower bound at that tail
 */
export function highestNormalRate({ line, tail, lost }: WindowWish, units: number): Fraction {
  requireWhole('units', units, 1);
  const count = demonstratedCount(units, line, tail);
  return count < 0 ? (0 as Fraction) : fractionLower(count + 1, units, lost);
}

function lostShare(units: number, count: number, rate: number): number {
  return Math.exp(lnBinomialUpper(count + 1, units, rate));
}
