import type { Alarm } from '../alarm/alarm.ts';
import type { GuaranteeCard, GuaranteeView } from '../view/guarantee-view.ts';

/** Subprotocol of the dashboards' WebSocket at /live. */
export const liveProtocol = 'vouchline-live.1';

export interface PlantCard {
  readonly name: string;
  readonly timeZone: string;
  /** Hash of the plant file in force. */
  readonly version: string;
  readonly lines: readonly { readonly id: string; readonly name: string }[];
  readonly shift: { readonly name: string; readonly since: number; readonly until: number } | undefined;
}

/** Everything a dashboard needs to draw; sent first, and again when the plant file changes. */
export interface LiveSnapshot {
  readonly type: 'snapshot';
  /** Differs after every start of the server: a revision means something only within one boot. */
  readonly boot: string;
  readonly revision: number;
  /** The plant clock, ms; it runs `clockRate` times as fast as the wall clock (1 but in the demo). */
  readonly at: number;
  readonly clockRate: number;
  readonly demo: boolean;
  readonly plant: PlantCard;
  readonly cards: readonly GuaranteeCard[];
  readonly views: readonly GuaranteeView[];
  /** Every alarm that has not ended, and the newest ended ones (at most 200). */
  readonly alarms: readonly Alarm[];
}

/** What changed since the revision this dashboard has; the newest of each guarantee, every alarm change. */
export interface LiveChange {
  readonly type: 'change';
  readonly revision: number;
  readonly at: number;
  readonly views: readonly GuaranteeView[];
  readonly alarms: readonly Alarm[];
  /** Present where the shift changed; null between shifts. */
  readonly shift?: NonNullable<PlantCard['shift']> | null;
}

/** Sent every second while nothing changes, so that silence of the connection shows. */
export interface LiveBeat {
  readonly type: 'beat';
  readonly revision: number;
  readonly at: number;
}

/** The server is going down on purpose. */
export interface LiveStopping {
  readonly type: 'stopping';
  readonly reason: string;
}

export type LiveMessage = LiveSnapshot | LiveChange | LiveBeat | LiveStopping;

/** First message of a dashboard; with a boot and revision it asks for what changed since. */
export interface LiveWatch {
  readonly type: 'watch';
  readonly boot?: string;
  readonly revision?: number;
}
