import { describe, expect, it } from 'vitest';
import { designedUpper } from '../../../core/bound/clustered-defects.ts';
import { knownErrorUpper } from '../../../core/bound/inspection-error.ts';
import { fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { methodOf } from '../../../core/evidence/method.ts';
import type { Tail } from '../../../core/units.ts';
import type { Part } from '../../../core/record/part.ts';
import { origins } from './evidence-plant.ts';
import { bad, good, lotStart, WatchOne } from './watch-one.ts';

const tail = 0.05 as Tail;
const quiet = 'silence: off, bad-data: off';
const leak = (rest: string, alarms = quiet): string => `station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 1 %, window: run, ${rest}, alarms: { ${alarms} }`;
const gaugeStudy = 'inspection-error: { sensitivity: 90 %, false-reject: 0.4 %, source: gauge study of May }';
const merged = 'clusters: { merge-within: 10, cluster-size: 2, source: last quarter }';

/** Units after which a faultless stream with these nonconforming units first is demonstrated. */
function unitsUntilDemonstrated(one: WatchOne, most: number): number {
  for (let units = 0; units < most; units += 1) {
    if (one.state === 'demonstrated') return one.watch.evidence.figures()['inspected'] as number;
    one.take(good(1));
  }
  throw new Error('never demonstrated');
}

describe('a station that errs', () => {
  it('[E5][E7] is demonstrated with the first unit at which the corrected bound is on the safe side', () => {
    for (const rejects of [0, 1, 3]) {
      const one = new WatchOne(leak(gaugeStudy));
      one.take(bad(rejects + 1).records > 1 ? bad(rejects) : good(1));
      const units = unitsUntilDemonstrated(one, 2_000);
      const bound = (inspected: number): number => {
        const found = knownErrorUpper({ rejected: rejects, inspected }, { sensitivity: 0.9, falseReject: 0.004 }, tail);
        return found.ok ? found.value : NaN;
      };
      expect(bound(units)).toBeLessThanOrEqual(0.01);
      expect(bound(units - 1)).toBeGreaterThan(0.01);
      expect(one.watch.evidence.bounds().bound).toBeCloseTo(bound(units), 14);
    }
  });

  it('[E4][E7] is unknown, with the reason, where it rejects fewer than its false rejects alone must give', () => {
    const one = new WatchOne(leak(gaugeStudy));
    one.take(good(2_000));
    expect([one.state, one.watch.evidence.bounds().bound]).toEqual(['demonstrated', 0]);
    one.take(good(2_000));
    expect([one.state, one.watch.evidence.warnings().join()]).toEqual(['unknown', expect.stringContaining('contradict')]);
    one.take(bad(6));
    expect(one.state).toBe('demonstrated');
  });

  it('[E7] says what was declared, and by which method', () => {
    const { guarantee } = new WatchOne(leak(gaugeStudy)).watch;
    expect(methodOf(guarantee)).toMatchObject({ name: expect.stringContaining('known inspection errors') as string, assumes: expect.arrayContaining([expect.stringContaining('gauge study of May')]) as string[] });
    const tried = new WatchOne(leak('inspection-error: { seeded: 100, caught: 95, good: 2000, rejected-good: 3 }')).watch.guarantee;
    expect(methodOf(tried).assumes.join()).toContain('95 of 100 units');
  });
});

describe('declared clusters', () => {
  it('[E5][E7] with a design effect: demonstrated with the first unit at which the bound of the smaller sample is', () => {
    for (const found of [0, 2, 5]) {
      const one = new WatchOne(leak('clusters: { design-effect: 2.5, source: last quarter }'));
      one.take(found === 0 ? good(1) : bad(found));
      const units = unitsUntilDemonstrated(one, 4_000);
      expect(designedUpper(found, units, 2.5, tail)).toBeLessThanOrEqual(0.01);
      expect(designedUpper(found, units - 1, 2.5, tail)).toBeGreaterThan(0.01);
    }
  });

  it('[E5][E7] as events: a run of nonconforming units is one, and the bound is that of the events', () => {
    const one = new WatchOne(leak(merged));
    one.take(bad(5), good(9), bad(1), good(10), bad(1));
    expect(one.watch.evidence.figures()).toMatchObject({ inspected: 26, nonconforming: 7, events: 2 });
    const units = unitsUntilDemonstrated(one, 4_000);
    expect(fractionUpper(2, units, tail)).toBeLessThanOrEqual(0.005);
    expect(fractionUpper(2, units - 1, tail)).toBeGreaterThan(0.005);
    expect(one.watch.evidence.bounds().bound).toBeCloseTo(2 * fractionUpper(2, units, tail), 14);
  });

  it('in a window of units leave with the last of their units', () => {
    const one = new WatchOne(leak(merged).replace('window: run', 'window: { units: 1000 }'));
    one.take(bad(3), good(997));
    expect(one.watch.evidence.figures()).toMatchObject({ nonconforming: 3, events: 1 });
    one.take(good(2));
    expect(one.watch.evidence.figures()).toMatchObject({ nonconforming: 1, events: 1 });
    expect(one.watch.evidence.margin()).toEqual({ canTake: 0 });
    one.take(good(1));
    expect(one.watch.evidence.figures()).toMatchObject({ nonconforming: 0, events: 0 });
  });

  it('[J1] are what the change detector counts', () => {
    const rule = `${quiet}, deterioration: { units-between-false-calls: 5000 }`;
    const singly = new WatchOne(leak('clusters: { merge-within: 1, cluster-size: 2, source: last quarter }', rule));
    const run = new WatchOne(leak(merged, rule));
    const spread = [...Array(8).keys()].flatMap(() => [bad(1), good(4)]);
    expect(run.take(...spread).raised).toBe(0);
    expect(singly.take(...spread).raised).toBeGreaterThan(0);
  });
});

describe('whole lots as units', () => {
  const lots = leak('clusters: { lots-with-more-than: 2 }').replace('at-most: 1 %', 'at-most: 20 %');
  const lot = (name: string, nonconforming: number): Part[] => [lotStart(name, undefined), bad(nonconforming), good(50)].filter((part) => part.records > 0);
  const ended = (name: string): Part => ({ kind: 'lot-end', records: 1, at: 0, line: 'A', lot: name });

  it('[E5][E7] count once they have ended, by a mark or by the next one', () => {
    const one = new WatchOne(lots);
    one.take(...lot('L-1', 2), ...lot('L-2', 3));
    expect(one.watch.evidence.figures()).toMatchObject({ lots: 1, lotsOver: 0, inspectedOfLot: 53, nonconformingOfLot: 3 });
    one.take(ended('L-2'));
    expect(one.watch.evidence.figures()).toMatchObject({ lots: 2, lotsOver: 1 });
    for (let k = 3; ; k += 1) {
      const { lots: count = 0 } = one.watch.evidence.figures();
      const safe = fractionUpper(1, count, tail) <= 0.2;
      expect(one.state === 'demonstrated').toBe(safe);
      if (safe) break;
      one.take(...lot(`L-${k}`, 0), ended(`L-${k}`));
    }
  });

  it('take late units and corrections of a lot that ended', () => {
    const one = new WatchOne(lots);
    one.take(lotStart('L-1', undefined), bad(3), good(40), ended('L-1'));
    expect(one.watch.evidence.figures()).toMatchObject({ lots: 1, lotsOver: 1 });
    one.take({ kind: 'correction', records: 1, origin: origins.leak, at: 0, corrects: 2, finding: { kind: 'verdict', nonconforming: false }, reason: 'inspected again' });
    expect(one.watch.evidence.figures()).toMatchObject({ lots: 1, lotsOver: 0 });
  });

  it('leave a window of lots by number', () => {
    const one = new WatchOne(lots.replace('window: run', 'window: { units: 20 }'));
    one.take(...lot('bad', 9), ended('bad'));
    for (let k = 0; k < 19; k += 1) one.take(...lot(`L-${k}`, 0), ended(`L-${k}`));
    expect(one.watch.evidence.figures()).toMatchObject({ lots: 20, lotsOver: 1 });
    one.take(...lot('L-20', 0), ended('L-20'));
    expect([one.watch.evidence.figures()['lotsOver'], one.watch.evidence.position]).toEqual([0, 21]);
  });

  it('[E4] are unknown while no lot was told', () => {
    const one = new WatchOne(lots);
    one.take(good(10));
    expect([one.state, one.watch.standing.remark]).toEqual(['unknown', 'The lot of the records has not been told.']);
    one.take(...lot('L-1', 0));
    expect(one.state).toBe('gathering');
  });
});
