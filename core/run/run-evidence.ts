import type { Assessment } from '../evidence/assessment.ts';
import type { Batch, Bounds } from '../evidence/evidence.ts';
import type { Margin } from '../view/guarantee-view.ts';

/** By how much a correction changed what was counted. */
export interface CountChange {
  readonly size: number;
  readonly count: number;
}

/**
 * The evidence of a run at all looks, from its declared beginning on: a few numbers, however long it goes on. It is
 * looked at after every record (and after every conforming unit, in one step), so that how records were cut into frames
 * decides nothing.
 */
export interface RunEvidence {
  /** What the evidence says now; another object only where it says something else. */
  readonly assessment: Assessment;
  /**
   * Takes records from place `from` on, up to the first at which the assessment changes.
   *
   * @returns the place behind the last one taken, at most batch.to
   */
  take(batch: Batch, from: number): number;
  /** A record of the run was corrected. */
  correct(change: CountChange): void;
  /** The run begins anew. */
  clear(): void;
  /** Units in the lot, where the quantity asks for it; clears nothing. */
  setLotSize?(size: number | undefined): void;
  /** Units, exposure or measurements taken. */
  readonly size: number;
  figures(): Readonly<Record<string, number>>;
  /** ln of the evidence that the guarantee is kept, and that it is broken; NaN where nothing can be said. */
  lnDemonstrated(): number;
  lnViolated(): number;
  /** At all looks. */
  bounds(): Bounds;
  margin(): Margin;
  snapshot(): unknown;
  restore(from: never): void;
}
