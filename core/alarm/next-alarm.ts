import type { EpochMs } from '../units.ts';
import type { Acknowledgement, AlarmState } from './alarm.ts';

/** What can happen to one occurrence of an alarm. */
export type AlarmEvent =
  | { readonly kind: 'condition-back'; readonly at: EpochMs }
  | { readonly kind: 'condition-gone'; readonly at: EpochMs }
  | { readonly kind: 'acknowledge'; readonly acknowledgement: Acknowledgement };

/**
 * The next state of one occurrence of an alarm (rules A1 to A5). An event that changes nothing gives the same
 * object back, so `===` tells whether anything happened.
 *
 * @source states and transitions after IEC 62682:2014, alarm state transition diagram (from memory)
 */
export function nextAlarm(state: AlarmState, event: AlarmEvent): AlarmState {
  switch (event.kind) {
    case 'acknowledge':
      return acknowledged(state, event.acknowledgement);
    case 'condition-gone':
      return gone(state, event.at);
    case 'condition-back':
      return state.kind === 'returned' ? { kind: 'raised' } : state;
  }
}

function acknowledged(state: AlarmState, acknowledgement: Acknowledgement): AlarmState {
  switch (state.kind) {
    case 'raised':
      return { kind: 'acknowledged', acknowledgement };
    case 'returned':
      return { kind: 'ended', returnedAt: state.returnedAt, acknowledgement };
    case 'acknowledged':
    case 'ended':
      return state;
  }
}

function gone(state: AlarmState, at: EpochMs): AlarmState {
  switch (state.kind) {
    case 'raised':
      return { kind: 'returned', returnedAt: at };
    case 'acknowledged':
      return { kind: 'ended', returnedAt: at, acknowledgement: state.acknowledgement };
    case 'returned':
    case 'ended':
      return state;
  }
}
