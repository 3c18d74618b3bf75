import type { Act } from '../monitor/act.ts';
import type { Change } from './change.ts';

/**
 * The record of a person's act that took effect; undefined for acts of a source's upload, which change no meaning.
 *
 * @param entry id of the journal entry that keeps the act
 */
export function changeOfAct(act: Act, entry: number): Change | undefined {
  switch (act.kind) {
    case 'acknowledge':
      return { kind: 'acknowledge', who: act.by, what: `alarm ${act.alarm}`, before: 'unacknowledged', after: 'acknowledged', why: act.note, entry };
    case 'restart':
      return { kind: 'restart', who: act.by, what: `guarantee ${act.guarantee}`, before: null, after: 'evidence gathered anew', why: act.reason, entry };
    case 'upload-begun':
    case 'upload-ended':
      return undefined;
  }
}
