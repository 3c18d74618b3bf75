import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ExposureSum } from '../../../core/window/exposure-sum.ts';
import { joinedRanges, type RecordRange } from '../../../core/window/record-identity.ts';
import { RecordTimeWindow } from '../../../core/window/record-time-window.ts';
import { RecordWindow } from '../../../core/window/record-window.ts';
import { SourceNumbers, steps, type SentRecord, type Step } from './window-steps.ts';

/** A record as the record windows see it: the draw's nonconforming units as count, its units as exposure in metres. */
interface Counted extends SentRecord {
  readonly at: number;
}

const lengthM = (of: number): number => of * 1.1;
const rangesOf = (kept: readonly SentRecord[]): RecordRange[] =>
  joinedRanges(
    kept.toSorted((a, b) => a.source - b.source || a.sequence - b.sequence).map(({ source, sequence }) => ({ source, first: sequence, last: sequence })),
  );

function expectSum(sum: ExposureSum, kept: readonly SentRecord[]): void {
  expect(sum.records).toBe(kept.length);
  expect(sum.count).toBe(kept.reduce((count, { nonconforming }) => count + nonconforming, 0));
  const exposure = kept.reduce((length, { of }) => length + lengthM(of), 0);
  expect(Math.abs(sum.exposure - exposure)).toBeLessThanOrEqual(1e-12 * exposure);
}

/** What both kinds of window can do with numbered records; `kept` is the plain list they are held against. */
interface Trial {
  kept: Counted[];
  admit(records: readonly Counted[]): void;
  late(records: readonly Counted[], floor: number): void;
  /** What the window found, and where the record stands in the list (-1: nowhere). */
  correct(record: SentRecord, count: number, lengthM: number): unknown;
  clear(seen: ReadonlyMap<number, number>): void;
  store(): void;
  agree(): void;
}

function run(trial: Trial, all: readonly Step[], wander: readonly number[], exact: boolean): void {
  const numbers = new SourceNumbers();
  let floors = new Map<number, number>();
  let [clock, drawn] = [1_000, 0];
  const timed = (records: readonly SentRecord[]): Counted[] =>
    records.map((record) => ({ ...record, at: (clock = Math.max(0, clock + wander[(drawn += 1) % wander.length]!)) }));
  for (const step of all) {
    switch (step.kind) {
      case 'frame': {
        const records = numbers.number(step.source, step.records);
        numbers.sent.push(...records);
        trial.admit(timed(records));
        break;
      }
      case 'hole':
        numbers.holes.push(numbers.number(step.source, step.records));
        break;
      case 'fill': {
        const hole = numbers.holes.splice(step.choice % Math.max(1, numbers.holes.length), 1)[0];
        if (hole === undefined) break;
        numbers.sent.push(...hole);
        trial.late(timed(hole), floors.get(hole[0]!.source) ?? 0);
        break;
      }
      case 'correct': {
        const record = numbers.sent[step.choice % Math.max(1, numbers.sent.length)];
        if (record === undefined) break;
        const of = step.resize ?? record.of;
        const count = Math.round(step.share * 9);
        const at = trial.kept.findIndex(({ source, sequence }) => source === record.source && sequence === record.sequence);
        const old = trial.kept[at];
        const found = trial.correct(record, count, lengthM(of));
        if (found === 'not here' && !exact) break;
        const before = old === undefined ? undefined : { a: old.nonconforming, b: lengthM(old.of) };
        expect(found).toEqual(before === undefined ? 'not here' : { before, after: { a: count, b: lengthM(of) } });
        if (old !== undefined) trial.kept[at] = { ...old, of, nonconforming: count };
        break;
      }
      case 'clear':
        trial.clear(numbers.newest);
        floors = new Map(numbers.newest);
        break;
      case 'store':
        trial.store();
        break;
    }
    trial.agree();
  }
}

class RecordTrial implements Trial {
  kept: Counted[] = [];
  rolled = false;
  sum = new ExposureSum();
  readonly settings: { readonly width: 2; readonly size?: number; readonly reach?: number };
  readonly stores: boolean;
  window: RecordWindow;

  constructor(settings: { readonly size?: number; readonly reach?: number }, stores = true) {
    this.settings = { width: 2, ...settings };
    this.stores = stores;
    this.window = new RecordWindow(this.settings, this.sum);
  }

  admit(records: readonly Counted[]): void {
    this.window.admitRun(records[0]!.source, records[0]!.sequence, records.length);
    for (const { nonconforming, of } of records) this.window.admit(nonconforming, lengthM(of));
    this.kept.push(...records);
    this.#trim();
  }

  late(records: readonly Counted[], floor: number): void {
    const { source, sequence } = records[0]!;
    const [a, b] = [records.map(({ nonconforming }) => nonconforming), records.map(({ of }) => lengthM(of))];
    const lower = this.kept.findLastIndex((record) => record.source === source && record.sequence < sequence);
    if (sequence > floor && (lower >= 0 || !this.rolled)) this.kept.splice(lower + 1, 0, ...records);
    this.#trim();
    expect(this.window.insertLate({ source, sequence, a, b })).toBe(this.kept.filter((record) => records.includes(record)).length);
  }

  correct({ source, sequence }: SentRecord, count: number, metres: number): unknown {
    return this.window.correct(source, sequence, count, metres);
  }

  clear(seen: ReadonlyMap<number, number>): void {
    this.window.clear(seen);
    this.kept = [];
    this.rolled = false;
  }

  store(): void {
    if (!this.stores) return;
    const stored = structuredClone({ sum: this.sum.snapshot(), window: this.window.snapshot() });
    this.sum = new ExposureSum();
    this.sum.restore(stored.sum);
    this.window = new RecordWindow(this.settings, this.sum);
    this.window.restore(stored.window);
    expect(this.window.snapshot()).toEqual(stored.window);
  }

  agree(): void {
    expect(this.window.records).toBe(this.kept.length);
    expectSum(this.sum, this.kept);
    if (this.settings.reach === undefined) expect(this.window.ranges()).toEqual(rangesOf(this.kept));
    const newest = this.window.newest(Infinity);
    if (this.settings.reach === undefined) expect(newest.length).toBe(this.kept.length);
    else expect(newest.length).toBeLessThanOrEqual(this.settings.reach);
    const expected = this.kept.toReversed().map(({ source, sequence, nonconforming, of }, ago) => ({ ago, record: { source, sequence }, a: nonconforming, b: lengthM(of) }));
    expect(newest).toEqual(expected.slice(0, newest.length));
  }

  #trim(): void {
    while (this.kept.length > (this.settings.size ?? Infinity)) {
      this.kept.shift();
      this.rolled = true;
    }
  }
}

const stepMs = 10;

class TimeTrial implements Trial {
  kept: Counted[] = [];
  newest = 0;
  readonly whole: number;
  readonly stores: boolean;
  readonly settings: { readonly spanMs: number; readonly stepMs: number; readonly reach?: number };
  window: RecordTimeWindow<ReturnType<ExposureSum['snapshot']>, ExposureSum>;

  constructor(whole: number, reach?: number, stores = true) {
    this.whole = whole;
    this.stores = stores;
    this.settings = { spanMs: whole * stepMs, stepMs, ...(reach === undefined ? {} : { reach }) };
    this.window = new RecordTimeWindow(this.settings, () => new ExposureSum());
  }

  admit(records: readonly Counted[]): void {
    this.window.admitRun(records[0]!.source, records[0]!.sequence, records.length);
    for (const record of records) {
      this.#advance(record.at);
      expect(this.window.admit(record.at, record.nonconforming, lengthM(record.of))).toBe(this.#inside(record));
      if (this.#inside(record)) this.kept.push(record);
    }
  }

  late(records: readonly Counted[], floor: number): void {
    const { source, sequence } = records[0]!;
    const [a, b, at] = [records.map(({ nonconforming }) => nonconforming), records.map(({ of }) => lengthM(of)), records.map((record) => record.at)];
    const counted = this.window.insertLate({ source, sequence, at, a, b });
    if (sequence <= floor) return expect(counted).toBe(0);
    for (const time of at) this.#advance(time);
    const inside = records.filter((record) => this.#inside(record));
    expect(counted).toBe(inside.length);
    this.kept.push(...inside);
  }

  correct({ source, sequence }: SentRecord, count: number, metres: number): unknown {
    return this.window.correct(source, sequence, count, metres);
  }

  clear(seen: ReadonlyMap<number, number>): void {
    this.window.clear(seen);
    this.kept = [];
  }

  store(): void {
    if (!this.stores) return;
    const stored = structuredClone(this.window.snapshot());
    this.window = new RecordTimeWindow(this.settings, () => new ExposureSum());
    this.window.restore(stored);
    expect(this.window.snapshot()).toEqual(stored);
  }

  agree(): void {
    expect(this.window.records).toBe(this.kept.length);
    const total = new ExposureSum();
    for (const sink of this.window.sinks()) total.include(sink);
    expectSum(total, this.kept);
  }

  #advance(at: number): void {
    this.newest = Math.max(this.newest, at);
    this.kept = this.kept.filter((record) => this.#inside(record));
  }

  #inside({ at }: Counted): boolean {
    return Math.floor(at / stepMs) >= Math.floor(this.newest / stepMs) - this.whole;
  }
}

const wander = fc.array(fc.integer({ min: -12, max: 15 }), { minLength: 5, maxLength: 30 });
const still = [0];

describe('a record window', () => {
  it('of the last N records equals a list of records, whatever comes', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 25 }), steps, (size, all) => run(new RecordTrial({ size }), all, still, true)),
      { seed: 20_260_121, numRuns: 300 },
    );
  });

  it('that grows until it is cleared equals a list of records, whatever comes', () => {
    fc.assert(fc.property(steps, (all) => run(new RecordTrial({}), all, still, true)), { seed: 20_260_122, numRuns: 300 });
  });

  it('sums exactly beyond its reach, and goes on after a restart as if it had never stopped', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 20 }), steps, (reach, all) => {
        const trials = [true, false].map((stores) => new RecordTrial({ reach }, stores));
        for (const trial of trials) run(trial, all, still, false);
        expect(trials[0]!.window.snapshot()).toEqual(trials[1]!.window.snapshot());
        expect(trials[0]!.sum.snapshot()).toEqual(trials[1]!.sum.snapshot());
      }),
      { seed: 20_260_123, numRuns: 300 },
    );
  });

  it('fills its sink afresh now and then, so that rounding cannot pile up', () => {
    const seen = { sum: 0, clears: 0, admit: (a: number) => void (seen.sum += a), drop: (a: number) => void (seen.sum -= a), clear: () => { seen.sum = 0; seen.clears += 1; } };
    const window = new RecordWindow({ size: 100, width: 1 }, seen);
    window.admitRun(0, 1, 65_636);
    for (let k = 0; k < 65_636; k += 1) window.admit(k % 2 === 0 ? 1e9 / 7 : 1e-9 / 3);
    let plain = 0;
    window.visit((a) => (plain += a));
    expect([seen.clears, seen.sum]).toEqual([1, plain]);
  });

  it('feeds single values to a sink that takes only values', () => {
    const values: number[] = [];
    const sink = { admit: (value: number) => void values.push(value), drop: (value: number) => void values.splice(values.indexOf(value), 1), clear: () => void (values.length = 0) };
    const window = new RecordWindow({ size: 3, width: 1 }, sink);
    window.admitRun(0, 1, 4);
    for (const newtons of [510, 505, 498, 512]) window.admit(newtons);
    expect([values, window.full]).toEqual([[505, 498, 512], true]);
    expect(window.correct(0, 3, 499)).toEqual({ before: { a: 498, b: 0 }, after: { a: 499, b: 0 } });
    expect(window.correct(0, 1, 499)).toBe('not here');
    expect(values).toEqual([505, 512, 499]);
    window.clear();
    expect([values, window.records]).toEqual([[], 0]);
  });

  it('refuses what it cannot mean', () => {
    expect(() => new RecordWindow({ size: 2.5, width: 1 }, new ExposureSum())).toThrow('whole number of records');
    expect(() => new RecordTimeWindow({ spanMs: 10, stepMs, reach: 0 }, () => new ExposureSum())).toThrow('whole number of records');
    const window = new RecordWindow({ size: 2, width: 1 }, new ExposureSum());
    expect(() => window.admit(1)).toThrow('not announced');
    window.admitRun(0, 1, 1);
    expect(() => window.clear()).toThrow('between announced records');
  });
});

describe('an exposure sum', () => {
  it('keeps short lengths beside very long ones, which a plain sum would lose', () => {
    const sum = new ExposureSum();
    sum.admit(3, 1e16);
    for (let k = 0; k < 8; k += 1) sum.admit(1, 0.75);
    sum.drop(3, 1e16);
    expect([sum.records, sum.count, sum.exposure]).toEqual([8, 8, 6]);
  });
});

describe('a time window of records', () => {
  it('forgets the records that have left', () => {
    const window = new RecordTimeWindow({ spanMs: 20, stepMs }, () => new ExposureSum());
    window.admitRun(0, 1, 3);
    for (const at of [100, 112, 121]) window.admit(at, 1, 2.5);
    window.advance(130);
    expect([window.records, window.since, window.ranges()]).toEqual([2, 110, [{ source: 0, first: 2, last: 3 }]]);
    window.advance(500);
    expect([window.records, window.sinks(), window.ranges()]).toEqual([0, [], []]);
  });

  it('equals a list of records, whatever comes', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 8 }), steps, wander, (whole, all, times) => run(new TimeTrial(whole), all, times, true)),
      { seed: 20_260_131, numRuns: 300 },
    );
  });

  it('sums exactly beyond its reach, and goes on after a restart as if it had never stopped', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 8 }), fc.integer({ min: 1, max: 20 }), steps, wander, (whole, reach, all, times) => {
        const trials = [true, false].map((stores) => new TimeTrial(whole, reach, stores));
        for (const trial of trials) run(trial, all, times, false);
        expect(trials[0]!.window.snapshot()).toEqual(trials[1]!.window.snapshot());
      }),
      { seed: 20_260_132, numRuns: 300 },
    );
  });
});
