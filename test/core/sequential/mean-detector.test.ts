import { describe, expect, it } from 'vitest';
import { seededUniform, type Uniform } from '../../../core/run-length/seeded-uniform.ts';
import { admitMean, clearMeanAlarm, meanDetectorFrom, meanDetectorGauge, type MeanDetectorState, type MeanDetectorTuning, newMeanDetector, usualShifts, usualStakes } from '../../../core/sequential/mean-detector.ts';
import { normalDeviates } from '../../../core/run-length/normal-deviates.ts';
import { mostMisses, paths } from './simulated-paths.ts';

const known: MeanDetectorTuning = {
  baseline: 10, watchesFor: 'risen', threshold: 500, model: { kind: 'known sigma', sigma: 2, shifts: usualShifts },
};
const bounded: MeanDetectorTuning = {
  baseline: 4, watchesFor: 'fallen', threshold: 500, model: { kind: 'bounded', from: 0, to: 10, stakes: usualStakes },
};

const fed = (tuning: MeanDetectorTuning, values: readonly number[]): MeanDetectorState =>
  values.reduce((state, value) => admitMean(state, value, tuning), newMeanDetector(tuning));

/** Share of runs that call within `span` measurements. */
function calls(tuning: MeanDetectorTuning, span: number, seed: number, valuesOf: (uniform: Uniform) => () => number): number {
  const value = valuesOf(seededUniform(seed));
  let called = 0;
  for (let path = 0; path < paths; path++) {
    let state = newMeanDetector(tuning);
    for (let n = 0; n < span && state.alarms === 0; n++) state = admitMean(state, value(), tuning);
    called += state.alarms;
  }
  return called;
}

describe('the detector of a shifted mean', () => {
  it('follows its definition', () => {
    const levels = usualShifts.map((shift) => {
      const factor = (z: number): number => Math.exp(shift * z - (shift * shift) / 2);
      return (factor(0.5) + 1) * factor(-1);
    });
    fed(known, [11, 8]).levels.forEach((level, k) => expect(level).toBeCloseTo(levels[k]!, 12));
    const staked = usualStakes.map((stake) => (1 + stake / 6 + 1) * (1 - (2 * stake) / 6));
    fed(bounded, [3, 6]).levels.forEach((level, k) => expect(level).toBeCloseTo(staked[k]!, 12));
  });

  /* 50 measurements a run. Chance of a false failure below 1e-8 a comparison. */
  it('calls within T measurements at most in the share T / threshold of runs while the mean holds', () => {
    const most = mostMisses(50 / 500);
    const onLine = calls(known, 50, 14, (uniform) => { const normal = normalDeviates(uniform); return () => 10 + 2 * normal(); });
    expect(onLine).toBeLessThanOrEqual(most);
    expect(onLine / paths).toBeGreaterThan(0.02);
    expect(calls(known, 50, 15, (uniform) => { const normal = normalDeviates(uniform); return () => 9 + 2 * normal(); })).toBeLessThan(onLine);
    expect(calls(bounded, 50, 16, (uniform) => () => (uniform() < 0.4 ? 10 : 0))).toBeLessThanOrEqual(most);
  });

  it('calls soon after a shift', () => {
    const shifted = calls(known, 50, 17, (uniform) => { const normal = normalDeviates(uniform); return () => 12 + 2 * normal(); });
    expect(shifted).toBeGreaterThan(0.99 * paths);
    expect(calls(bounded, 50, 18, (uniform) => () => 4 * uniform())).toBeGreaterThan(0.99 * paths);
  });

  it('counts its alarm, lets it stand, and survives storage', () => {
    const state = fed(known, [30, 10, 30]);
    expect(state).toEqual({ levels: usualShifts.map(() => 0), seen: 3, alarms: 2, alarmAt: 1 });
    expect(clearMeanAlarm(state).alarmAt).toBeUndefined();
    expect(clearMeanAlarm(newMeanDetector(known)).alarmAt).toBeUndefined();
    const calm = fed(known, [11, 9, 10.5]);
    const stored = meanDetectorFrom(JSON.parse(JSON.stringify(calm)) as Partial<MeanDetectorState>, known);
    expect(stored.ok && admitMean(stored.value, 12, known)).toEqual(admitMean(calm, 12, known));
    expect(meanDetectorFrom({ ...calm, levels: [] }, known).ok).toBe(false);
    expect(meanDetectorFrom({ ...calm, seen: -1 }, known).ok).toBe(false);
    expect(meanDetectorFrom({ ...calm, alarms: NaN }, known).ok).toBe(false);
    expect(meanDetectorGauge(newMeanDetector(known), known)).toBe(0);
    expect(meanDetectorGauge(calm, known)).toBeGreaterThan(0);
    expect(meanDetectorGauge(calm, known)).toBeLessThan(1);
  });

  it('takes a value that is no number for an alarm, never for calm', () => {
    expect(fed(known, [NaN]).alarms).toBe(1);
    expect(fed(bounded, [NaN]).alarms).toBe(1);
  });

  it('refuses settings that cannot be', () => {
    expect(() => newMeanDetector({ ...known, threshold: 1 })).toThrow('threshold');
    expect(() => newMeanDetector({ ...known, baseline: NaN })).toThrow('baseline');
    expect(() => newMeanDetector({ ...known, model: { kind: 'known sigma', sigma: 0, shifts: [1] } })).toThrow('sigma');
    expect(() => newMeanDetector({ ...known, model: { kind: 'known sigma', sigma: 1, shifts: [] } })).toThrow('shifts');
    expect(() => newMeanDetector({ ...bounded, baseline: 11 })).toThrow('baseline');
    expect(() => newMeanDetector({ ...bounded, model: { kind: 'bounded', from: 0, to: 10, stakes: [1] } })).toThrow('stakes');
  });
});
