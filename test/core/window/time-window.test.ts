import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { endOfStep, wholeSteps } from '../../../core/window/time-steps.ts';
import { TimeWindow } from '../../../core/window/time-window.ts';
import { joinedRanges } from '../../../core/window/record-identity.ts';
import { timeAt, type TimeColumn } from '../../../core/record/time-column.ts';
import { SourceNumbers, steps, type SentRecord, type Step } from './window-steps.ts';

const stepMs = 10;

interface Timed extends SentRecord {
  readonly at: number;
}

/** Admits one record; verdicts and tallies alike. */
function admit(window: TimeWindow, { at, source, sequence, of, nonconforming }: Timed): boolean {
  return nonconforming > 0
    ? window.admitNonconforming(at, source, sequence, nonconforming, of)
    : window.admitConforming(at, source, sequence, 1, of);
}

/** Runs the steps on a window and on a plain list of records. Times wander: mostly on, at times back. Returns the window. */
function run(whole: number, reach: number | undefined, all: readonly Step[], wander: readonly number[], exact: boolean, stores = true): TimeWindow {
  const settings = { spanMs: whole * stepMs, stepMs, ...(reach === undefined ? {} : { reach }) };
  let window = new TimeWindow(settings);
  let kept: Timed[] = [];
  let floors = new Map<number, number>();
  let [clock, newest, drawn] = [1_000, 0, 0];
  const numbers = new SourceNumbers();
  const inside = (at: number): boolean => Math.floor(at / stepMs) >= Math.floor(newest / stepMs) - whole;
  const take = (record: SentRecord): void => {
    clock = Math.max(0, clock + wander[(drawn += 1) % wander.length]!);
    const timed = { ...record, at: clock };
    newest = Math.max(newest, clock);
    kept = kept.filter(({ at }) => inside(at));
    const counts = inside(clock) && record.sequence > (floors.get(record.source) ?? 0);
    expect(admit(window, timed)).toBe(counts);
    if (counts) kept.push(timed);
  };
  for (const step of all) {
    switch (step.kind) {
      case 'frame': {
        const records = numbers.number(step.source, step.records);
        numbers.sent.push(...records);
        records.forEach(take);
        break;
      }
      case 'hole':
        numbers.holes.push(numbers.number(step.source, step.records));
        break;
      case 'fill': {
        const hole = numbers.holes.splice(step.choice % Math.max(1, numbers.holes.length), 1)[0] ?? [];
        numbers.sent.push(...hole);
        hole.forEach(take);
        break;
      }
      case 'correct': {
        const record = numbers.sent[step.choice % Math.max(1, numbers.sent.length)];
        if (record === undefined) break;
        const at = kept.findIndex(({ source, sequence }) => source === record.source && sequence === record.sequence);
        const old = kept[at];
        const of = step.resize ?? old?.of ?? record.of;
        const nonconforming = Math.round(step.share * of);
        const found = window.correct(record.source, record.sequence, nonconforming, step.resize);
        if (found === 'not here' && !exact) break;
        expect(found).toEqual(old === undefined ? 'not here' : { before: old.nonconforming, after: nonconforming });
        if (old !== undefined) kept[at] = { ...old, of, nonconforming };
        break;
      }
      case 'clear':
        window.clear(numbers.newest);
        kept = [];
        floors = new Map(numbers.newest);
        break;
      case 'store': {
        if (stores) {
          const stored = structuredClone(window.snapshot());
          window = new TimeWindow(settings);
          window.restore(stored);
          expect(window.snapshot()).toEqual(stored);
        }
        newest += 3;
        window.advance(newest);
        kept = kept.filter(({ at }) => inside(at));
        break;
      }
    }
    expect(window.inspected).toBe(kept.reduce((sum, { of }) => sum + of, 0));
    expect(window.nonconforming).toBe(kept.reduce((sum, record) => sum + record.nonconforming, 0));
    if (exact) agreeInRecords(window, kept, whole);
    else expect(window.newestNonconforming(Infinity).length).toBeLessThanOrEqual(reach ?? Infinity);
  }
  return window;
}

function agreeInRecords(window: TimeWindow, kept: readonly Timed[], whole: number): void {
  const bySequence = kept.toSorted((a, b) => a.source - b.source || a.sequence - b.sequence);
  expect(window.ranges()).toEqual(joinedRanges(bySequence.map(({ source, sequence }) => ({ source, first: sequence, last: sequence }))));
  const startOf = (at: number): number => Math.floor(at / stepMs) * stepMs;
  const marked = bySequence.filter(({ nonconforming }) => nonconforming > 0).toSorted((a, b) => startOf(a.at) - startOf(b.at));
  expect(window.newestNonconforming(Infinity)).toEqual(
    marked.map(({ at, source, sequence, nonconforming }) => ({ stepAt: startOf(at), record: { source, sequence }, nonconforming })).reverse(),
  );
  const leaving = marked.flatMap(({ at, nonconforming }) => Array.from({ length: nonconforming }, () => startOf(at) + (whole + 1) * stepMs));
  expect([1, 2, 5].map((d) => window.departureOf(d))).toEqual([1, 2, 5].map((d) => leaving[d - 1] ?? Infinity));
}

const wander = fc.array(fc.integer({ min: -12, max: 15 }), { minLength: 5, maxLength: 30 });
const wholes = fc.integer({ min: 1, max: 8 });

describe('a time window', () => {
  it('equals a list of records, whatever comes', () => {
    fc.assert(fc.property(wholes, steps, wander, (whole, all, times) => void run(whole, undefined, all, times, true)), {
      seed: 20_260_111,
      numRuns: 400,
    });
  });

  it('keeps exact counts beyond its reach, and corrects only what it still knows', () => {
    fc.assert(fc.property(wholes, fc.integer({ min: 1, max: 8 }), steps, wander, (whole, reach, all, times) => void run(whole, reach, all, times, false)), {
      seed: 20_260_112,
      numRuns: 300,
    });
  });

  it('goes on after a restart as if it had never stopped', () => {
    fc.assert(
      fc.property(wholes, fc.integer({ min: 1, max: 8 }), steps, wander, (whole, reach, all, times) => {
        const [stored, unbroken] = [true, false].map((stores) => run(whole, reach, all, times, false, stores).snapshot());
        expect(stored).toEqual(unbroken);
      }),
      { seed: 20_260_115, numRuns: 250 },
    );
  });

  it('is the same in whatever order and pieces the records of a span come', () => {
    const order = fc.shuffledSubarray(Array.from({ length: 30 }, (_, k) => k), { minLength: 30 });
    fc.assert(
      fc.property(order, fc.array(fc.boolean(), { minLength: 30, maxLength: 30 }), (places, bad) => {
        const records = bad.map((nonconforming, k) => ({ at: 500 + 3 * k, source: k % 2, sequence: 1 + k / 2 - (k % 2) / 2, of: 1, nonconforming: nonconforming ? 1 : 0 }));
        const snapshots = [records, places.map((k) => records[k]!)].map((arrivals) => {
          const window = new TimeWindow({ spanMs: 200, stepMs });
          window.advance(600);
          for (const record of arrivals) admit(window, record);
          return window.snapshot();
        });
        expect(snapshots[1]).toEqual(snapshots[0]);
      }),
      { seed: 20_260_113, numRuns: 300 },
    );
  });

  it('covers its whole steps and the present one, and no more', () => {
    const window = new TimeWindow({ spanMs: 30, stepMs });
    window.admitNonconforming(1_009, 0, 1);
    window.admitConforming(1_015, 0, 2, 4);
    expect([window.inspected, window.nonconforming, window.departureOf(1)]).toEqual([5, 1, 1_040]);
    window.advance(1_039);
    expect([window.inspected, window.nonconforming, window.since]).toEqual([5, 1, 1_000]);
    window.advance(1_040);
    expect([window.inspected, window.nonconforming, window.since]).toEqual([4, 0, 1_010]);
    expect(window.admitConforming(1_009, 0, 6, 1)).toBe(false);
    window.advance(99_000);
    expect([window.inspected, window.departureOf(1)]).toEqual([0, Infinity]);
  });

  it('refuses what it cannot mean', () => {
    expect(() => wholeSteps({ spanMs: 25, stepMs: 10 })).toThrow('whole steps of stepMs');
    expect(() => wholeSteps({ spanMs: 10, stepMs: 0 })).toThrow('whole steps of stepMs');
    expect(() => wholeSteps({ spanMs: 1e9, stepMs: 1 })).toThrow('whole steps of stepMs');
    const window = new TimeWindow({ spanMs: 30, stepMs });
    window.admitConforming(1_000, 0, 1, 1);
    expect(() => window.correct(0, 1, 2)).toThrow('nonconforming must be 0 to 1');
  });
});

describe('the parts of a time window', () => {
  it('are equal, cover it to the end of the present step, and hold what it holds', () => {
    const window = new TimeWindow({ spanMs: 70, stepMs: 10 });
    window.admitConforming(935, 0, 1, 5);
    window.admitNonconforming(941, 0, 6, 2, 3);
    window.admitConforming(1_000, 0, 7, 4);
    window.admitNonconforming(1_007, 0, 11);
    expect(window.parts(100)).toEqual({ from: 930, stepMs: 10, inspected: [5, 3, 0, 0, 0, 0, 0, 5], nonconforming: [0, 2, 0, 0, 0, 0, 0, 1] });
    expect(window.parts(3)).toEqual({ from: 920, stepMs: 30, inspected: [8, 0, 5], nonconforming: [2, 0, 1] });
    expect(window.parts(1)).toEqual({ from: 930, stepMs: 80, inspected: [13], nonconforming: [3] });
  });
});

describe('the end of a step', () => {
  it('is where the first record of another step stands', () => {
    const steady = fc
      .record({
        start: fc.integer({ min: 0, max: 100 }),
        step: fc.oneof(fc.double({ min: 0, max: 8, noNaN: true }), fc.tuple(fc.nat(40), fc.integer({ min: 1, max: 60 })).map(([p, q]) => p / q)),
      })
      .map(({ start, step }): TimeColumn => ({ kind: 'steady', start, step }));
    const each = fc
      .array(fc.integer({ min: 0, max: 40 }), { minLength: 200, maxLength: 200 })
      .map((times): TimeColumn => ({ kind: 'each', times: Float64Array.from(times) }));
    fc.assert(
      fc.property(fc.oneof(steady, each), fc.integer({ min: 0, max: 199 }), (time, from) => {
        const step = (index: number): number => Math.floor(timeAt(time, index) / stepMs);
        const other = Array.from({ length: 200 }, (_, k) => k).find((k) => k > from && step(k) !== step(from)) ?? 200;
        expect(endOfStep(time, from, 200, stepMs)).toBe(other);
      }),
      { seed: 20_260_114, numRuns: 2_000 },
    );
  });
});
