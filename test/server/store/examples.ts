import type { Alarm, AlarmState } from '../../../core/alarm/alarm.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import type { EpochMs } from '../../../core/units.ts';
import type { Entry } from '../../../server/store/entry.ts';
import type { Group, Minute } from '../../../server/store/group.ts';

/** 2026-03-02 06:00 UTC: the early shift of hose line A begins. */
export const morning = Date.UTC(2026, 2, 2, 6) as EpochMs;

export function entry(id: number, changes: Partial<Entry> = {}): Entry {
  const body = new Uint8Array(20 + (id % 7)).map((_, place) => (place * 31 + id) % 256);
  return { id, at: morning + id, kind: 'frame', sourceId: 1 + (id % 3), firstSequence: id * 1_000 + 1, records: 1_000, body, ...changes };
}

export function group(changes: Partial<Group> = {}): Group {
  return { entries: [], happenings: [], alarms: [], minutes: [], changes: [], ...changes };
}

export function entries(from: number, to: number): Entry[] {
  return Array.from({ length: to - from + 1 }, (_, place) => entry(from + place));
}

export function minute(guarantee: string, ofShift: number, changes: Partial<Minute> = {}): Minute {
  return {
    guarantee,
    at: morning + ofShift * 60_000,
    inspected: 100,
    nonconforming: 1,
    estimate: 0.01,
    bound: 0.02,
    opposite: undefined,
    state: 'undecided',
    ...changes,
  };
}

export function evidence(guarantee: string, at: number): Happening {
  return {
    kind: 'evidence',
    at: at as EpochMs,
    guarantee,
    from: 'gathering',
    to: 'demonstrated',
    source: 'leak-tester-a',
    sequence: 4_711,
    figures: { inspected: 10_000, nonconforming: 0 },
  };
}

export function alarm(id: number, state: AlarmState = { kind: 'raised' }): Alarm {
  return {
    id,
    guarantee: 'leak-a',
    rule: 'crossing',
    priority: 'medium',
    safetyRelevant: true,
    raisedAt: morning,
    times: 1,
    state,
    response: 'Check the crimp head.',
    grounds: {
      source: 'leak-tester-a',
      sequence: 4_711,
      plantVersion: 'f00d',
      method: 'nonconforming fraction, exact',
      methodVersion: 1,
      lookRule: 'one look',
      figures: { inspected: 10_000, nonconforming: 7 },
      records: [{ source: 'leak-tester-a', first: 1, last: 10_000 }],
      sentence: 'The bound crossed its guarantee line.',
    },
  };
}

export const ended: AlarmState = { kind: 'ended', returnedAt: (morning + 5) as EpochMs, acknowledgement: { by: 'Ines', at: (morning + 9) as EpochMs, note: 'die changed' } };
