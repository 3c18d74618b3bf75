import { describe, expect, it } from 'vitest';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { allLooksRateLower, allLooksRateUpper } from '../../../core/sequential/rate-all-looks.ts';
import { largestExposureViolated, smallestExposureDemonstrated } from '../../../core/sequential/rate-critical.ts';
import { gammaPriorAt, logRateEvidenceDemonstrated, logRateEvidenceViolated } from '../../../core/sequential/rate-evidence.ts';
import type { Tail } from '../../../core/units.ts';
import { exposureAt, integral, mostMisses, paths } from './simulated-paths.ts';

const alpha = 0.05 as Tail;
const line = 0.02;
const prior = gammaPriorAt(line);

describe('evidence on a rate of nonconformities', () => {
  it('equals the likelihood ratio averaged over the prior on its side of the line', () => {
    const own = { shape: 2, exposure: 1.5 };
    const tested = 1.2;
    const density = (rate: number): number => rate ** (own.shape - 1) * Math.exp(-own.exposure * rate);
    for (const [count, exposure] of [[0, 0], [0, 4], [3, 2], [9, 3]] as const) {
      const ratio = (rate: number): number => (rate / tested) ** count * Math.exp((tested - rate) * exposure);
      const below = integral((rate) => density(rate) * ratio(rate), 0, tested) / integral(density, 0, tested);
      const above = integral((rate) => density(rate) * ratio(rate), tested, 60, 20_000) / integral(density, tested, 60, 20_000);
      expect(logRateEvidenceDemonstrated(count, exposure, tested, own)).toBeCloseTo(Math.log(below), 9);
      expect(logRateEvidenceViolated(count, exposure, tested, own)).toBeCloseTo(Math.log(above), 9);
    }
  });

  it('is expected to be exactly 1 on the line', () => {
    for (const mean of [0.3, 4, 25]) {
      let logChance = -mean;
      let below = 0;
      let above = 0;
      for (let count = 0; count < 8000; count++) {
        below += Math.exp(logChance + logRateEvidenceDemonstrated(count, mean / line, line, prior));
        above += Math.exp(logChance + logRateEvidenceViolated(count, mean / line, line, prior));
        logChance += Math.log(mean / (count + 1));
      }
      expect(below).toBeCloseTo(1, 10);
      expect(above).toBeCloseTo(1, 10);
    }
  });

  it('is what evidence on a fraction tends to where the fraction is tiny', async () => {
    const { betaPriorAt, logEvidenceDemonstrated } = await import('../../../core/sequential/nonconforming-evidence.ts');
    const own = gammaPriorAt(1e-7);
    expect(logRateEvidenceDemonstrated(3, 1e8, 1e-7, own)).toBeCloseTo(logEvidenceDemonstrated(3, 1e8, 1e-7, betaPriorAt(1e-7)), 5);
  });

  it('has bounds where it is just enough, and thresholds that agree', () => {
    for (const [count, exposure] of [[0, 200], [3, 400], [40, 900]] as const) {
      const upper = allLooksRateUpper(count, exposure, alpha, prior);
      expect(logRateEvidenceDemonstrated(count, exposure, upper, prior)).toBeCloseTo(Math.log(20), 9);
      const lower = allLooksRateLower(count, exposure, alpha, prior);
      if (count > 0) expect(logRateEvidenceViolated(count, exposure, lower, prior)).toBeCloseTo(Math.log(20), 9);
      expect(lower).toBeLessThanOrEqual(count / exposure);
      expect(upper).toBeGreaterThan(count / exposure);
      const from = smallestExposureDemonstrated(count, line, alpha, prior);
      expect(logRateEvidenceDemonstrated(count, from, line, prior)).toBeCloseTo(Math.log(20), 9);
    }
    const upTo = largestExposureViolated(12, line, alpha, prior);
    expect(logRateEvidenceViolated(12, upTo, line, prior)).toBeCloseTo(Math.log(20), 9);
    expect(largestExposureViolated(1, line, alpha, prior)).toBe(0);
  });

  it('answers the ends and refuses what cannot be', () => {
    expect(allLooksRateUpper(0, 0, alpha, prior)).toBe(Infinity);
    expect(allLooksRateLower(0, 10, alpha, prior)).toBe(0);
    expect(allLooksRateLower(0, 0, alpha, prior)).toBe(0);
    expect(() => allLooksRateUpper(-1, 1, alpha, prior)).toThrow('count');
    expect(() => allLooksRateUpper(1, -1, alpha, prior)).toThrow('exposure');
    expect(() => logRateEvidenceViolated(1, 1, 0, prior)).toThrow('line');
    expect(() => smallestExposureDemonstrated(1, 1, 0 as Tail, prior)).toThrow('tail');
    expect(() => gammaPriorAt(NaN)).toThrow('line');
  });

  /* 200 nonconformities a path, looked at all the time. Chance of a false failure below 1e-8 a comparison. */
  it.each([['on the line', line], ['at half of it', line / 2], ['at twice it', 2 * line]] as const)('the bounds miss a rate %s at most once in twenty runs', (_, rate) => {
    const counts = Array.from({ length: 201 }, (_, count) => count);
    const from = counts.map((count) => smallestExposureDemonstrated(count, rate, alpha, prior));
    const upTo = counts.map((count) => largestExposureViolated(count, rate, alpha, prior));
    const uniform = seededUniform(4);
    let demonstrated = 0;
    let violated = 0;
    for (let path = 0; path < paths; path++) {
      let exposure = 0;
      let below = false;
      let above = false;
      for (let count = 0; count < 200; count++) {
        exposure += exposureAt(rate, uniform);
        below ||= exposure >= from[count]!;
        above ||= exposure <= upTo[count + 1]!;
      }
      demonstrated += Number(below);
      violated += Number(above);
    }
    expect(demonstrated).toBeLessThanOrEqual(mostMisses(alpha));
    expect(violated).toBeLessThanOrEqual(mostMisses(alpha));
    expect(demonstrated / paths).toBeGreaterThan(0.03);
    expect(violated / paths).toBeGreaterThan(0.02);
  });
});
