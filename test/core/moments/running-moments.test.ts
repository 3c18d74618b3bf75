import fc from 'fast-check';
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import { RunningMoments } from '../../../core/moments/running-moments.ts';

const relative = (got: number | undefined, wanted: number): number => Math.abs((got ?? NaN) / wanted - 1);

function of(values: readonly number[], reference = values[0] ?? 0): RunningMoments {
  const moments = new RunningMoments(reference);
  for (const value of values) moments.admit(value);
  return moments;
}

/** Distances from 1000 that are whole millionths, 0 to 2000, from a fixed seed. */
function seededSteps(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 747796405) + 2891336453) >>> 0;
    const word = Math.imul((state >>> ((state >>> 28) + 4)) ^ state, 277803737);
    return (((word >>> 22) ^ word) >>> 0) % 2001;
  };
}

describe('running moments', () => {
  it('keep 1e-12 after 10^7 values of 1000 +- 0.001 came and went', () => {
    const next = seededSteps(3);
    const kept = new Float64Array(1000);
    const moments = new RunningMoments(1000);
    for (let i = 0; i < 1e7; i++) {
      const value = 1000 - 0.001 + next() * 1e-6;
      if (i >= kept.length) moments.drop(kept[i % kept.length]!);
      kept[i % kept.length] = value;
      moments.admit(value);
    }
    const anew = of([...kept], 1000);
    expect(moments.count).toBe(1000);
    expect(relative(moments.mean, anew.mean!)).toBeLessThan(1e-15);
    expect(relative(moments.sd, anew.sd!)).toBeLessThan(1e-14);
    expect(relative(moments.skewness, anew.skewness!)).toBeLessThan(1e-12);
    expect(moments.needsRecount).toBe(false);
  });

  it('certified mean and deviation of the reference data sets to 14 digits, or what doubles hold of the data', () => {
    // NIST Statistical Reference Datasets, univariate summary statistics
    const sets = JSON.parse(readFileSync(new URL('../../reference/strd-data-open.json', import.meta.url), 'utf8')) as Record<
      string,
      { data?: number[]; certified_mean: string; certified_sd: string }
    >;
    let checked = 0;
    for (const { data, certified_mean, certified_sd } of Object.values(sets)) {
      if (data === undefined) continue;
      for (const reference of [data[0]!, 0]) {
        const moments = of(data, reference);
        const held = (Number.EPSILON * Math.abs(Number(certified_mean))) / Number(certified_sd);
        expect(relative(moments.mean, Number(certified_mean))).toBeLessThan(1e-14);
        expect(relative(moments.sd, Number(certified_sd))).toBeLessThan(Math.max(1e-14, held));
      }
      checked += 1;
    }
    expect(checked).toBeGreaterThan(3);
  });

  it('need no good reference for the deviation: 10^7 + 0.1 seen from 0', () => {
    // NumAcc4 of the same collection in whole tenths, rule from memory: mean 100000002, deviation 1
    const moments = of([100000002, ...Array.from({ length: 1000 }, (_, i) => 100000001 + 2 * (i % 2))], 0);
    expect(moments.mean).toBe(100000002);
    expect(relative(moments.sd, 1)).toBeLessThan(1e-15);
  });

  it('skewness is that of the plain definition', () => {
    const values = [1, 2, 2, 3, 9];
    const mean = 3.4;
    const power = (k: number): number => values.reduce((sum, value) => sum + (value - mean) ** k, 0) / 5;
    expect(relative(of(values).skewness, power(3) / power(2) ** 1.5)).toBeLessThan(1e-14);
    expect(of([4, 4, 4]).skewness).toBeUndefined();
    expect(of([4, 5]).skewness).toBeUndefined();
  });

  it('rolled equals rebuilt, and restored equals kept', () => {
    const value = fc.double({ min: -1e6, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(fc.array(value, { minLength: 3, maxLength: 60 }), fc.integer({ min: 2, max: 20 }), value, (values, size, reference) => {
        const rolled = new RunningMoments(reference);
        values.forEach((admitted, i) => {
          if (i >= size) rolled.drop(values[i - size]!);
          rolled.admit(admitted);
        });
        const kept = values.slice(-size);
        const anew = of(kept, reference);
        const scale = Math.max(1, ...values.map((v) => Math.abs(v - reference)));
        expect(rolled.count).toBe(kept.length);
        expect(Math.abs(rolled.mean! - anew.mean!)).toBeLessThanOrEqual(1e-15 * (scale + Math.abs(reference)));
        expect(Math.abs(rolled.sd! - anew.sd!)).toBeLessThanOrEqual(1e-13 * scale);
        const restored = RunningMoments.restore(JSON.parse(JSON.stringify(rolled.snapshot())) as ReturnType<RunningMoments['snapshot']>);
        restored.admit(1);
        rolled.admit(1);
        expect(restored.snapshot()).toEqual(rolled.snapshot());
      }),
      { seed: 41, numRuns: 500 },
    );
  });

  it('say when a value far out has pushed digits away, and are clean again when empty', () => {
    const moments = of([5, 6], 0);
    expect(moments.needsRecount).toBe(false);
    moments.admit(1e12);
    moments.drop(1e12);
    expect(moments.needsRecount).toBe(true);
    moments.drop(5);
    moments.drop(6);
    expect(moments.snapshot()).toEqual(new RunningMoments(0).snapshot());
    expect(moments.mean).toBeUndefined();
    expect(moments.sd).toBeUndefined();
  });

  it('refuse what is no measurement and keep what they hold', () => {
    const moments = of([1, 2, 3]);
    const before = moments.snapshot();
    for (const value of [NaN, Infinity, -Infinity, 1e91]) {
      expect(() => { moments.admit(value); }).toThrow(OutOfDomain);
      expect(() => { moments.drop(value); }).toThrow(OutOfDomain);
    }
    expect(moments.snapshot()).toEqual(before);
    expect(() => { new RunningMoments(0).drop(1); }).toThrow('value is 1, expected a value that was admitted before');
    expect(() => new RunningMoments(NaN)).toThrow(OutOfDomain);
  });
});
