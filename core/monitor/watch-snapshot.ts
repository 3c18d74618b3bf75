import type { StandingSnapshot } from '../evidence/standing.ts';
import type { TipTrailSnapshot } from '../evidence/tip-trail.ts';
import type { GuaranteeChangeSnapshot } from '../run/guarantee-change.ts';
import type { GuaranteeRunSnapshot } from '../run/guarantee-run.ts';
import type { LostRecordsSnapshot } from './lost-records.ts';
import type { MinuteCount } from './minute-tally.ts';
import type { PeriodSnapshot } from './period.ts';

/** The state of a watch as plain data. */
export interface WatchSnapshot {
  readonly evidence: unknown;
  readonly standing: StandingSnapshot;
  readonly period: PeriodSnapshot;
  readonly lost: LostRecordsSnapshot;
  readonly trail: TipTrailSnapshot;
  readonly minutes: readonly MinuteCount[];
  readonly newest: number;
  readonly badData: boolean;
  readonly run: GuaranteeRunSnapshot;
  readonly change: GuaranteeChangeSnapshot | undefined;
  readonly away: boolean;
}
