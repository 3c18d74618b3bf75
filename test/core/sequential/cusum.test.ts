import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { admitFoundCusum, admitQuietCusum, clearCusumAlarm, conformingToCusumHalfWay, cusumFrom, cusumGauge, cusumNow, type CusumState, fractionCusum, newCusum, nonconformingToCusumAlarm, rateCusum } from '../../../core/sequential/cusum.ts';

const tuning = fractionCusum(0.02, 3, 4);

const through = (state: CusumState, conforming: number): CusumState =>
  admitFoundCusum(admitQuietCusum(state, conforming, tuning), 1, tuning);

describe('the cumulative sum', () => {
  it('is the same to the last bit however the stream is cut, and follows its definition', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 90 }), { maxLength: 25 }), fc.integer({ min: 1, max: 40 }), (gaps, cut) => {
        let whole = newCusum;
        let pieces = newCusum;
        let sum = 0;
        let alarms = 0;
        for (const gap of gaps) {
          whole = through(whole, gap);
          for (let done = 0; done < gap; done += cut) pieces = admitQuietCusum(pieces, Math.min(cut, gap - done), tuning);
          const stored = cusumFrom(JSON.parse(JSON.stringify(admitFoundCusum(pieces, 1, tuning))) as Partial<CusumState>);
          pieces = stored.ok ? stored.value : newCusum;
          for (let i = 0; i < gap; i++) sum = Math.max(0, sum - Math.log(0.98 / 0.94));
          sum += Math.log(3);
          if (sum >= 4) [sum, alarms] = [0, alarms + 1];
        }
        expect(pieces).toEqual(whole);
        expect(whole.alarms).toBe(alarms);
        expect(whole.sum).toBeCloseTo(sum, 10);
      }),
      { seed: 3, numRuns: 80 },
    );
  });

  it('reads as what would come of the units it names', () => {
    let state = newCusum;
    for (const gap of [30, 2, 9, 0, 200, 1, 1]) {
      state = through(state, gap);
      const inRow = nonconformingToCusumAlarm(state, tuning);
      let ahead = state;
      for (let i = 0; i < inRow; i++) {
        expect(ahead.alarms).toBe(state.alarms);
        ahead = through(ahead, 0);
      }
      expect(ahead.alarms).toBe(state.alarms + 1);
      const calm = conformingToCusumHalfWay(state, tuning);
      expect(cusumGauge(admitQuietCusum(state, calm, tuning), tuning)).toBeLessThanOrEqual(0.5);
      if (calm > 0) expect(cusumGauge(admitQuietCusum(state, calm - 1, tuning), tuning)).toBeGreaterThan(0.5);
    }
  });

  it('lets its alarm stand until it is taken down', () => {
    let state = newCusum;
    while (state.alarms < 2) state = through(state, 0);
    expect(state.alarmAt).toBe(4);
    expect(clearCusumAlarm(state).alarmAt).toBeUndefined();
    expect(clearCusumAlarm(newCusum)).toBe(newCusum);
    expect(admitFoundCusum({ ...newCusum, sum: NaN }, 1, tuning).alarms).toBe(1);
  });

  it('takes batches and exposures as a whole', () => {
    const metres = rateCusum(0.1, 2, 5);
    expect(admitFoundCusum(newCusum, 4, metres, 10).sum).toBeCloseTo(4 * Math.LN2 - 1, 12);
    expect(admitFoundCusum(newCusum, 1, metres, 100).sum).toBe(0);
    const mixed = admitQuietCusum(admitQuietCusum(admitFoundCusum(newCusum, 4, metres, 10), 3, metres, 2), 2, metres, 0.5);
    expect(cusumNow(mixed, metres)).toBeCloseTo(4 * Math.LN2 - 1.7, 12);
    expect(mixed.seen).toBe(17);
  });

  it('refuses settings and stored sums that cannot be', () => {
    expect(() => fractionCusum(0.02, 1, 4)).toThrow('ratio');
    expect(() => fractionCusum(0.5, 2, 4)).toThrow('ratio');
    expect(() => fractionCusum(0.02, 2, 0)).toThrow('threshold');
    expect(() => rateCusum(0.1, Infinity, 4)).toThrow('ratio');
    expect(cusumFrom({ ...newCusum, sum: NaN }).ok).toBe(false);
    expect(cusumFrom({ ...newCusum, alarms: 0.5 }).ok).toBe(false);
    expect(cusumFrom({ sum: 1 }).ok).toBe(false);
  });
});
