import type { Alarm } from '../alarm/alarm.ts';
import type { EvidenceState } from '../evidence/evidence-state.ts';
import type { EpochMs } from '../units.ts';

/** Something the monitor decided, in the order in which it was decided; plain data, the same from server and replay. */
export type Happening =
  | {
      readonly kind: 'evidence';
      readonly at: EpochMs;
      readonly guarantee: string;
      readonly from: EvidenceState;
      readonly to: EvidenceState;
      readonly source: string | undefined;
      readonly sequence: number | undefined;
      readonly figures: Readonly<Record<string, number>>;
    }
  | { readonly kind: 'alarm'; readonly at: EpochMs; readonly change: 'raised' | 'again' | 'acknowledged' | 'returned' | 'ended'; readonly alarm: Alarm }
  /** A named person restarted the evidence; `run` is the number of the run that began with it, from 2 on. */
  | { readonly kind: 'restart'; readonly at: EpochMs; readonly guarantee: string; readonly by: string; readonly reason: string; readonly run: number }
  /** A run began with an event of the line; `detail` is the lot or the product. */
  | { readonly kind: 'run'; readonly at: EpochMs; readonly guarantee: string; readonly run: number; readonly cause: 'lot' | 'changeover'; readonly detail: string }
  | { readonly kind: 'line'; readonly at: EpochMs; readonly line: string; readonly mark: 'changeover' | 'lot-start' | 'lot-end' | 'line-stopped' | 'line-running'; readonly detail: string }
  | { readonly kind: 'set-aside'; readonly at: EpochMs; readonly source: string; readonly sequence: number; readonly records: number; readonly reason: string };
