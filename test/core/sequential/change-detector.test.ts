import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { admitFound, admitQuiet, admitRun, clearAlarm, detectorFrom, type DetectorState, newDetector, settled } from '../../../core/sequential/change-detector.ts';
import { conformingToHalfWay, detectorGauge, nonconformingToAlarm } from '../../../core/sequential/detector-reading.ts';
import { fractionDetector, rateDetector, usualRatios } from '../../../core/sequential/detector-tuning.ts';
import { exposureAt, gapAt, mostMisses, paths } from './simulated-paths.ts';

const line = 0.02;
const tuning = fractionDetector(line, 4000);

/** Unit by unit, from the definition. */
function unitByUnit(verdicts: readonly boolean[], ratios: readonly number[], threshold: number): { levels: number[]; alarms: number } {
  let levels = ratios.map(() => 0);
  let alarms = 0;
  for (const conforming of verdicts) {
    levels = levels.map((level, k) => (level + 1) * (conforming ? (1 - ratios[k]! * line) / (1 - line) : ratios[k]!));
    if (levels.reduce((sum, level) => sum + level, 0) / levels.length >= threshold) {
      alarms += 1;
      levels = levels.map(() => 0);
    }
  }
  return { levels, alarms };
}

function restored(state: DetectorState): DetectorState {
  const stored = detectorFrom(JSON.parse(JSON.stringify(state)) as Partial<DetectorState>, tuning);
  if (!stored.ok) throw new Error('a stored detector was refused');
  return stored.value;
}

const mean = (levels: readonly number[]): number => levels.reduce((sum, level) => sum + level, 0) / levels.length;

describe('the detector of a risen fraction', () => {
  it('is the same to the last bit however the stream is cut, restarts included, and follows its definition', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 200 }), { maxLength: 30 }), fc.integer({ min: 1, max: 60 }), (gaps, cut) => {
        let whole = newDetector(tuning);
        let pieces = whole;
        for (const gap of gaps) {
          whole = admitRun(whole, gap, tuning);
          for (let done = 0; done < gap; done += cut) pieces = restored(admitQuiet(pieces, Math.min(cut, gap - done), tuning));
          pieces = restored(admitFound(pieces, 1, tuning));
        }
        expect(pieces).toEqual(whole);
        const verdicts = gaps.flatMap((gap) => [...Array.from({ length: gap }, () => true), false]);
        const expected = unitByUnit(verdicts, usualRatios, tuning.threshold);
        expect(whole.alarms).toBe(expected.alarms);
        expect(whole.seen).toBe(verdicts.length);
        whole.levels.forEach((level, k) => expect(level).toBeCloseTo(expected.levels[k]!, 7));
      }),
      { seed: 2, numRuns: 80 },
    );
  });

  it('is expected to rise by one a unit on the line, however units come in batches', () => {
    /* Every stream of 12 units, or of 4 batches of 3, with its chance: the average level is the number of units. */
    const open = fractionDetector(line, 1e12, [2, 5]);
    for (const batch of [1, 3]) {
      const trials = 12 / batch;
      const chances = batch === 1 ? [1 - line, line] : [0, 1, 2, 3].map((x) => [1, 3, 3, 1][x]! * line ** x * (1 - line) ** (3 - x));
      let expected = 0;
      const walk = (state: DetectorState, chance: number, left: number): void => {
        if (left === 0) expected += chance * mean(settled(state, open));
        else chances.forEach((share, found) => walk(admitFound(state, found, open, batch), chance * share, left - 1));
      };
      walk(newDetector(open), 1, trials);
      expect(expected).toBeCloseTo(12, 10);
    }
  });

  it('steps over quiet batches as it would over each', () => {
    const one = admitFound(newDetector(tuning), 2, tuning, 25);
    let slow = one;
    for (let i = 0; i < 7; i++) slow = admitFound(slow, 0, tuning, 25);
    const quick = admitQuiet(one, 7, tuning, 25);
    settled(quick, tuning).forEach((level, k) => expect(level).toBeCloseTo(settled(slow, tuning)[k]!, 9));
    const mixed = admitQuiet(admitQuiet(quick, 3, tuning), 2, tuning, 25);
    expect(mixed.seen).toBe(25 * 10 + 3);
    expect(admitQuiet(one, 0, tuning)).toBe(one);
  });

  it('counts its alarm, lets it stand until it is taken down, and begins anew', () => {
    let state = newDetector(tuning);
    while (state.alarms === 0) state = admitRun(state, 0, tuning);
    const first = state.seen;
    expect(state.alarmAt).toBe(first);
    expect(state.levels.every((level) => level === 0)).toBe(true);
    while (state.alarms === 1) state = admitRun(state, 0, tuning);
    expect(state.alarmAt).toBe(first);
    const cleared = clearAlarm(state);
    expect(cleared.alarmAt).toBeUndefined();
    expect(cleared.alarms).toBe(2);
    expect(clearAlarm(cleared)).toBe(cleared);
  });

  it('takes a level that is no number for an alarm, never for calm', () => {
    const broken = { ...newDetector(tuning), levels: usualRatios.map(() => NaN) };
    expect(detectorGauge(broken, tuning)).toBeNaN();
    expect(conformingToHalfWay(broken, tuning)).toBeNaN();
    expect(nonconformingToAlarm(broken, tuning)).toBe(1);
    expect(admitRun(broken, 10, tuning).alarms).toBe(1);
    expect(detectorFrom(broken, tuning).ok).toBe(false);
    expect(detectorFrom({ ...newDetector(tuning), levels: [1] }, tuning).ok).toBe(false);
    expect(detectorFrom({ ...newDetector(tuning), seen: -1 }, tuning).ok).toBe(false);
    expect(detectorFrom({ ...newDetector(tuning), quietTrials: 1.5 }, tuning).ok).toBe(false);
    expect(detectorFrom({ ...newDetector(tuning), alarms: -1 }, tuning).ok).toBe(false);
  });

  it('reads as what would come of the units it names', () => {
    let state = newDetector(tuning);
    expect(detectorGauge(state, tuning)).toBe(0);
    for (const gap of [400, 3, 5, 0, 2, 700, 1, 1]) {
      state = admitRun(state, gap, tuning);
      const inRow = nonconformingToAlarm(state, tuning);
      let ahead = state;
      for (let i = 0; i < inRow; i++) {
        expect(ahead.alarms).toBe(state.alarms);
        ahead = admitRun(ahead, 0, tuning);
      }
      expect(ahead.alarms).toBe(state.alarms + 1);
      const calm = conformingToHalfWay(state, tuning);
      expect(detectorGauge(admitQuiet(state, calm, tuning), tuning)).toBeLessThanOrEqual(0.5 + 1e-12);
      if (calm > 0) expect(detectorGauge(admitQuiet(state, calm - 1, tuning), tuning)).toBeGreaterThan(0.5);
      expect(detectorGauge(state, tuning)).toBeGreaterThanOrEqual(0);
      expect(detectorGauge(state, tuning)).toBeLessThan(1);
    }
    const tight = fractionDetector(line, 2 * tuning.rest);
    let stuck = newDetector(tight);
    while (detectorGauge(stuck, tight) <= 0.5) stuck = admitRun(stuck, 30, tight);
    expect(conformingToHalfWay(stuck, tight)).toBe(Infinity);
  });

  it('refuses settings that cannot be', () => {
    expect(() => fractionDetector(0, 1e6)).toThrow('baseline');
    expect(() => fractionDetector(0.001, 500)).toThrow('unitsBetweenFalseCalls is 500, expected a finite number above the rest level 650');
    expect(() => fractionDetector(0.1, 1e6, [2, 11])).toThrow('ratios is 11');
    expect(() => fractionDetector(0.9, 1e6)).toThrow('ratios');
    expect(() => rateDetector(0, 1e6)).toThrow('baseline');
    expect(() => rateDetector(2, 1e6, [1])).toThrow('ratios');
    expect(fractionDetector(0.1, 1e6).once).toEqual([1.5, 2, 3, 5]);
  });

  /* Chance of a false failure below 1e-8 a comparison. */
  it.each([['on the line', 1], ['at half of it', 0.5]] as const)('with the fraction %s calls within T units at most in the share T / threshold of runs', (_, part) => {
    const span = 1000;
    const uniform = seededUniform(12);
    let calls = 0;
    for (let path = 0; path < paths; path++) {
      let state = newDetector(tuning);
      for (;;) {
        const gap = gapAt(part * line, uniform);
        if (state.seen + gap + 1 > span) break;
        state = admitRun(state, gap, tuning);
        if (state.alarms > 0) break;
      }
      calls += state.alarms;
    }
    expect(calls).toBeLessThanOrEqual(mostMisses(span / tuning.threshold));
    if (part === 1) expect(calls / paths).toBeGreaterThan(0.1);
  });
});

describe('the detector of a risen rate', () => {
  const metres = rateDetector(0.02, 4000);

  it('is expected to rise by its exposure on the line', () => {
    const open = rateDetector(0.5, 1e12, [2]);
    let expected = 0;
    let chance = Math.exp(-1);
    for (let found = 0; found < 60; found++) {
      expected += chance * mean(settled(admitFound(newDetector(open), found, open, 2), open));
      chance /= found + 1;
    }
    expect(expected).toBeCloseTo(2, 12);
  });

  it('calls within T metres at most in the share T / threshold of runs', () => {
    /* Records of 5 m each; the count in each is Poisson. Chance of a false failure below 1e-8. */
    const uniform = seededUniform(13);
    let calls = 0;
    for (let path = 0; path < paths; path++) {
      let state = newDetector(metres);
      let next = exposureAt(0.02, uniform);
      for (let from = 0; from < 500 && state.alarms === 0; from += 5) {
        let found = 0;
        for (; next < from + 5; next += exposureAt(0.02, uniform)) found += 1;
        state = found === 0 ? admitQuiet(state, 1, metres, 5) : admitFound(state, found, metres, 5);
      }
      calls += state.alarms;
    }
    expect(calls).toBeLessThanOrEqual(mostMisses(500 / 4000));
    expect(calls / paths).toBeGreaterThan(0.03);
  });

  it('says when one nonconformity in each record is no alarm at all', () => {
    expect(nonconformingToAlarm(newDetector(metres), metres, 200)).toBe(Infinity);
    expect(nonconformingToAlarm(newDetector(metres), metres, 1)).toBeLessThan(10);
  });
});
