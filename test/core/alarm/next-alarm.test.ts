import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { AlarmState } from '../../../core/alarm/alarm.ts';
import { nextAlarm, type AlarmEvent } from '../../../core/alarm/next-alarm.ts';
import type { EpochMs } from '../../../core/units.ts';

const at = (ms: number): EpochMs => ms as EpochMs;
const acknowledge: AlarmEvent = { kind: 'acknowledge', acknowledgement: { by: 'Mette', at: at(5), note: '' } };
const gone: AlarmEvent = { kind: 'condition-gone', at: at(7) };
const back: AlarmEvent = { kind: 'condition-back', at: at(9) };
const after = (...events: AlarmEvent[]): AlarmState['kind'] => events.reduce<AlarmState>(nextAlarm, { kind: 'raised' }).kind;

describe('one occurrence of an alarm', () => {
  it('[A1] ends once it is acknowledged and back to normal, in either order', () => {
    expect(after(acknowledge)).toBe('acknowledged');
    expect(after(gone)).toBe('returned');
    expect(after(acknowledge, gone)).toBe('ended');
    expect(after(gone, acknowledge)).toBe('ended');
  });

  it('[A2] is raised again, unacknowledged, when its condition comes back after it returned', () => {
    expect(after(gone, back)).toBe('raised');
    expect(after(acknowledge, back)).toBe('acknowledged');
  });

  it('never leaves its end, and is never both acknowledged and unacknowledged', () => {
    const events = fc.array(fc.constantFrom(acknowledge, gone, back), { maxLength: 12 });
    fc.assert(
      fc.property(events, (happened) => {
        let state: AlarmState = { kind: 'raised' };
        for (const event of happened) {
          const next = nextAlarm(state, event);
          if (state.kind === 'ended') expect(next).toBe(state);
          expect('acknowledgement' in next).toBe(next.kind === 'acknowledged' || next.kind === 'ended');
          state = next;
        }
      }),
      { seed: 41, numRuns: 300 },
    );
  });
});
