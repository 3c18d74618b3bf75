import type { Batch } from '../evidence/evidence.ts';

/** What a detector's alarm tells of the records since it last began anew. */
export interface ChangeFigures {
  /** Units, exposure or values seen, and what was found in them; found is absent for measurements. */
  readonly seen: number;
  readonly found: number | undefined;
}

/** Watches for a change for the worse; O(1) state, conforming units in one step, the same however records are cut. */
export interface ChangeWatch {
  /** Whether its alarm stands: from its raising until its gauge is back at half way, or until it begins anew. */
  readonly alarmed: boolean;
  /** Alarms so far, those raised while one stood included. */
  readonly alarms: number;
  /**
   * Takes records from place `from` on, up to the first at which the alarm is raised or returns.
   *
   * @returns the place behind the last one taken, at most batch.to
   */
  take(batch: Batch, from: number): number;
  /** Since it last began anew; at the raising of an alarm those that led to it. */
  figures(): ChangeFigures;
  /** Share of the way to the alarm on a logarithmic scale, 0 to 1; while an alarm stands, of the way back. */
  gauge(): number;
  /** Nonconforming units (or nonconformities in a usual record) in a row to the alarm; undefined where none would do, or not counted. */
  inARowToAlarm(): number | undefined;
  /** Conforming units until the gauge is back at half way; undefined where it is not counted. */
  conformingToHalfWay(): number | undefined;
  /** Conforming units (or exposure) until its alarm returns; undefined while none stands, or where that cannot be told. */
  toReturn(): number | undefined;
  /** Forgets what it has seen; its alarm no longer stands. */
  beginAnew(): void;
  snapshot(): unknown;
  restore(from: never): void;
}
