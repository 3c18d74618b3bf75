import type { Change } from '../../core/access/change.ts';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { EvidenceState } from '../../core/evidence/evidence-state.ts';
import type { Happening } from '../../core/monitor/happening.ts';
import type { Entry } from './entry.ts';

/** A happening with the journal entry that made it happen. */
export interface KeptHappening {
  readonly journalId: number;
  readonly happening: Happening;
}

/** What one guarantee saw in one minute, for charts. */
export interface Minute {
  readonly guarantee: string;
  /** Start of the minute, ms since 1970-01-01 UTC, a multiple of 60,000. */
  readonly at: number;
  /** Units (or exposure) and nonconforming units (or nonconformities), 0 or more: added to what the minute has. */
  readonly inspected: number;
  readonly nonconforming: number;
  /** Of the window when this was written: they replace what the minute has. NaN is kept as absent. */
  readonly estimate: number | undefined;
  readonly bound: number | undefined;
  readonly opposite: number | undefined;
  readonly state: EvidenceState;
}

/** What becomes durable together: all of it or nothing. */
export interface Group {
  /** Ids strictly rising, above every id committed before. */
  readonly entries: readonly Entry[];
  /** In the order in which they were decided. */
  readonly happenings: readonly KeptHappening[];
  /** Alarms that changed, as they are now: each replaces the one of its id. */
  readonly alarms: readonly Alarm[];
  readonly minutes: readonly Minute[];
  /** What goes on the record of changes, in order. */
  readonly changes: readonly Change[];
}
