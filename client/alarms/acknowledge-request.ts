import type { Alarm } from '../../core/alarm/alarm.ts';

/** A person wants to acknowledge an alarm; the app asks for the name when it knows none, or for a note when wished. */
export class AcknowledgeRequest extends Event {
  static readonly type = 'vouchline-acknowledge';
  readonly alarm: Alarm;
  readonly withNote: boolean;

  constructor(alarm: Alarm, withNote = false) {
    super(AcknowledgeRequest.type, { bubbles: true, composed: true });
    this.alarm = alarm;
    this.withNote = withNote;
  }
}
