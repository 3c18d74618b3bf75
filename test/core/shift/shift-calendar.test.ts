import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Shift } from '../../../core/plant/plant.ts';
import { ShiftCalendar } from '../../../core/shift/shift-calendar.ts';
import type { EpochMs } from '../../../core/units.ts';

const everyDay = [1, 2, 3, 4, 5, 6, 7];
const shift = (name: string, from: number, to: number, days: readonly number[] = everyDay): Shift => ({
  name,
  days,
  fromMinute: from * 60,
  toMinute: to * 60,
});
const threeShifts = [shift('early', 6, 14), shift('late', 14, 22), shift('night', 22, 6)];
const ms = (text: string): EpochMs => Date.parse(text) as EpochMs;
const hours = (calendar: ShiftCalendar, at: string): readonly [string | undefined, number] => {
  const found = calendar.instanceAt(ms(at));
  return [found?.name, found === undefined ? 0 : (found.until - found.since) / 3_600_000];
};

/** Dates of the changes: IANA time zone database as shipped with the platform; each checked against it below. */
const nights: readonly (readonly [zone: string, at: string, hours: number])[] = [
  ['Europe/Copenhagen', '2026-03-28T23:00:00Z', 7],
  ['Europe/Copenhagen', '2026-10-25T00:30:00Z', 9],
  ['Europe/Copenhagen', '2026-06-10T23:00:00Z', 8],
  ['America/New_York', '2026-03-08T05:00:00Z', 7],
  ['America/New_York', '2026-11-01T05:30:00Z', 9],
  ['Australia/Lord_Howe', '2026-10-03T14:00:00Z', 7.5],
  ['Australia/Lord_Howe', '2026-04-04T14:00:00Z', 8.5],
];

describe('shift calendar', () => {
  it.each(nights)('night shift in %s around %s lasts %d hours', (zone, at, wanted) => {
    expect(hours(new ShiftCalendar(threeShifts, zone), at)).toEqual(['night', wanted]);
  });

  it('a moment on the border belongs to the shift that begins', () => {
    const calendar = new ShiftCalendar(threeShifts, 'Europe/Copenhagen');
    expect(calendar.instanceAt(ms('2026-06-10T04:00:00Z'))?.name).toBe('early');
    expect(calendar.instanceAt(ms('2026-06-10T03:59:59.999Z'))?.name).toBe('night');
  });

  it('a border at a skipped local time is the moment of the change', () => {
    const calendar = new ShiftCalendar([{ ...shift('a', 22, 2), toMinute: 150 }, { ...shift('b', 2, 6), fromMinute: 150 }], 'Europe/Copenhagen');
    expect(calendar.instanceAt(ms('2026-03-29T00:59:59Z'))?.name).toBe('a');
    expect(calendar.instanceAt(ms('2026-03-29T01:00:00Z'))).toEqual({
      name: 'b',
      since: ms('2026-03-29T01:00:00Z'),
      until: ms('2026-03-29T04:00:00Z'),
    });
  });

  it('a border at a repeated local time is its first occurrence', () => {
    const calendar = new ShiftCalendar([{ ...shift('a', 22, 2), toMinute: 150 }, { ...shift('b', 2, 6), fromMinute: 150 }], 'Europe/Copenhagen');
    expect(calendar.instanceAt(ms('2026-10-25T00:29:59Z'))?.name).toBe('a');
    expect(calendar.instanceAt(ms('2026-10-25T00:30:00Z'))?.name).toBe('b');
    expect(calendar.instanceAt(ms('2026-10-25T01:30:00Z'))?.name).toBe('b');
  });

  it('a shift whose whole span is skipped does not take place', () => {
    // Pacific/Apia left out 30 December 2011 altogether
    const calendar = new ShiftCalendar([shift('day', 8, 16)], 'Pacific/Apia');
    const begun = new Set<number>();
    for (let at = ms('2011-12-29T00:00:00Z'); at < ms('2012-01-01T00:00:00Z'); at = (at + 600_000) as EpochMs) {
      const found = calendar.instanceAt(at);
      if (found !== undefined) begun.add(found.since);
    }
    expect([...begun].map((since) => new Date(since).toISOString())).toEqual([
      '2011-12-28T18:00:00.000Z',
      '2011-12-29T18:00:00.000Z',
      '2011-12-30T18:00:00.000Z',
      '2011-12-31T18:00:00.000Z',
    ]);
  });

  it('there is no shift on a day off, and none at all without shifts', () => {
    const weekdays = new ShiftCalendar([shift('day', 6, 18, [1, 2, 3, 4, 5])], 'Europe/Copenhagen');
    expect(weekdays.instanceAt(ms('2026-06-13T10:00:00Z'))).toBeUndefined();
    expect(weekdays.instanceAt(ms('2026-06-12T10:00:00Z'))?.name).toBe('day');
    expect(new ShiftCalendar([], 'Europe/Copenhagen').instanceAt(ms('2026-06-12T10:00:00Z'))).toBeUndefined();
  });

  it('a shift from a time to the same time lasts the whole day', () => {
    expect(hours(new ShiftCalendar([shift('all day', 6, 6)], 'America/New_York'), '2026-03-08T00:00:00Z')).toEqual(['all day', 23]);
  });
});

const zones = ['Europe/Copenhagen', 'America/New_York', 'Australia/Lord_Howe', 'Asia/Kolkata'];

/** Wall clock of a zone at a moment as minutes, the local date and time read as if it were UTC; by Intl alone. */
function wallMinutes(zone: string): (at: number) => number {
  const format = new Intl.DateTimeFormat('en-US', {
    timeZone: zone, hourCycle: 'h23', year: 'numeric', month: 'numeric', day: 'numeric', hour: 'numeric', minute: 'numeric',
  });
  return (at) => {
    const parts = new Map(format.formatToParts(at).map((part) => [part.type, Number(part.value)]));
    const of = (type: Intl.DateTimeFormatPartTypes): number => parts.get(type) ?? Number.NaN;
    return Date.UTC(of('year'), of('month') - 1, of('day'), of('hour'), of('minute')) / 60_000;
  };
}

/** The roster by walking the wall clock in steps: the first step at which it shows each border or later. */
function walkedInstances(shifts: readonly Shift[], zone: string, from: number, steps: number, stepMs: number): [string, number, number][] {
  const wall = wallMinutes(zone);
  const walls = Array.from({ length: steps }, (_, at) => wall(from + at * stepMs));
  const firstAt = (minutes: number): number => from + walls.findIndex((shown) => shown >= minutes) * stepMs;
  const firstDay = Math.floor(walls[0]! / 1440);
  const found: [string, number, number][] = [];
  for (let day = firstDay + 1; day < firstDay + steps * stepMs / 86_400_000 - 2; day += 1) {
    const weekday = ((day + 3) % 7) + 1; // day 0, 1970-01-01, was a Thursday
    for (const { name, days, fromMinute, toMinute } of shifts) {
      if (!days.includes(weekday)) continue;
      const until = day * 1440 + toMinute + (toMinute > fromMinute ? 0 : 1440);
      const instance: [string, number, number] = [name, firstAt(day * 1440 + fromMinute), firstAt(until)];
      if (instance[1] < instance[2]) found.push(instance);
    }
  }
  return found.sort((a, b) => a[1] - b[1]);
}

const borders = fc.uniqueArray(fc.integer({ min: 0, max: 287 }), { minLength: 1, maxLength: 4 }).map((some) => some.sort((a, b) => a - b).map((at) => at * 5));
const rosters = fc.tuple(borders, fc.array(fc.boolean(), { minLength: 4, maxLength: 4 })).map(([at, worked]) =>
  at.flatMap((fromMinute, index): Shift[] =>
    worked[index] ? [{ name: `shift ${index}`, days: everyDay, fromMinute, toMinute: at[(index + 1) % at.length]! }] : [],
  ),
);
const changes = ['2026-03-08', '2026-03-29', '2026-04-05', '2026-10-04', '2026-10-25', '2026-11-01', '2026-07-01'];

describe('shift calendar against a walked wall clock', () => {
  it('finds the same shifts, without overlap, around clock changes', () => {
    fc.assert(
      fc.property(rosters, fc.constantFrom(...zones), fc.constantFrom(...changes), (roster, zone, day) => {
        const from = ms(`${day}T00:00:00Z`) - 3 * 86_400_000;
        const stepMs = 300_000;
        const walked = walkedInstances(roster, zone, from, 6 * 288, stepMs);
        const calendar = new ShiftCalendar(roster, zone);
        for (const [at, [name, since, until]] of walked.entries()) {
          expect(until).toBeLessThanOrEqual(walked[at + 1]?.[1] ?? Infinity);
          for (const moment of [since, until - 1, (since + until) / 2]) {
            expect(calendar.instanceAt(moment as EpochMs)).toEqual({ name, since, until });
          }
          const next = walked[at + 1];
          if (next !== undefined && next[1] > until) expect(calendar.instanceAt(until as EpochMs)).toBeUndefined();
        }
      }),
      { seed: 20260601, numRuns: 30 },
    );
  });

  it('answers the same in any order of asking', () => {
    const moments = fc.array(fc.integer({ min: 0, max: 400 * 24 }), { minLength: 2, maxLength: 30 });
    fc.assert(
      fc.property(moments, fc.constantFrom(...zones), (at, zone) => {
        const kept = new ShiftCalendar(threeShifts, zone);
        for (const hour of at) {
          const moment = (ms('2026-01-01T00:00:00Z') + hour * 3_600_000) as EpochMs;
          expect(kept.instanceAt(moment)).toEqual(new ShiftCalendar(threeShifts, zone).instanceAt(moment));
        }
      }),
      { seed: 20260602, numRuns: 12 },
    );
  });
});
