import { describe, expect, it } from 'vitest';
import type { Alarm } from '../../../core/alarm/alarm.ts';
import type { LiveChange } from '../../../core/live/message.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import type { EpochMs } from '../../../core/units.ts';
import { LiveBoard } from '../../../server/live/live-board.ts';

const at = 1_764_547_200_000 as EpochMs;

const alarm: Alarm = {
  id: 7, guarantee: 'leak-A', rule: 'crossing', priority: 'medium', safetyRelevant: true, raisedAt: at, times: 1,
  state: { kind: 'raised' }, response: 'Hold the lot.',
  grounds: {
    source: 'leak-tester', sequence: 301, plantVersion: 'v', method: 'exact binomial', methodVersion: 1, lookRule: 'one look',
    figures: {}, records: [], sentence: 'The bound crossed its guarantee line.',
  },
};

const evidence: Happening = {
  kind: 'evidence', at, guarantee: 'leak-A', from: 'demonstrated', to: 'undecided', source: 'leak-tester', sequence: 301, figures: {},
};

describe('alarms on the live board', () => {
  it('are there as soon as they are noted, without a refresh, and say when', () => {
    const board = new LiveBoard({ boot: 'b', clockRate: 1, demo: false });
    const known = board.revision;
    expect(board.note([evidence, { kind: 'alarm', at, change: 'raised', alarm }], at + 5)).toBe(true);
    const change = JSON.parse(board.since(known)) as LiveChange;
    expect(change.alarms.map(({ id }) => id)).toEqual([7]);
    expect(change.at).toBe(at + 5);
  });

  it('are the only happenings that ask to be sent at once', () => {
    const board = new LiveBoard({ boot: 'b', clockRate: 1, demo: false });
    const known = board.revision;
    expect(board.note([evidence], at)).toBe(false);
    expect(board.note([], at)).toBe(false);
    expect(board.revision).toBe(known);
  });
});
