import type { Surroundings } from '../evidence/standing.ts';
import type { ShiftCalendar } from '../shift/shift-calendar.ts';
import type { EpochMs } from '../units.ts';
import type { BadDataLog } from './bad-data-log.ts';
import type { LineCondition, WatchedStream } from './silence-watch.ts';

/** What a watch needs from its monitor. */
export interface WatchSurroundings extends Surroundings {
  readonly calendar: ShiftCalendar;
  readonly line: LineCondition;
  /** One per station of the guarantee, in line order. */
  readonly streams: readonly WatchedStream[];
  readonly badData: readonly BadDataLog[];
  /** The plant clock, ms. */
  readonly now: () => EpochMs;
  /** Something falls due at this moment that may not have been foreseen. */
  readonly mayBeDue: (at: number) => void;
  readonly plantVersion: () => string;
  readonly sourceName: (index: number) => string;
  /** How people call a station. */
  readonly stationName: (id: string) => string;
}
