import { describe, expect, it } from 'vitest';
import { demonstratedTogether } from '../../../core/budget/demonstrated-together.ts';
import { type BudgetStream, falseCallsAtMost, spreadBudget } from '../../../core/budget/false-call-budget.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { detectorWatch } from '../../../core/run-length/watch.ts';
import { fractionDetector } from '../../../core/sequential/detector-tuning.ts';
import { betaPriorAt, logEvidenceDemonstrated } from '../../../core/sequential/nonconforming-evidence.ts';
import type { Tail } from '../../../core/units.ts';
import { gapAt } from '../sequential/simulated-paths.ts';

const streams: readonly BudgetStream[] = [
  { perShift: 2000, weight: 1 }, { perShift: 500, weight: 1 }, { perShift: 500, weight: 4 }, { perShift: 40, weight: 0.5 },
];

describe('the budget of false calls', () => {
  it('gives streams of one weight one threshold: the units of a shift over the accepted false calls', () => {
    expect(spreadBudget(0.5, Array.from({ length: 500 }, () => ({ perShift: 2000, weight: 1 })))).toEqual(Array.from({ length: 500 }, () => 2e6));
    const [large, small] = spreadBudget(0.5, streams.slice(0, 2));
    expect(large).toBeCloseTo(5000, 9);
    expect(small).toBeCloseTo(5000, 9);
  });

  it('is used up exactly, however it is shared', () => {
    for (const sharing of ['by size', 'by stream'] as const) {
      expect(falseCallsAtMost(spreadBudget(0.7, streams, sharing), streams)).toBeCloseTo(0.7, 12);
    }
  });

  it('gives four times the weight a quarter of the threshold', () => {
    const [, light, heavy] = spreadBudget(0.5, streams);
    expect(light! / heavy!).toBeCloseTo(4, 12);
    const byStream = spreadBudget(0.5, streams, 'by stream');
    expect(byStream[0]! / byStream[1]!).toBeCloseTo(4, 12);
  });

  it('refuses what cannot be', () => {
    expect(() => spreadBudget(0, streams)).toThrow('falseCalls');
    expect(() => spreadBudget(0.5, [])).toThrow('streams');
    expect(() => spreadBudget(0.5, [{ perShift: 0, weight: 1 }])).toThrow('perShift');
    expect(() => spreadBudget(0.5, [{ perShift: 1, weight: NaN }])).toThrow('weight');
    expect(() => falseCallsAtMost([1], streams)).toThrow('thresholds');
    expect(() => falseCallsAtMost([1, 1, 1, 0], streams)).toThrow('threshold');
  });

  it('is kept by 500 streams, all exactly on their line', () => {
    /* 500 streams of 2,000 units a shift, through 400 shifts: at most 0.5 a shift, so 200 in all. More than 285 has a chance
     * below 1e-8 under a Poisson law of mean 200. */
    const shifts = 400;
    const [threshold] = spreadBudget(0.5, Array.from({ length: 500 }, () => ({ perShift: 2000, weight: 1 })));
    const tuning = fractionDetector(1e-3, threshold!);
    const uniform = seededUniform(41);
    let calls = 0;
    for (let stream = 0; stream < 500; stream++) {
      const watch = detectorWatch(tuning);
      for (let units = gapAt(1e-3, uniform), gap = units; units < 2000 * shifts; gap = gapAt(1e-3, uniform), units += gap + 1) {
        if (!watch.strike(gap)) continue;
        calls += 1;
        watch.reset();
      }
    }
    expect(calls).toBeLessThanOrEqual(285);
    expect(calls).toBeGreaterThan(50);
  });
});

describe('guarantees demonstrated together', () => {
  const alpha = 0.05 as Tail;

  it('are as many as the definition says, the strongest first', () => {
    const evidence = [40, 3, 100, 0.5, 60, 1, 25, 0].map(Math.log);
    expect(demonstratedTogether(evidence, 0.1 as Tail)).toEqual([2, 4, 0, 6]);
    const uniform = seededUniform(42);
    for (let round = 0; round < 200; round++) {
      const e = Array.from({ length: 12 }, () => 0.5 / uniform() ** 2);
      const sorted = [...e].sort((a, b) => b - a);
      const most = sorted.reduce((count, value, k) => (value >= e.length / ((k + 1) * alpha) ? k + 1 : count), 0);
      const named = demonstratedTogether(e.map(Math.log), alpha);
      expect(named.map((place) => e[place])).toEqual(sorted.slice(0, most));
    }
  });

  it('never name evidence that is not a number, and count it among the many', () => {
    expect(demonstratedTogether([NaN, Math.log(41), NaN], alpha)).toEqual([]);
    expect(demonstratedTogether([NaN, Math.log(61), NaN], alpha)).toEqual([1]);
    expect(demonstratedTogether([], alpha)).toEqual([]);
    expect(demonstratedTogether([Infinity, -Infinity], alpha)).toEqual([0]);
    expect(() => demonstratedTogether([1], 1 as Tail)).toThrow('tail');
  });

  it('are wrong in less than one in twenty of those named, with half of 500 lines on their line', () => {
    const prior = betaPriorAt(1e-3);
    const uniform = seededUniform(43);
    const units = 20_000;
    let share = 0;
    let right = 0;
    const rounds = 100;
    for (let round = 0; round < rounds; round++) {
      const evidence = Array.from({ length: 500 }, (_, place) => {
        const rate = place < 250 ? 2.5e-4 : 1e-3;
        let found = 0;
        for (let at = gapAt(rate, uniform); at < units; at += gapAt(rate, uniform) + 1) found += 1;
        return logEvidenceDemonstrated(found, units, 1e-3, prior);
      });
      const named = demonstratedTogether(evidence, alpha);
      const wrong = named.filter((place) => place >= 250).length;
      share += wrong / Math.max(1, named.length) / rounds;
      right += (named.length - wrong) / 250 / rounds;
    }
    /* Simulated elsewhere, 0.001 and 0.87. The share of wrong ones in a round has a standard deviation below 0.01, so 0.01
     * over 100 rounds is nine standard errors above the value. */
    expect(share).toBeLessThan(0.01);
    expect(right).toBeGreaterThan(0.8);
  });
});
