import type { Priority, RuleKind } from '../plant/guarantee.ts';
import type { EpochMs } from '../units.ts';

/** Name of the person who acted, as shown and kept. */
export type PersonName = string;

export interface Acknowledgement {
  readonly by: PersonName;
  readonly at: EpochMs;
  readonly note: string;
}

/**
 * One occurrence of an alarm from raising to its end (states after IEC 62682): 'raised' is active and not
 * acknowledged, 'acknowledged' is active and acknowledged, 'returned' is back to normal but not acknowledged,
 * 'ended' is back to normal and acknowledged.
 */
export type AlarmState =
  | { readonly kind: 'raised' }
  | { readonly kind: 'acknowledged'; readonly acknowledgement: Acknowledgement }
  | { readonly kind: 'returned'; readonly returnedAt: EpochMs }
  | { readonly kind: 'ended'; readonly returnedAt: EpochMs; readonly acknowledgement: Acknowledgement };

/** What was known when the alarm was raised: enough to recompute it from the stored records. */
export interface AlarmGrounds {
  /** Sequence and source of the record that raised it; absent where time alone did. */
  readonly source: string | undefined;
  readonly sequence: number | undefined;
  /** Hash of the plant file in force. */
  readonly plantVersion: string;
  readonly method: string;
  readonly methodVersion: number;
  readonly lookRule: 'one look' | 'all looks' | 'no bound';
  /** Window contents in figures (inspected, nonconforming, …), the line and the tail, by name. */
  readonly figures: Readonly<Record<string, number>>;
  /** Records of the window: per source the first and last sequence, in order of acceptance. */
  readonly records: readonly { readonly source: string; readonly first: number; readonly last: number }[];
  /** One sentence for a person. */
  readonly sentence: string;
}

export interface Alarm {
  /** Whole, rising over the life of the data directory. */
  readonly id: number;
  readonly guarantee: string;
  readonly rule: RuleKind;
  readonly priority: Priority;
  readonly safetyRelevant: boolean;
  readonly raisedAt: EpochMs;
  /** How often its condition came back while it was not yet ended, 1 at first. */
  readonly times: number;
  readonly state: AlarmState;
  readonly response: string;
  readonly grounds: AlarmGrounds;
}
