import { describe, expect, it } from 'vitest';
import { skewAgainstBound } from '../../../core/bound/skew-guard.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { admitBounded, allLooksBoundedLower, emptyBoundedRun } from '../../../core/sequential/mean-bounded.ts';
import { allLooksMeanDistance, logMeanEvidence, tuningFor } from '../../../core/sequential/mean-known-sigma.ts';
import { allLooksMeanDistanceUnknownSigma, logMeanEvidenceUnknownSigma, usualTuning } from '../../../core/sequential/mean-unknown-sigma.ts';
import type { Tail } from '../../../core/units.ts';
import { normalDeviates } from '../../../core/run-length/normal-deviates.ts';
import { integral, mostMisses, paths } from './simulated-paths.ts';

const alpha = 0.05 as Tail;
/* A line of 0.1 with a standard deviation of 1; half of it and twice it lie on either side. */
const line = 0.1;

describe('evidence on a mean, standard deviation known', () => {
  it('equals the likelihood ratio averaged over half a normal prior', () => {
    for (const [sum, spread, tuning] of [[0, 5, 2], [6, 12, 3], [-9, 12, 3]] as const) {
      const average = integral((shift) => Math.exp(shift * sum - (shift * shift * (spread + tuning)) / 2), 0, 30, 20_000);
      expect(logMeanEvidence(sum, spread, tuning)).toBeCloseTo(Math.log(2 * Math.sqrt(tuning / (2 * Math.PI)) * average), 9);
    }
  });

  it('keeps its digits far on the wrong side', () => {
    /* mpmath 1.3, 50 digits: ln 2 + ln(1/401)/2 + z^2/2 + ln Phi(z), z = -1e5/sqrt(401) */
    expect(logMeanEvidence(-1e5, 400, 1)).toBeCloseTo(-11.738716857714952, 11);
  });

  it('has a bound where it is just enough, tightest where it was tuned', () => {
    const tuning = tuningFor(300, 2, alpha);
    for (const n of [1, 30, 300, 1e6]) {
      const distance = allLooksMeanDistance(n, 2, alpha, tuning);
      expect(logMeanEvidence(distance * n, 4 * n, tuning)).toBeCloseTo(Math.log(20), 9);
    }
    const width = (tuned: number): number => allLooksMeanDistance(300, 2, alpha, tuningFor(tuned, 2, alpha));
    expect(width(300)).toBeLessThan(width(150));
    expect(width(300)).toBeLessThan(width(600));
    expect(allLooksMeanDistance(3, 1, 0.999 as Tail, 1)).toBeGreaterThan(0);
  });

  it('refuses what cannot be', () => {
    expect(() => logMeanEvidence(NaN, 1, 1)).toThrow('sum');
    expect(() => logMeanEvidence(1, 0, 1)).toThrow('spread');
    expect(() => allLooksMeanDistance(0, 1, alpha, 1)).toThrow('measurements');
    expect(() => tuningFor(10, 1, 0.5 as Tail)).toThrow('tail');
  });

  /* 600 measurements a path; a true mean on the line, at half of it and at twice it. Chance of a false failure below
   * 1e-8 a comparison. The claims are 'at least the line' and 'at most the line'. */
  it.each([['on the line', line], ['at half of it', line / 2], ['at twice it', 2 * line]] as const)('with the mean %s no false claim is made more than once in twenty runs', (_, mean) => {
    const tuning = tuningFor(100, 1, alpha);
    const reach = Array.from({ length: 601 }, (_, n) => (n === 0 ? Infinity : n * allLooksMeanDistance(n, 1, alpha, tuning)));
    const normal = normalDeviates(seededUniform(5));
    let claimedAbove = 0;
    let claimedBelow = 0;
    for (let path = 0; path < paths; path++) {
      let sum = 0;
      let above = false;
      let below = false;
      for (let n = 1; n <= 600; n++) {
        sum += normal() + mean - line;
        above ||= sum >= reach[n]!;
        below ||= -sum >= reach[n]!;
      }
      claimedAbove += Number(above);
      claimedBelow += Number(below);
    }
    if (mean <= line) expect(claimedAbove).toBeLessThanOrEqual(mostMisses(alpha));
    if (mean >= line) expect(claimedBelow).toBeLessThanOrEqual(mostMisses(alpha));
    if (mean === line) expect(claimedAbove / paths).toBeGreaterThan(0.025);
    if (mean > line) expect(claimedAbove / paths).toBeGreaterThan(0.3);
  });
});

describe('evidence on a mean, standard deviation unknown', () => {
  it('equals the likelihood ratio of the scaled data averaged over half a normal prior', () => {
    const values = [0.3, -0.2, 0.9, 1.4];
    const n = values.length;
    const sum = values.reduce((total, value) => total + value, 0);
    const squares = values.reduce((total, value) => total + value * value, 0);
    const density = (shift: number): number =>
      integral((u) => Math.exp(-n * u - (squares * Math.exp(-2 * u)) / 2 + sum * shift * Math.exp(-u) - (n * shift * shift) / 2), -6, 12, 600);
    const tuning = 2;
    const prior = (shift: number): number => 2 * Math.sqrt(tuning / (2 * Math.PI)) * Math.exp((-tuning * shift * shift) / 2);
    const evidence = integral((shift) => prior(shift) * density(shift), 0, 8, 300) / density(0);
    const average = sum / n;
    expect(logMeanEvidenceUnknownSigma(n, average, squares - n * average * average, tuning)).toBeCloseTo(Math.log(evidence), 8);
  });

  it('has a bound where it is just enough, and none while so few measurements bound nothing', () => {
    for (const n of [15, 100, 1e6]) {
      const distance = allLooksMeanDistanceUnknownSigma(n, n - 1, alpha, usualTuning);
      expect(logMeanEvidenceUnknownSigma(n, distance, n - 1, usualTuning)).toBeCloseTo(Math.log(20), 8);
    }
    expect(allLooksMeanDistanceUnknownSigma(3, 2, alpha, usualTuning)).toBe(Infinity);
    expect(allLooksMeanDistanceUnknownSigma(100, 0, alpha, usualTuning)).toBe(Infinity);
  });

  it('takes measurements without any spread for no evidence at all', () => {
    expect(logMeanEvidenceUnknownSigma(1000, 5, 0, usualTuning)).toBeLessThan(0);
    expect(logMeanEvidenceUnknownSigma(1000, 0, 3, usualTuning)).toBeLessThan(0);
  });

  it('refuses what cannot be', () => {
    expect(() => logMeanEvidenceUnknownSigma(10, Infinity, 1, 5)).toThrow('excess');
    expect(() => logMeanEvidenceUnknownSigma(10, 1, -1, 5)).toThrow('squares');
    expect(() => allLooksMeanDistanceUnknownSigma(1.5, 1, alpha, 5)).toThrow('measurements');
  });

  /** Share of paths of 300 values, centred on their mean, whose average ever strays from it by more than the bound's distance. */
  function missed(value: () => number): { lower: number; guarded: number } {
    const unit = Array.from({ length: 301 }, (_, n) => (n < 2 ? Infinity : allLooksMeanDistanceUnknownSigma(n, 1, alpha, usualTuning)));
    let lower = 0;
    let guarded = 0;
    for (let path = 0; path < paths; path++) {
      let average = 0;
      let squares = 0;
      let cubes = 0;
      let strayed = false;
      let unguarded = false;
      for (let n = 1; n <= 300; n++) {
        const off = value() - average;
        const step = off / n;
        cubes += off * step * step * (n - 1) * (n - 2) - 3 * step * squares;
        squares += off * step * (n - 1);
        average += step;
        if (n < 2 || average < unit[n]! * Math.sqrt(squares)) continue;
        strayed = true;
        unguarded ||= n < 3 || skewAgainstBound('lower', (cubes * Math.sqrt(n)) / squares ** 1.5, n) === undefined;
      }
      lower += Number(strayed);
      guarded += Number(unguarded);
    }
    return { lower, guarded };
  }

  it('misses the mean of Gaussian and of evenly spread values at most once in twenty runs', () => {
    const normal = normalDeviates(seededUniform(6));
    const gauss = missed(normal).lower;
    expect(gauss).toBeLessThanOrEqual(mostMisses(alpha));
    expect(gauss / paths).toBeGreaterThan(0.02);
    const uniform = seededUniform(7);
    expect(missed(() => uniform() - 0.5).lower).toBeLessThanOrEqual(mostMisses(alpha));
  });

  it('fails for values with a long tail downwards; the skewness guard helps but does not cure it', () => {
    const uniform = seededUniform(8);
    const { lower, guarded } = missed(() => 1 + Math.log(uniform()));
    expect(lower).toBeGreaterThan(2 * mostMisses(alpha));
    expect(guarded).toBeLessThan(0.75 * lower);
    expect(guarded).toBeGreaterThan(mostMisses(alpha));
  });
});

describe('evidence on the mean of a bounded measurement', () => {
  it('is a fair bet: on the line it is expected to stay where it is', () => {
    let run = emptyBoundedRun;
    for (const value of [0.2, 0.9, 0.4, 0.4]) run = admitBounded(run, value, 0.3, alpha);
    const bad = admitBounded(run, 0, 0.3, alpha);
    const good = admitBounded(run, 1, 0.3, alpha);
    expect(0.7 * Math.exp(bad.logEvidence) + 0.3 * Math.exp(good.logEvidence)).toBeCloseTo(Math.exp(run.logEvidence), 12);
  });

  it('survives any value and refuses those outside the ends', () => {
    let run = emptyBoundedRun;
    for (let i = 0; i < 2000; i++) run = admitBounded(run, 0, 0.5, alpha);
    expect(Number.isFinite(run.logEvidence)).toBe(true);
    expect(allLooksBoundedLower(run, alpha)).toBeLessThanOrEqual(0);
    expect(allLooksBoundedLower(emptyBoundedRun, alpha)).toBe(-Infinity);
    expect(() => admitBounded(run, 1.01, 0.5, alpha)).toThrow('value');
    expect(() => admitBounded(run, NaN, 0.5, alpha)).toThrow('value');
    expect(() => admitBounded(run, 0.5, 1, alpha)).toThrow('line');
  });

  /* 100 values a path, each a uniform number to the power that gives the mean; a line of 0.4, and means on
   * it, at half and at twice it. Chance of a false failure below 1e-8 a comparison. */
  it.each([['on the line', 0.4], ['at half of it', 0.2], ['at twice it', 0.8]] as const)('with the mean %s neither bound nor claim is wrong more than once in twenty runs', (_, mean) => {
    const uniform = seededUniform(9);
    const power = 1 / mean - 1;
    let claimed = 0;
    let missed = 0;
    for (let path = 0; path < paths; path++) {
      let run = emptyBoundedRun;
      let above = false;
      let over = false;
      for (let n = 1; n <= 100; n++) {
        run = admitBounded(run, uniform() ** power, 0.4, alpha);
        above ||= run.logEvidence >= -Math.log(alpha);
        over ||= allLooksBoundedLower(run, alpha) > mean;
      }
      claimed += Number(above);
      missed += Number(over);
    }
    expect(missed).toBeLessThanOrEqual(mostMisses(alpha));
    if (mean <= 0.4) expect(claimed).toBeLessThanOrEqual(mostMisses(alpha));
    else expect(claimed).toBeGreaterThan(0.99 * paths);
  });
});
