import type { EpochMs } from '../units.ts';

/** One shift on one day: from `since` (included) to `until` (excluded). */
export interface ShiftInstance {
  readonly name: string;
  readonly since: EpochMs;
  readonly until: EpochMs;
}
