import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boundedMeanLower, boundedMeanUpper } from '../../../core/bound/bounded-mean.ts';
import { meanLower, meanLowerKnownSigma, meanUpper, meanUpperKnownSigma } from '../../../core/bound/mean.ts';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import { skewAgainstBound } from '../../../core/bound/skew-guard.ts';
import { sdLower, sdUpper } from '../../../core/bound/standard-deviation.ts';
import { normalQuantileOfTail } from '../../../core/numerics/normal.ts';
import type { Tail } from '../../../core/units.ts';

const asTail = (value: number): Tail => value as Tail;

/** Uniform numbers above 0, below 1, from a fixed seed (a permuted congruential generator). */
function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 747796405) + 2891336453) >>> 0;
    const word = Math.imul((state >>> ((state >>> 28) + 4)) ^ state, 277803737);
    return (((word >>> 22) ^ word) >>> 0) / 2 ** 32 + 2 ** -33;
  };
}

function sampleOf(draw: () => number, n: number): { readonly mean: number; readonly sd: number } {
  const values = Array.from({ length: n }, draw);
  const mean = values.reduce((sum, value) => sum + value, 0) / n;
  return { mean, sd: Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1)) };
}

/** Share of samples whose lower bound stays at or below the true mean. */
function coverage(samples: number, truth: number, bound: () => number): number {
  let covered = 0;
  for (let i = 0; i < samples; i++) if (bound() <= truth) covered += 1;
  return covered / samples;
}

/** Five standard errors; the chance that a right bound lies outside is 6e-7. */
const fiveErrors = (share: number, samples: number): number => 5 * Math.sqrt((share * (1 - share)) / samples);

describe('bounds on a mean', () => {
  it('bottle fill: 20 bottles, t bound by its printed factor', () => {
    // UK SI 2006/659, schedule 2, paragraph 4.5: t(0.995; 19)/sqrt(20) = 0.640
    expect(meanUpper(20, 0, 1, asTail(0.005))).toBeCloseTo(0.64, 3);
    expect(meanLower(20, 500, 2, asTail(0.005))).toBeCloseTo(500 - 2 * 0.6397244259237303, 12);
  });

  it('spread of a gear diameter: printed factors of the bounds on a standard deviation', () => {
    // Boost.Math documentation, 'Confidence intervals on the standard deviation', n = 2, 95 % two-sided; below: 1 / z(0.0125)
    expect(sdUpper(2, 1, asTail(0.025))).toBeCloseTo(31.9102, 4);
    expect(sdLower(2, 1, asTail(0.025))).toBeCloseTo(0.4461, 4);
  });

  it.each([2, 5, 30])('covers as it says, %d normal measurements', (n) => {
    const uniform = seeded(100 + n);
    const draw = (): number => 10 + 3 * normalQuantileOfTail(uniform());
    for (const tail of [0.05, 0.2]) {
      const samples = 20_000;
      const share = coverage(samples, 10, () => {
        const { mean, sd } = sampleOf(draw, n);
        return meanLower(n, mean, sd, asTail(tail));
      });
      expect(Math.abs(share - (1 - tail))).toBeLessThan(fiveErrors(tail, samples));
      const known = coverage(samples, 10, () => meanLowerKnownSigma(n, sampleOf(draw, n).mean, 3, asTail(tail)));
      expect(Math.abs(known - (1 - tail))).toBeLessThan(fiveErrors(tail, samples));
    }
  });

  it('falls short when measurements are skewed against it, and the guard says so', () => {
    const uniform = seeded(7);
    const draw = (): number => 1 + Math.log(uniform());
    const samples = 20_000;
    const share = coverage(samples, 0, () => {
      const { mean, sd } = sampleOf(draw, 10);
      return meanLower(10, mean, sd, asTail(0.05));
    });
    expect(share).toBeLessThan(0.95 - 0.03);
    expect(skewAgainstBound('lower', -2, 30)).toMatchObject({ kind: 'skewed against the bound', skewness: -2 });
    expect(skewAgainstBound('lower', 2, 30)).toBeUndefined();
    expect(skewAgainstBound('upper', 2, 30)).toBeDefined();
    expect(skewAgainstBound('lower', -1.19, 30)).toBeUndefined();
  });

  it('the bound without a distribution covers what is skewed, two-valued or at an end', () => {
    const uniform = seeded(8);
    const cases: readonly (readonly [() => number, number])[] = [
      [() => (uniform() < 0.9 ? 1 : 0), 0.9],
      [() => Math.max(0, 1 + 0.05 * Math.log(uniform())), 0.95],
      [uniform, 0.5],
    ];
    for (const [draw, truth] of cases) {
      for (const n of [5, 50, 400]) {
        const samples = 2000;
        const share = coverage(samples, truth + 1e-6, () => boundedMeanLower({ n, ...sampleOf(draw, n), from: 0, to: 1 }, asTail(0.05)));
        expect(share).toBeGreaterThan(0.95 - fiveErrors(0.05, samples));
      }
    }
  });

  it('never below nominal for two-valued measurements, by adding up every outcome', () => {
    for (const n of [3, 10, 40]) {
      for (const p of [0.02, 0.3, 0.5, 0.9, 0.999]) {
        let chance = (1 - p) ** n;
        let covered = 0;
        for (let x = 0; x <= n; x++) {
          const mean = x / n;
          const sd = Math.sqrt((n * mean * (1 - mean)) / (n - 1));
          if (boundedMeanLower({ n, mean, sd, from: 0, to: 1 }, asTail(0.05)) <= p) covered += chance;
          chance *= ((n - x) / (x + 1)) * (p / (1 - p));
        }
        expect(covered).toBeGreaterThan(0.95);
      }
    }
  });

  it('uses the spread where it is small: fills of 500 +- 1 between 400 and 600', () => {
    const small = boundedMeanLower({ n: 1000, mean: 500, sd: 1, from: 400, to: 600 }, asTail(0.05));
    // empirical Bernstein at half the tail, by hand: 500 - sqrt(2 ln 80 / 1000) - 200 * 7 ln 80 / (3 * 999)
    expect(small).toBeCloseTo(500 - Math.sqrt((2 * Math.log(80)) / 1000) - (1400 * Math.log(80)) / 2997, 9);
    const wide = boundedMeanLower({ n: 1000, mean: 500, sd: 100, from: 400, to: 600 }, asTail(0.05));
    expect(wide).toBeLessThan(small);
    expect(boundedMeanLower({ n: 10, mean: 400, sd: 0, from: 400, to: 600 }, asTail(0.05))).toBe(400);
    // all at the upper end: Hoeffding at half the tail is (tail/2)^(1/n)
    expect(boundedMeanLower({ n: 10, mean: 1, sd: 0, from: 0, to: 1 }, asTail(0.05))).toBeCloseTo(0.025 ** 0.1, 12);
    expect(boundedMeanUpper({ n: 10, mean: 0, sd: 0, from: 0, to: 1 }, asTail(0.05))).toBeCloseTo(1 - 0.025 ** 0.1, 12);
  });

  const anyTail = fc.double({ min: 1e-12, max: 0.5, noNaN: true });
  it('is monotone: more spread or more confidence widens, more measurements narrow', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 1e9 }), fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.double({ min: 1e-6, max: 1e6, noNaN: true }), anyTail, (n, mean, sd, tail) => {
        const bound = meanLower(n, mean, sd, asTail(tail));
        expect(bound).toBeLessThanOrEqual(mean);
        expect(meanLower(n, mean, sd * 1.1, asTail(tail))).toBeLessThanOrEqual(bound);
        expect(meanLower(n, mean, sd, asTail(tail / 2))).toBeLessThanOrEqual(bound);
        expect(meanLower(n + 1, mean, sd, asTail(tail))).toBeGreaterThanOrEqual(bound - 1e-15 * Math.abs(mean));
        expect(meanUpper(n, -mean, sd, asTail(tail))).toBe(-bound);
        expect(sdUpper(n, sd, asTail(tail))).toBeGreaterThan(sdLower(n, sd, asTail(tail)) * (1 - 1e-12));
        expect(meanUpperKnownSigma(n, mean, sd, asTail(tail))).toBeLessThanOrEqual(meanUpper(n, mean, sd, asTail(tail)) + 1e-12 * (Math.abs(mean) + sd));
      }),
      { seed: 21, numRuns: 500 },
    );
  });

  it('names the argument it refuses', () => {
    const refused: readonly (readonly [() => unknown, string])[] = [
      [() => meanLower(1, 0, 1, asTail(0.05)), 'n'],
      [() => meanLower(2.5, 0, 1, asTail(0.05)), 'n'],
      [() => meanLower(2e12, 0, 1, asTail(0.05)), 'n'],
      [() => meanLower(5, NaN, 1, asTail(0.05)), 'mean'],
      [() => meanLower(5, 0, -1, asTail(0.05)), 'sd'],
      [() => meanLower(5, 0, Infinity, asTail(0.05)), 'sd'],
      [() => meanUpper(5, 0, 1, asTail(0)), 'tail'],
      [() => meanUpper(5, 0, 1, asTail(1)), 'tail'],
      [() => meanUpperKnownSigma(0, 0, 1, asTail(0.05)), 'n'],
      [() => meanUpperKnownSigma(1, 0, 0, asTail(0.05)), 'sigma'],
      [() => sdUpper(1, 1, asTail(0.05)), 'n'],
      [() => sdUpper(5, NaN, asTail(0.05)), 'sd'],
      [() => boundedMeanLower({ n: 5, mean: 2, sd: 0, from: 0, to: 1 }, asTail(0.05)), 'mean'],
      [() => boundedMeanLower({ n: 5, mean: 0.5, sd: 2, from: 0, to: 1 }, asTail(0.05)), 'sd'],
      [() => boundedMeanLower({ n: 5, mean: 0.5, sd: 0, from: 1, to: 1 }, asTail(0.05)), 'to'],
      [() => skewAgainstBound('lower', NaN, 10), 'skewness'],
    ];
    for (const [ask, argument] of refused) {
      expect(ask).toThrow(OutOfDomain);
      expect(ask).toThrow(new RegExp(`^${argument} is `));
    }
  });

  it('says -Infinity rather than nothing where the bound leaves the doubles', () => {
    expect(meanLower(2, 0, 1e300, asTail(1e-300))).toBe(-Infinity);
    expect(meanLower(2, 7, 0, asTail(5e-324))).toBe(7);
  });
});
