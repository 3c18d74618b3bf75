import { describe, expect, it } from 'vitest';
import type { Alarm } from '../../../core/alarm/alarm.ts';
import type { LiveChange } from '../../../core/live/message.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import { Monitor } from '../../../core/monitor/monitor.ts';
import { readPlant } from '../../../core/plant/read-plant.ts';
import type { EpochMs } from '../../../core/units.ts';
import { LiveBoard } from '../../../server/live/live-board.ts';
import { leakPlant } from '../plants.ts';

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

describe('views on the live board', () => {
  const one = leakPlant.slice(leakPlant.indexOf('  - id: leak-A'));
  const read = readPlant(leakPlant + Array.from({ length: 39 }, (_, i) => one.replace('leak-A', `leak-${i}`)).join(''), 'v');
  if (!read.ok) throw new Error(read.fault[0]?.sentence);
  const { plant } = read.value;
  const viewsOf = (message: string): number => (JSON.parse(message) as LiveChange).views.length;
  function begun(): { board: LiveBoard; monitor: Monitor } {
    const board = new LiveBoard({ boot: 'b', clockRate: 1, demo: false });
    const monitor = new Monitor(plant, 'v');
    board.begin(monitor);
    return { board, monitor };
  }

  it('are computed a few at a time; what is sent in between holds those there are, and the rest follows', () => {
    const { board, monitor } = begun();
    const known = board.revision;
    const steps = board.refreshing(monitor, at);
    expect([steps.next().done, viewsOf(board.since(known))]).toEqual([false, 16]);
    const between = board.revision;
    board.note([{ kind: 'alarm', at, change: 'raised', alarm }], at);
    expect((JSON.parse(board.since(between)) as LiveChange).alarms).toHaveLength(1);
    expect([steps.next().done, viewsOf(board.since(between)), viewsOf(board.since(known))]).toEqual([false, 16, 32]);
    expect([steps.next().done, viewsOf(board.since(between)), viewsOf(board.since(known))]).toEqual([true, 24, 40]);
    const after = board.revision;
    expect([board.refreshing(monitor, at + 1).next().done, board.revision]).toEqual([true, after]);
  });

  it('of a plant file that is no more in force are none', () => {
    const { board, monitor } = begun();
    const steps = board.refreshing(monitor, at);
    steps.next();
    const anew = new Monitor(plant, 'w');
    board.begin(anew);
    expect(steps.next().done).toBe(true);
    expect((JSON.parse(board.snapshot()) as { views: object[] }).views).toEqual([]);
  });
});
