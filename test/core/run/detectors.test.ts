import { describe, expect, it } from 'vitest';
import { cusumPlan } from '../../../core/run-length/cusum-run-length.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { admitFoundCusum, admitQuietCusum, newCusum } from '../../../core/sequential/cusum.ts';
import { normalDeviates } from '../../../core/run-length/normal-deviates.ts';
import { bad, cuts, fills, good, WatchOne } from '../evidence/watch-one.ts';

const quiet = 'crossing: off, violation: off, silence: off, bad-data: off';

describe('a cumulative sum in the monitor', () => {
  const one = (): WatchOne => new WatchOne(`station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 1 %, window: run, alarms: { ${quiet}, deterioration: { detector: cusum, units-between-false-calls: 20000 } }`);

  it('[J1] raises its alarm at the nonconforming unit that takes the sum to its threshold, by its own method', () => {
    const { tuning } = cusumPlan(0.01, 2, 20_000);
    const watched = one();
    let state = newCusum;
    for (let found = 1; ; found += 1) {
      state = admitFoundCusum(admitQuietCusum(state, 9, tuning, 1), 1, tuning, 1);
      const { raised } = watched.take(good(9), bad(1));
      expect([found, raised]).toEqual([found, state.alarms]);
      if (raised > 0) break;
    }
    const [alarm] = watched.monitor.desk.standing();
    expect(alarm).toMatchObject({ rule: 'deterioration', grounds: { method: 'cumulative sum', lookRule: 'all looks', sentence: expect.stringContaining('since it last began') as string } });
    expect(watched.watch.change?.view(false)).toMatchObject({ kind: 'cusum', alarmed: true, against: 'line' });
  });

  it('[J2] returns when the line has been calm', () => {
    const watched = one();
    for (let found = 0; found < 12; found += 1) watched.take(bad(1));
    expect(watched.watch.change?.watch.alarmed).toBe(true);
    expect(watched.take(good(280)).returned).toBe(0);
    watched.take(good(5_000));
    expect(watched.watch.change?.watch.alarmed).toBe(false);
  });

  it('is not offered for a rate, nor where none has so many units between false calls', () => {
    expect(() => new WatchOne(`station: A.cutting, characteristic: surface, quantity: rate, at-most: 4 per 100 m, window: run, alarms: { deterioration: { detector: cusum, units-between-false-calls: 20000 } }`)).toThrow('mixture');
  });
});

describe('a detector of a mean', () => {
  const fill = 'station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 251 ml, window: run';
  const values = (mean: number, count: number, seed: number): number[] => {
    const normal = normalDeviates(seededUniform(seed));
    return Array.from({ length: count }, () => Math.max(246, Math.min(256, mean + normal())));
  };

  it.each([
    ['a known standard deviation', 'sigma: { value: 1 ml, source: scale study }'],
    ['known ends', 'range: { from: 246 ml, to: 256 ml }'],
  ])('with %s says that the mean has fallen, and nothing while it has not', (_how, more) => {
    const one = new WatchOne(`${fill}, ${more}, alarms: { ${quiet}, deterioration: { units-between-false-calls: 100000 } }`);
    expect(one.take(fills(values(250.6, 2_000, 3))).raised).toBe(0);
    expect(one.take(fills(values(249.2, 400, 4))).raised).toBe(1);
    expect(one.monitor.desk.standing()).toMatchObject([{ rule: 'deterioration', grounds: { lookRule: 'all looks' } }]);
    expect(one.take(fills(values(251.5, 3_000, 5))).returned).toBe(1);
  });

  it('is not there for a mean of which neither is known', () => {
    expect(new WatchOne(`${fill}, alarms: { ${quiet} }`).watch.change).toBeUndefined();
    expect(() => new WatchOne(`${fill}, alarms: { deterioration: { units-between-false-calls: 1000 } }`)).toThrow('without either');
  });
});

describe('a detector of a rate', () => {
  it('[J1][J2] counts nonconformities in exposure, and returns by exposure', () => {
    const one = new WatchOne(`station: A.cutting, characteristic: surface, quantity: rate, at-most: 4 per 100 m, window: run, alarms: { ${quiet}, deterioration: { units-between-false-calls: 20000 } }`);
    expect(one.take(cuts(Array.from({ length: 200 }, () => 0), Array.from({ length: 200 }, () => 1))).raised).toBe(0);
    expect(one.take(cuts([2, 2, 2, 2, 2, 2], [1, 1, 1, 1, 1, 1])).raised).toBe(1);
    expect(one.take(cuts(Array.from({ length: 70 }, () => 0), Array.from({ length: 70 }, () => 1))).returned).toBe(0);
    expect(one.take(cuts(Array.from({ length: 600 }, () => 0), Array.from({ length: 600 }, () => 1))).returned).toBe(1);
  });
});
