import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CountJudge } from '../../../core/evidence/count-judge.ts';
import { MeasuredSum } from '../../../core/evidence/measured-sum.ts';
import { beyondLimit } from '../../../core/evidence/nonconforming-places.ts';
import { ExposureSum } from '../../../core/window/exposure-sum.ts';
import { NumberedRecords } from '../../../core/evidence/numbered-records.ts';
import { TimedRecords } from '../../../core/evidence/timed-records.ts';
import { fills, WatchOne } from './watch-one.ts';

const value = fc.oneof({ weight: 9, arbitrary: fc.double({ min: 249, max: 252, noNaN: true }) }, { weight: 1, arbitrary: fc.constantFrom(1e12, -1e12, 1e200, 245) });

describe('what a window of records adds up to', () => {
  it('is, rolled on, what its records give afresh, whatever far-off values came and went', () => {
    fc.assert(
      fc.property(fc.array(value, { minLength: 1, maxLength: 120 }), fc.integer({ min: 1, max: 30 }), (values, size) => {
        const rolled = new NumberedRecords(size, 1, new MeasuredSum(250, { from: -1e13, to: 1e13 }));
        rolled.announce(0, 1, values.length);
        for (const each of values) rolled.admit(0, each, 0);
        const rebuilt = new MeasuredSum(250, { from: -1e13, to: 1e13 });
        for (const each of values.slice(-size)) rebuilt.admit(each);
        expect([rolled.sum.outside, rolled.sum.moments.count]).toEqual([rebuilt.outside, rebuilt.moments.count]);
        const near = (got = 0, wanted = 0): void => expect(Math.abs(got - wanted)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(wanted)));
        near(rolled.sum.moments.mean, rebuilt.moments.mean);
        near(rolled.sum.moments.sd, rebuilt.moments.sd);
      }),
      { seed: 4501, numRuns: 300 },
    );
  });

  it('is the same by time: the steps that are inside, to the last count', () => {
    const record = fc.record({ gapMs: fc.constantFrom(0, 400, 1_000, 7_000), count: fc.integer({ min: 0, max: 3 }), exposure: fc.double({ min: 0.1, max: 9, noNaN: true }) });
    fc.assert(
      fc.property(fc.array(record, { minLength: 1, maxLength: 80 }), (records) => {
        const held = new TimedRecords({ spanMs: 10_000, stepMs: 1_000 }, () => new ExposureSum());
        held.announce(0, 1, records.length);
        let at = 0;
        const timed = records.map(({ gapMs, ...rest }) => ({ ...rest, at: (at += gapMs) }));
        for (const { at: now, count, exposure } of timed) {
          for (let due = held.nextDue(); due <= now; due = held.nextDue()) held.advance(due);
          held.admit(now, count, exposure);
        }
        const since = Math.floor(at / 1_000) * 1_000 - 10_000;
        const inside = timed.filter((each) => each.at >= since);
        expect([held.records, held.sum.count]).toEqual([inside.length, inside.reduce((sum, { count }) => sum + count, 0)]);
        expect(held.sum.exposure).toBeCloseTo(inside.reduce((sum, { exposure }) => sum + exposure, 0), 9);
      }),
      { seed: 4502, numRuns: 300 },
    );
  });
});

describe('a number that is none', () => {
  it('[E4] never reads as healthy', () => {
    const never = { sizeToDemonstrate: () => 1, sizeViolated: () => 0 };
    const judge = new CountJudge({ line: never, opposite: never, backFromCrossing: never, backFromViolation: never, neverDemonstrated: 0.5, neverViolated: 0.5 });
    expect([judge.state(NaN, 0, true), judge.state(100, NaN, true), judge.state(Infinity, 0, true)]).toEqual(['unknown', 'unknown', 'unknown']);
    expect([beyondLimit(NaN, { side: 'below', value: 1 }), beyondLimit(NaN, { side: 'above', value: 1 })]).toEqual([true, true]);
    const sum = new MeasuredSum(250, undefined);
    sum.admit(NaN);
    expect([sum.outside, sum.moments.count]).toEqual([1, 0]);
    const one = new WatchOne('station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 251 ml, sigma: { value: 1 ml, source: study }, window: { units: 5 }, alarms: { silence: off, bad-data: off }');
    one.take(fills([252, 252, 252, NaN]));
    expect(one.state).toBe('unknown');
  });
});
