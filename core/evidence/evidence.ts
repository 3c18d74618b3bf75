import type { Finding, InspectionPart } from '../record/part.ts';
import type { Picture } from '../view/history.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { RecordIdentity, RecordRange } from '../window/record-identity.ts';
import type { Moment, RecordMoment } from './moment.ts';

/** Some consecutive records of a part, as an evidence takes them. */
export interface Batch {
  readonly part: InspectionPart;
  /** Places in the part: from (included) to `to` (excluded). */
  readonly from: number;
  readonly to: number;
  /**
   * Where records are single units, places of the nonconforming ones, rising: at least of those from `from` to `to` - 1.
   * Looked for once for all that live on the records.
   */
  readonly places: Uint32Array;
  /** Index of the source in the monitor's list. */
  readonly source: number;
  /** Sequence of the part's first record (place 0). */
  readonly firstSequence: number;
  /** Which of the guarantee's stations it comes from, 0-based in line order. */
  readonly station: number;
  /** The lot they belong to, where it was told. */
  readonly lot?: string | undefined;
}

/** Estimate and bounds in the quantity's own unit; undefined where there is none. */
export interface Bounds {
  readonly estimate: number | undefined;
  readonly bound: number | undefined;
  readonly opposite: number | undefined;
}

/** The units of a window in order. */
export interface WindowStrip {
  readonly units: number;
  readonly full: number | undefined;
  /** Nonconforming units, newest first; the record is absent where it is beyond the window's reach. */
  readonly nonconforming: readonly { readonly ago: number; readonly record: RecordIdentity | undefined }[];
  readonly count: number;
}

/** What became of a correction. */
export type CorrectionFate = 'corrected' | 'not here' | 'another kind';

/**
 * The running evidence of one guarantee: a window, its figures, and the weighing of them against the line. It
 * weighs after every record (a run of conforming units in one step where nothing can change inside it), so that
 * how the records were cut into frames decides nothing.
 */
export interface Evidence {
  /** Units (or records) admitted since the watch began; only rises. */
  readonly position: number;
  /** Takes records in order. `moment` stands on the part; its place is moved along. */
  take(batch: Batch, moment: RecordMoment): void;
  /** Records that fill a hole declared lost before: placed by their sequence. */
  fill(batch: Batch, moment: RecordMoment): void;
  correct(identity: RecordIdentity, station: number, finding: Finding, moment: Moment): CorrectionFate;
  /** Forgets the window: evidence begins anew at a declared event. */
  clear(moment: Moment): void;
  /** The plant clock has come to `moment`: what is too old leaves a time window. */
  moveClock(moment: Moment): void;
  /** Moment at which the clock alone changes the window next; Infinity where it never does. */
  nextDue(): number;
  /** Weighs the present figures again (after something was blocked or lifted). */
  weigh(moment: Moment): void;
  /** Units in the finite lot the window belongs to, where the quantity asks for it. */
  setLotSize?(size: number | undefined): void;
  /** A lot has ended, where whole lots are the units. */
  endLot?(lot: string, moment: Moment): void;
  figures(): Readonly<Record<string, number>>;
  ranges(): readonly RecordRange[];
  bounds(): Bounds;
  margin(): Margin;
  warnings(): readonly string[];
  /** The window's units with the newest nonconforming ones, at most `most`; absent where a window has no single units. */
  strip?(most: number): WindowStrip;
  /** The picture that suits the quantity; absent where the bound over time says it all. */
  picture?(): Picture;
  snapshot(): unknown;
  /** Takes over a snapshot; the standing must have been restored before. */
  restore(from: unknown): void;
}
