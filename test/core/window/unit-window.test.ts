import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { UnitWindow, type UnitWindowSettings } from '../../../core/window/unit-window.ts';
import { UnitOracle, unitsOf } from './unit-oracle.ts';
import { SourceNumbers, steps, type SentRecord, type Step } from './window-steps.ts';

/** Admits numbered records one by one, each announced with the following ones of the same size. */
function admit(window: UnitWindow, records: readonly SentRecord[]): void {
  for (const { source, sequence, of, nonconforming } of records) {
    window.admitRun(source, sequence, 1, of);
    window.admitConforming(of - nonconforming);
    for (let k = 0; k < nonconforming; k += 1) window.admitNonconforming();
  }
}

function late(window: UnitWindow, { source, sequence, of, nonconforming }: SentRecord): { inspected: number; nonconforming: number } {
  const places = Array.from({ length: nonconforming }, (_, k) => of - nonconforming + k);
  return window.insertLate({ source, sequence, records: 1, unitsPerRecord: of, places });
}

/** Runs the steps on the window and the oracle; `agree` is called after each. Returns the window. */
function run(settings: UnitWindowSettings, all: readonly Step[], agree: (window: UnitWindow, oracle: UnitOracle) => void): UnitWindow {
  let window = new UnitWindow(settings);
  const oracle = new UnitOracle(settings.size ?? Infinity);
  const numbers = new SourceNumbers();
  for (const step of all) {
    switch (step.kind) {
      case 'frame': {
        const records = numbers.number(step.source, step.records);
        numbers.sent.push(...records);
        admit(window, records);
        for (const { source, sequence, of, nonconforming } of records) oracle.admit(unitsOf(source, sequence, of, nonconforming));
        break;
      }
      case 'hole':
        numbers.holes.push(numbers.number(step.source, step.records));
        break;
      case 'fill': {
        const hole = numbers.holes.splice(step.choice % Math.max(1, numbers.holes.length), 1)[0] ?? [];
        numbers.sent.push(...hole);
        for (const record of hole) {
          const kept = oracle.late(unitsOf(record.source, record.sequence, record.of, record.nonconforming));
          expect(late(window, record)).toEqual({ inspected: kept.length, nonconforming: kept.filter((unit) => unit.nonconforming).length });
        }
        break;
      }
      case 'correct': {
        const record = numbers.sent[step.choice % Math.max(1, numbers.sent.length)];
        if (record === undefined) break;
        const size = oracle.units.find((unit) => unit.source === record.source && unit.sequence === record.sequence)?.of ?? record.of;
        const nonconforming = Math.round(step.share * (step.resize ?? size));
        const found = window.correct(record.source, record.sequence, nonconforming, step.resize);
        if (found === 'not here' && settings.reach !== undefined) break;
        expect(found).toEqual(oracle.correct(record.source, record.sequence, nonconforming, step.resize));
        break;
      }
      case 'clear':
        window.clear(numbers.newest);
        oracle.clear(numbers.newest);
        break;
      case 'store': {
        const stored = structuredClone(window.snapshot());
        window = new UnitWindow(settings);
        window.restore(stored);
        expect(window.snapshot()).toEqual(stored);
        break;
      }
    }
    agree(window, oracle);
  }
  return window;
}

/** Events of a list of units, counted apart. */
function eventsIn(oracle: UnitOracle, gap: number): number {
  const places = oracle.units.flatMap(({ nonconforming }, place) => (nonconforming ? [place] : []));
  return places.filter((place, k) => k === 0 || place - places[k - 1]! > gap).length;
}

function agreeInAll(window: UnitWindow, oracle: UnitOracle): void {
  expect(window.inspected).toBe(oracle.units.length);
  expect(window.nonconforming).toBe(oracle.nonconforming);
  expect(window.newestNonconforming(Infinity)).toEqual(oracle.strip());
  expect(window.ranges()).toEqual(oracle.ranges());
}

describe('a unit window', () => {
  it('[W1] of the last N units equals a list of units, whatever comes', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 40 }), steps, (size, all) => void run({ size }, all, agreeInAll)),
      { seed: 20_260_101, numRuns: 400 },
    );
  });

  it('[W1] counts nonconforming units within the gap of the one before as one event, whatever comes', () => {
    const settings = fc.record({ size: fc.option(fc.integer({ min: 1, max: 40 }), { nil: undefined }), gap: fc.integer({ min: 1, max: 12 }) });
    fc.assert(
      fc.property(settings, steps, ({ size, gap }, all) =>
        void run(size === undefined ? { gap } : { size, gap }, all, (window, oracle) => {
          agreeInAll(window, oracle);
          expect(window.events).toBe(eventsIn(oracle, gap));
        }),
      ),
      { seed: 20_260_107, numRuns: 400 },
    );
  });

  it('keeps events that were counted before their positions were forgotten', () => {
    const window = new UnitWindow({ reach: 2, gap: 3 });
    window.admitRun(0, 1, 40);
    for (const conforming of [5, 1, 0, 8, 2, 2, 4]) {
      window.admitConforming(conforming);
      window.admitNonconforming();
    }
    expect([window.nonconforming, window.events]).toEqual([7, 3]);
    const again = new UnitWindow({ reach: 2, gap: 3 });
    again.restore(structuredClone(window.snapshot()));
    expect(again.events).toBe(3);
  });

  it('that grows until it is cleared equals a list of units, whatever comes', () => {
    fc.assert(fc.property(steps, (all) => void run({}, all, agreeInAll)), { seed: 20_260_102, numRuns: 400 });
  });

  it('keeps exact counts beyond its reach, and corrects only what it still knows', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 6 }), steps, (reach, all) =>
        void run({ reach }, all, (window, oracle) => {
          expect(window.inspected).toBe(oracle.units.length);
          expect(window.nonconforming).toBe(oracle.nonconforming);
          expect(window.newestNonconforming(Infinity).length).toBeLessThanOrEqual(reach);
        }),
      ),
      { seed: 20_260_103, numRuns: 400 },
    );
  });

  it('goes on after a restart as if it had never stopped', () => {
    const settings = fc.record({ size: fc.integer({ min: 1, max: 40 }), reach: fc.integer({ min: 1, max: 6 }), grows: fc.boolean() });
    fc.assert(
      fc.property(settings, steps, ({ size, reach, grows }, all) => {
        const rule = grows ? { reach } : { size };
        const unbroken = all.filter(({ kind }) => kind !== 'store');
        expect(run(rule, all, () => {}).snapshot()).toEqual(run(rule, unbroken, () => {}).snapshot());
      }),
      { seed: 20_260_106, numRuns: 400 },
    );
  });

  it('is the same however the same units are split into runs', () => {
    const units = fc.array(fc.boolean(), { minLength: 1, maxLength: 60 });
    const cuts = fc.array(fc.integer({ min: 1, max: 9 }), { minLength: 60, maxLength: 60 });
    const size = fc.option(fc.integer({ min: 1, max: 30 }), { nil: undefined });
    fc.assert(
      fc.property(units, cuts, cuts, size, fc.integer({ min: 1, max: 30 }), (bad, runs, stretches, last, reach) => {
        const settings = last === undefined ? { reach } : { size: last };
        const singly = new UnitWindow(settings);
        bad.forEach((nonconforming, k) => {
          singly.admitRun(0, k + 1, 1);
          if (nonconforming) singly.admitNonconforming();
          else singly.admitConforming(1);
        });
        const split = new UnitWindow(settings);
        for (let at = 0, run = 0, stretch = 0; at < bad.length; run += 1) {
          const end = Math.min(bad.length, at + runs[run]!);
          split.admitRun(0, at + 1, end - at);
          while (at < end) {
            if (bad[at]) {
              split.admitNonconforming();
              at += 1;
              continue;
            }
            const nextBad = bad.indexOf(true, at);
            const conforming = Math.min(stretches[(stretch += 1) % 60]!, (nextBad < 0 || nextBad > end ? end : nextBad) - at);
            split.admitConforming(conforming);
            at += conforming;
          }
        }
        expect(split.snapshot()).toEqual(singly.snapshot());
      }),
      { seed: 20_260_104, numRuns: 300 },
    );
  });

  it('says after exactly how many units each nonconforming one leaves', () => {
    const window = new UnitWindow({ size: 10 });
    window.admitRun(0, 1, 30);
    window.admitConforming(2);
    window.admitNonconforming();
    window.admitConforming(1);
    window.admitNonconforming();
    expect([window.nextDeparture(), window.departureOf(2), window.departureOf(3)]).toEqual([8, 10, Infinity]);
    window.admitConforming(7);
    expect([window.nonconforming, window.full]).toEqual([2, true]);
    window.admitConforming(1);
    expect([window.nonconforming, window.nextDeparture()]).toEqual([1, 2]);
    window.admitConforming(17);
    expect([window.nonconforming, window.nextDeparture(), window.inspected]).toEqual([0, Infinity, 10]);
  });

  it('never tells of a departure while it grows', () => {
    const window = new UnitWindow();
    window.admitRun(0, 1, 1);
    window.admitNonconforming();
    expect([window.nextDeparture(), window.full]).toEqual([Infinity, false]);
  });

  it('does not count late records from before a restart', () => {
    const window = new UnitWindow({ size: 10 });
    window.admitRun(0, 1, 2);
    window.admitConforming(2);
    window.clear([[0, 8]]);
    expect(window.insertLate({ source: 0, sequence: 5, records: 2, unitsPerRecord: 1, places: [0] })).toEqual({ inspected: 0, nonconforming: 0 });
    expect(window.insertLate({ source: 0, sequence: 9, records: 2, unitsPerRecord: 1, places: [1] })).toEqual({ inspected: 2, nonconforming: 1 });
    expect(window.newestNonconforming(1)).toEqual([{ ago: 0, record: { source: 0, sequence: 10 } }]);
  });

  it('shows no trace of a hole once it is filled', () => {
    fc.assert(
      fc.property(fc.array(fc.boolean(), { minLength: 3, maxLength: 40 }), fc.nat(100), fc.integer({ min: 1, max: 6 }), (bad, draw, most) => {
        const records = bad.map((nonconforming, k) => ({ source: 0, sequence: k + 1, of: 1, nonconforming: nonconforming ? 1 : 0 }));
        const at = 1 + (draw % (bad.length - 2));
        const end = Math.min(bad.length - 1, at + most);
        const whole = new UnitWindow();
        admit(whole, records);
        const filled = new UnitWindow();
        admit(filled, [...records.slice(0, at), ...records.slice(end)]);
        const places = records.slice(at, end).flatMap(({ nonconforming }, k) => (nonconforming === 1 ? [k] : []));
        filled.insertLate({ source: 0, sequence: at + 1, records: end - at, unitsPerRecord: 1, places });
        expect(filled.snapshot()).toEqual(whole.snapshot());
      }),
      { seed: 20_260_105, numRuns: 300 },
    );
  });

  it('shows no trace of a correction that was taken back', () => {
    const window = new UnitWindow();
    window.admitRun(0, 1, 6, 4);
    for (let record = 0; record < 6; record += 1) {
      window.admitConforming(3);
      window.admitNonconforming();
    }
    const before = window.snapshot();
    expect(window.correct(0, 3, 5, 9)).toEqual({ before: 1, after: 5 });
    expect([window.inspected, window.nonconforming]).toEqual([29, 10]);
    window.correct(0, 3, 1, 4);
    expect(window.snapshot()).toEqual(before);
  });

  it('ignores late records older than the window even while a correction has left it short', () => {
    const window = new UnitWindow({ size: 10 });
    window.admitRun(0, 5, 3, 5);
    window.admitConforming(15);
    window.correct(0, 7, 0, 2);
    expect([window.inspected, window.full]).toEqual([7, false]);
    expect(window.insertLate({ source: 0, sequence: 2, records: 1, unitsPerRecord: 2, places: [] })).toEqual({ inspected: 0, nonconforming: 0 });
    expect(window.inspected).toBe(7);
  });

  it('[W2] no longer knows a record whose last units a correction took away', () => {
    const window = new UnitWindow({ size: 10 });
    window.admitRun(1, 1, 1, 6);
    window.admitConforming(6);
    window.admitRun(0, 1, 8);
    window.admitConforming(8);
    expect(window.correct(1, 1, 0, 3)).toEqual({ before: 0, after: 0 });
    expect([window.inspected, window.correct(1, 1, 0)]).toEqual([8, 'not here']);
    expect(window.insertLate({ source: 1, sequence: 2, records: 1, unitsPerRecord: 1, places: [] })).toEqual({ inspected: 0, nonconforming: 0 });
  });

  it('forgets the records that have left', () => {
    const window = new UnitWindow({ size: 100 });
    for (let sequence = 1; sequence <= 5_000; sequence += 1) {
      window.admitRun(sequence % 2, sequence, 1);
      window.admitConforming(1);
    }
    expect(window.byteLength).toBeLessThan(16 * 1_024);
  });

  it('lets the oldest units go when it is restored into a smaller window', () => {
    const window = new UnitWindow({ size: 10 });
    window.admitRun(0, 1, 9);
    window.admitNonconforming();
    window.admitConforming(8);
    const smaller = new UnitWindow({ size: 5 });
    smaller.restore(window.snapshot());
    expect([smaller.inspected, smaller.nonconforming]).toEqual([5, 0]);
    expect(smaller.ranges()).toEqual([{ source: 0, first: 5, last: 9 }]);
  });

  it('[W3] keeps 10,000,000 units at 100 per million in less than 32 KiB', () => {
    const window = new UnitWindow({ size: 10_000_000 });
    let [seed, most, sequence] = [7, 0, 1];
    for (let part = 0; part < 40_000; part += 1) {
      window.admitRun(0, sequence, 1_000);
      sequence += 1_000;
      seed = (seed * 48_271) % 2_147_483_647;
      const bad = seed % 10 === 0 ? 1 : 0;
      window.admitConforming(1_000 - bad);
      if (bad === 1) window.admitNonconforming();
      most = Math.max(most, window.byteLength);
    }
    expect(window.inspected).toBe(10_000_000);
    expect(window.nonconforming).toBeGreaterThan(900);
    expect(most).toBeLessThan(32 * 1_024);
  });

  it('refuses what it cannot mean', () => {
    expect(() => new UnitWindow({ size: 0 })).toThrow('size must be a whole number');
    expect(() => new UnitWindow({ reach: 1.5 })).toThrow('reach must be a whole number');
    expect(() => new UnitWindow({ size: Number.NaN })).toThrow('size must be a whole number');
    const window = new UnitWindow({ size: 3 });
    window.admitRun(0, 1, 2);
    expect(() => window.clear()).toThrow('between announced records');
    expect(() => window.insertLate({ source: 1, sequence: 1, records: 1, unitsPerRecord: 1, places: [] })).toThrow('between announced records');
    window.admitConforming(2);
    expect(() => window.correct(0, 1, 2)).toThrow('nonconforming must be 0 to 1');
    expect(() => window.correct(0, 1, Number.NaN)).toThrow('nonconforming must be 0 to 1');
    expect(() => window.admitConforming(1)).toThrow('fewer announced');
  });
});
