import { demonstrationUnits } from '../bound/critical-count.ts';
import { OutOfDomain, requirePositive, requireWhole } from '../bound/out-of-domain.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Tail } from '../units.ts';

/** What a person can count off a window that is full. */
export interface WindowMargin {
  /** nonconforming units the window can still take and stay demonstrated; negative when it is not */
  readonly untilUndemonstrated: number;
  /** nonconforming units more until the window shows the guarantee violated; 0 or less when it does */
  readonly untilViolated: number;
  /** units (or exposure) until the oldest nonconforming unit leaves the window; undefined when there is none */
  readonly untilRelief: number | undefined;
  /** conforming units (or exposure without a nonconformity) until demonstrated again: 0 when it is, undefined when that cannot be */
  readonly untilDemonstrated: number | undefined;
}

/** A full window of the newest units, or of the newest exposure, and where its nonconformities stand. */
export interface FullWindow {
  /** units or exposure in the window, above 0 */
  readonly span: number;
  /** how much came after each nonconforming unit, oldest first; from 0 to below `span` */
  readonly ages: readonly number[];
}

/** The counts a window's evidence turns at, from `critical-count`, `critical-exposure` or `critical-lot`. */
export interface TurningCounts {
  /** most nonconforming that still demonstrate; -1 when none do */
  readonly demonstrated: number;
  /** fewest nonconforming that show a violation */
  readonly violated: number;
}

/**
 * The margin of a full window at a look fixed in advance.
 *
 * @throws OutOfDomain naming the argument
 * @source methods, section 9, closed forms
 */
export function windowMargin({ span, ages }: FullWindow, turning: TurningCounts): WindowMargin {
  requirePositive('span', span);
  requireAges(ages, span);
  const excess = ages.length - turning.demonstrated;
  const oldest = ages[0];
  const leaving = ages[excess - 1];
  return {
    untilUndemonstrated: -excess,
    untilViolated: turning.violated - ages.length,
    untilRelief: oldest === undefined ? undefined : span - oldest,
    untilDemonstrated: excess <= 0 ? 0 : leaving === undefined ? undefined : span - leaving,
  };
}

/** What a person can count off a run that is judged once, when it ends. */
export interface RunMargin {
  /** conforming units in a row until the run is demonstrated; 0 when it is */
  readonly untilDemonstrated: number;
  /** nonconforming units in a row that the run can take now and stay demonstrated; undefined when it is not demonstrated */
  readonly affordable: number | undefined;
}

/**
 * The margin of a run so far, for the one look at its end.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 0 or more
 * @throws OutOfDomain naming the argument
 * @source methods, section 9: n_req(x) = smallest n with P(Bin(n, line) <= x) <= tail
 */
export function runMargin(nonconforming: number, inspected: number, line: number, tail: Tail): RunMargin {
  requireWhole('inspected', inspected, 0);
  requireWhole('nonconforming', nonconforming, 0, inspected);
  const needed = demonstrationUnits(nonconforming, line, tail);
  if (needed > inspected) return { untilDemonstrated: needed - inspected, affordable: undefined };
  const holds = (more: number): boolean => demonstrationUnits(nonconforming + more, line, tail) <= inspected + more;
  const guess = Math.floor((inspected - needed) * line);
  return { untilDemonstrated: 0, affordable: lastWhere(holds, 0, inspected, guess) };
}

function requireAges(ages: readonly number[], span: number): void {
  let before = span;
  for (const age of ages) {
    if (!(age >= 0 && age < span && age <= before)) throw new OutOfDomain('ages', age, `oldest first, from 0 to below ${span}`);
    before = age;
  }
}
