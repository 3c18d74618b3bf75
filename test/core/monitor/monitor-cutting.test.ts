import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Monitor } from '../../../core/monitor/monitor.ts';
import { monitorFrom, snapshotOf } from '../../../core/monitor/monitor-snapshot.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import { frameOf } from '../../../core/record/frame-of.ts';
import type { Part, Verdicts } from '../../../core/record/part.ts';
import { tailOf } from '../../../core/record/tail-of.ts';
import type { EpochMs } from '../../../core/units.ts';
import { leakTest, monday, plantWith, verdicts } from './example-plant.ts';

const sheet = `    at-most: 2 %
    confidence: 95 %
    window: { units: 400 }
    safety-relevant: true
    alarms:
      crossing: { return: { distance: 0.1, units: 30 } }
      violation: { confidence: 99 % }
      deterioration: { units-between-false-calls: 2000 }
      silence: { after: 5 min }
      bad-data: { more-than: 5, within: 30 min }`;
const shiftSheet = `
  - { id: shift-A, station: A.leak-test, characteristic: tightness, quantity: yield, at-least: 97 %, window: shift }
  - { id: lot-A, station: A.leak-test, characteristic: tightness, quantity: nonconforming-fraction, at-most: 3 %, window: lot }
  - { id: run-A, station: A.leak-test, product: BH-4, characteristic: tightness, quantity: nonconforming-fraction, at-most: 1 %, window: run }`;

type Step = { readonly gapMs: number; readonly part: (first: number, at: number) => Part };

const inspected = fc.record({ units: fc.integer({ min: 1, max: 60 }), bad: fc.array(fc.integer({ min: 0, max: 59 }), { maxLength: 3 }), lot: fc.constantFrom(undefined, 'L-1', 'L-2'), product: fc.constantFrom('BH-4', 'BH-4', 'BH-5', 'BH-9') });
const step: fc.Arbitrary<Step> = fc.record({
  gapMs: fc.constantFrom(0, 1_000, 61_000, 400_000, 3_600_000),
  part: fc.oneof(
    { weight: 8, arbitrary: inspected.map(({ units, bad, lot, product }) => (_first: number, at: number) => verdicts(units, [...new Set(bad.filter((place) => place < units))].sort((a, b) => a - b), at, { ...leakTest, lot, product })) },
    { weight: 1, arbitrary: fc.integer({ min: 1, max: 200 }).map((back) => (first: number, at: number): Part => ({ kind: 'correction', records: 1, origin: leakTest, at, corrects: Math.max(1, first - back), finding: { kind: 'verdict', nonconforming: back % 2 === 0 }, reason: 'inspected again' })) },
    { weight: 1, arbitrary: fc.constantFrom('line-stopped', 'line-running').map((kind) => (_first: number, at: number): Part => (kind === 'line-stopped' ? { kind, records: 1, at, line: 'A', reason: 'break' } : { kind: 'line-running', records: 1, at, line: 'A' })) },
    { weight: 1, arbitrary: fc.integer({ min: 1, max: 20 }).map((records) => (_first: number, at: number): Part => ({ kind: 'lost', records, at, station: 'A.leak-test', reason: 'overrun' })) },
    { weight: 1, arbitrary: fc.constantFrom('L-3', 'L-4').map((lot) => (_first: number, at: number): Part => ({ kind: 'lot-start', records: 1, at, line: 'A', product: 'BH-4', lot, size: 500 })) },
  ),
});

/** Numbers the parts on and places them in time; sequences below the first part's are never corrected. */
function streamOf(steps: readonly Step[]): Part[] {
  const parts: Part[] = [verdicts(150, [], monday)];
  let first = 151;
  let at = monday + 150_000;
  for (const { gapMs, part } of steps) {
    at += gapMs;
    const made = part(first, at);
    parts.push(made);
    first += made.records;
    if (made.kind === 'verdicts') at += made.records * 1_000;
  }
  return parts;
}

/** Cuts parts into single pieces of at most `most` records. */
function pieces(parts: readonly Part[], most: number): Part[] {
  return parts.flatMap((part) => {
    if (part.kind !== 'verdicts') return [part];
    const cut: Part[] = [];
    for (let from = 0; from < part.records; from += most) {
      const rest = tailOf(frameOf(1, [part]), from).parts[0] as Verdicts;
      const records = Math.min(most, rest.records);
      cut.push({ ...rest, records, nonconforming: rest.nonconforming.filter((place) => place < records) });
    }
    return cut;
  });
}

function run(parts: readonly Part[], partsAFrame: number, monitor = new Monitor(plantWith(sheet, shiftSheet), 'v'), from = 1): { monitor: Monitor; happenings: readonly Happening[]; next: number } {
  let first = from;
  for (let k = 0; k < parts.length; k += partsAFrame) {
    const frame = frameOf(first, parts.slice(k, k + partsAFrame));
    expect(monitor.takeFrame('tester', frame, undefined).kind).toBe('taken');
    first += frame.records;
  }
  return { monitor, happenings: monitor.decisions().happenings, next: first };
}

/** Set-aside reports are told a frame, with the pieces the frame came in. */
const decided = (happenings: readonly Happening[]): readonly Happening[] => happenings.filter(({ kind }) => kind !== 'set-aside');

describe('a monitor whose clock follows the records', () => {
  it('[F6] decides the same however the records were cut into parts and frames', () => {
    fc.assert(
      fc.property(fc.array(step, { maxLength: 40 }), fc.integer({ min: 1, max: 50 }), fc.integer({ min: 1, max: 7 }), (steps, most, partsAFrame) => {
        const parts = streamOf(steps);
        const whole = run(parts, parts.length);
        const cut = run(pieces(parts, most), partsAFrame);
        expect(decided(cut.happenings)).toEqual(decided(whole.happenings));
        expect(cut.monitor.watches.map((watch) => watch.evidence.figures())).toEqual(whole.monitor.watches.map((watch) => watch.evidence.figures()));
      }),
      { seed: 77, numRuns: 60 },
    );
  });

  it('[R1] goes on from a snapshot taken anywhere', () => {
    fc.assert(
      fc.property(fc.array(step, { minLength: 2, maxLength: 30 }), fc.nat(), (steps, cutAt) => {
        const parts = streamOf(steps);
        const at = 1 + (cutAt % parts.length);
        const whole = run(parts, 1);
        const head = run(parts.slice(0, at), 1);
        const resumed = monitorFrom(head.monitor.plant, 'v', structuredClone(snapshotOf(head.monitor)));
        const tail = run(parts.slice(at), 1, resumed, head.next);
        expect([...head.happenings, ...tail.happenings]).toEqual(whole.happenings);
        expect(snapshotOf(tail.monitor)).toEqual(snapshotOf(whole.monitor));
      }),
      { seed: 78, numRuns: 40 },
    );
  });
});

describe('the plant clock', () => {
  const at = (ms: number): EpochMs => (monday + ms) as EpochMs;

  it('[C1] makes no difference by when or how often it is looked at', () => {
    const looks = fc.array(fc.integer({ min: 0, max: 20_000_000 }), { maxLength: 30 });
    const frames = [0, 700_000, 4_000_000, 9_000_000, 19_000_000];
    const seen = (extra: readonly number[]): readonly Happening[] => {
      const monitor = new Monitor(plantWith(sheet, shiftSheet), 'v');
      const moments = [...extra.map((ms) => ({ ms, frame: -1 })), ...frames.map((ms, frame) => ({ ms, frame }))].sort((a, b) => a.ms - b.ms);
      for (const { ms, frame } of moments) {
        if (frame < 0) monitor.advance(at(ms));
        else monitor.takeFrame('tester', frameOf(1 + frame * 100, [verdicts(100, frame === 2 ? [1, 2, 3, 4, 5, 6, 7, 8, 9] : [], monday + ms - 100_000)]), at(ms));
      }
      monitor.advance(at(20_000_000));
      return monitor.decisions().happenings;
    };
    const plain = seen([]);
    expect(plain.filter((one) => one.kind === 'alarm' && one.alarm.rule === 'silence').length).toBeGreaterThan(4);
    fc.assert(
      fc.property(looks, (extra) => {
        expect(seen(extra)).toEqual(plain);
      }),
      { seed: 79, numRuns: 60 },
    );
  });

  it('[C2] never goes back', () => {
    const monitor = new Monitor(plantWith(sheet), 'v');
    monitor.advance(at(5_000));
    monitor.advance(at(1_000));
    expect(monitor.now).toBe(at(5_000));
  });
});

describe('a safety-relevant guarantee', () => {
  const at = (ms: number): EpochMs => (monday + ms) as EpochMs;

  it('[E6] is unknown while lost records would be in its window, and no longer', () => {
    const monitor = new Monitor(plantWith(sheet), 'v');
    const standing = monitor.watches[0]!.standing;
    monitor.takeFrame('tester', frameOf(1, [verdicts(400, [], monday), { kind: 'lost', records: 5, at: monday, station: 'A.leak-test', reason: 'overrun' }]), at(400_000));
    expect(standing.state).toBe('unknown');
    monitor.takeFrame('tester', frameOf(406, [verdicts(399, [], monday)]), at(400_001));
    expect(standing.state).toBe('unknown');
    expect(standing.remark).toBe('5 records of this window were lost.');
    monitor.takeFrame('tester', frameOf(805, [verdicts(1, [], monday)]), at(400_002));
    expect(standing.state).toBe('demonstrated');
  });

  it('[E6] is told again at once when the lost records come after all', () => {
    const monitor = new Monitor(plantWith(sheet), 'v');
    monitor.takeFrame('tester', frameOf(1, [verdicts(400, [], monday), { kind: 'lost', records: 5, at: monday, station: 'A.leak-test', reason: 'overrun' }]), at(400_000));
    monitor.takeFrame('tester', frameOf(401, [verdicts(5, [], monday)]), at(400_001));
    expect(monitor.watches[0]!.standing.state).toBe('demonstrated');
  });
});

describe('a window that covers a lot or a shift', () => {
  it('[W4] begins anew with a new one, and does not count late records of an earlier one', () => {
    const monitor = new Monitor(plantWith(sheet, shiftSheet), 'v');
    const lot = (id: string): typeof leakTest => ({ ...leakTest, lot: id });
    const figures = (id: string): unknown => monitor.watches.find(({ guarantee }) => guarantee.id === id)!.evidence.figures();
    const six = monday + 6 * 3_600_000; // 14:00 in the plant's zone: the late shift begins
    monitor.takeFrame('tester', frameOf(1, [verdicts(50, [1], six - 60_000, lot('L-1')), verdicts(20, [2], six, lot('L-2')), verdicts(10, [3], six - 30_000, lot('L-1'))]), undefined);
    expect(figures('lot-A')).toMatchObject({ inspected: 20, nonconforming: 1 });
    expect(figures('shift-A')).toMatchObject({ inspected: 20, nonconforming: 1 });
    expect(figures('run-A')).toMatchObject({ inspected: 80, nonconforming: 3 });
    monitor.advance((six + 8 * 3_600_000) as EpochMs);
    expect(figures('shift-A')).toMatchObject({ inspected: 0 });
  });
});
