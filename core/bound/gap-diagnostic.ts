import { lnBinomialUpper } from '../numerics/binomial-tail.ts';
import { OutOfDomain, requireWhole } from './out-of-domain.ts';

/** How often the next nonconforming unit came within so many units, against what independence gives. */
export interface GapShare {
  /** units from one nonconforming unit to the next, at most */
  readonly within: number;
  /** share of the gaps seen, 0 to 1 */
  readonly seen: number;
  /** share expected of independent units, 0 to 1 */
  readonly expected: number;
  /** chance of so many short gaps if units were independent, 0 to 1; speaks below 0.01 */
  readonly chance: number;
}

/** 1 tells neighbours, 20 tells batches. */
const reaches = [1, 5, 20] as const;

/**
 * Whether nonconforming units follow each other more closely than chance would have it.
 *
 * @param positions numbers of the nonconforming units in the stream, rising, whole
 * @param inspected units the positions come from; whole, as many as positions or more
 * @returns one share for each of 1, 5 and 20 units; none with fewer than two positions
 * @throws OutOfDomain naming the argument
 * @source geometric waiting times, methods section 8; chance: exact binomial, rate taken as known
 */
export function gapShares(positions: readonly number[], inspected: number): readonly GapShare[] {
  requireWhole('inspected', inspected, Math.max(1, positions.length));
  const gaps = gapsOf(positions);
  if (gaps.length === 0) return [];
  const rate = positions.length / inspected;
  return reaches.map((within) => {
    const short = gaps.filter((gap) => gap <= within).length;
    const expected = rate < 1 ? -Math.expm1(within * Math.log1p(-rate)) : 1;
    const chance = expected < 1 ? Math.exp(lnBinomialUpper(short, gaps.length, expected)) : 1;
    return { within, seen: short / gaps.length, expected, chance };
  });
}

/** Units from each position to the next. @throws OutOfDomain unless they rise */
export function gapsOf(positions: readonly number[]): readonly number[] {
  return positions.slice(1).map((position, i) => {
    const gap = position - (positions[i] ?? 0);
    if (!(gap > 0)) throw new OutOfDomain('positions', position, 'numbers that rise');
    return gap;
  });
}
