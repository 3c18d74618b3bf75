import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { betaOdds } from '../../../core/numerics/beta-quantile.ts';
import { lnBinomialLower, lnBinomialUpper } from '../../../core/numerics/binomial-tail.ts';
import { gammaOfLowerTail, gammaOfUpperTail } from '../../../core/numerics/gamma-quantile.ts';
import { gammaUpperTail } from '../../../core/numerics/gamma-tail.ts';
import { NoConvergence } from '../../../core/numerics/no-convergence.ts';
import { lnPoissonLower, lnPoissonUpper } from '../../../core/numerics/poisson-tail.ts';
import { rootOfTail, writePoint, type TailPoint } from '../../../core/numerics/tail-root.ts';

const seed = { seed: 20_240_501, numRuns: 400 };
const shape = fc.oneof(
  fc.integer({ min: 1, max: 60 }),
  fc.integer({ min: 1, max: 1e9 }),
  fc.double({ min: 0.5, max: 2000, noNaN: true }),
);
const tail = fc.oneof(
  fc.double({ min: 1e-12, max: 1 - 1e-12, noNaN: true }),
  fc.double({ min: -300, max: -1, noNaN: true }).map((power) => 10 ** power),
);
const near = (found: number, expected: number, within: number): void => {
  expect(Math.abs(found - expected)).toBeLessThanOrEqual(within * Math.abs(expected));
};

describe('the beta quantile', () => {
  it('answers a finite odds, the same one from either side, over all shapes', () => {
    fc.assert(fc.property(shape, shape, fc.double({ min: 1e-9, max: 1 - 1e-9, noNaN: true }), (a, b, t) => {
      const complement = 1 - t;
      if (1 - complement !== t) return; // the complement must be exact to compare
      const odds = betaOdds(a, b, t);
      expect(odds).toBeGreaterThan(0);
      expect(Number.isFinite(odds)).toBe(true);
      near(odds * betaOdds(b, a, complement), 1, 1e-12);
    }), seed);
  });

  it('rises with the tail and falls with the second shape', () => {
    fc.assert(fc.property(shape, shape, tail, tail, (a, b, one, other) => {
      const [low, high] = one < other ? [one, other] : [other, one];
      expect(betaOdds(a, b, low)).toBeLessThanOrEqual(betaOdds(a, b, high) * (1 + 1e-13));
      expect(betaOdds(a, b + 1, low)).toBeLessThanOrEqual(betaOdds(a, b, low) * (1 + 1e-13));
    }), seed);
  });
});

describe('quantiles below the reach of exponents', () => {
  it('follow the leading power: at shapes of 1/2 p = (tail pi/2)^2 and mean = tail^2 pi/4', () => {
    near(betaOdds(0.5, 0.5, 1e-140), (1e-140 * Math.PI) ** 2 / 4, 1e-13);
    near(gammaOfLowerTail(0.5, 1e-140), 1e-280 * (Math.PI / 4), 1e-13);
    expect(betaOdds(0.5, 0.5, 1e-200)).toBe(0);
  });

  it('join the iteration without a step', () => {
    for (const power of [8, 8.5, 9, 9.5, 10]) {
      near(betaOdds(0.5, 0.5, 10 ** -power), (10 ** -power * Math.PI) ** 2 / 4, 1e-13);
      near(gammaOfLowerTail(0.5, 10 ** -power), 10 ** (-2 * power) * (Math.PI / 4), 1e-13);
    }
  });
});

describe('the gamma quantile', () => {
  it('gives back the tail it was asked for', () => {
    fc.assert(fc.property(shape, fc.double({ min: 1e-10, max: 0.5, noNaN: true }), (a, t) => {
      const mean = gammaOfUpperTail(a, t);
      const slope = Math.max(mean - a, Math.sqrt(a), 1);
      near(gammaUpperTail(a, mean), t, 1e-12 + 1e-15 * slope * Math.sqrt(a));
      near(gammaOfLowerTail(a, 1 - t), gammaOfUpperTail(a, 1 - (1 - t)), 1e-12);
    }), seed);
  });

  it('has the chi-square value of 95 % at 10 degrees of freedom (NIST handbook 1.3.6.7.4, memory)', () => {
    expect(2 * gammaOfUpperTail(5, 0.05)).toBeCloseTo(18.307, 3);
  });
});

/** Exact binomial and Poisson sums, term by term, for counts small enough. */
const binomialSum = (from: number, to: number, n: number, p: number): number => {
  let sum = 0;
  let chance = (1 - p) ** n;
  for (let k = 0; k <= to; k++) {
    if (k >= from) sum += chance;
    chance *= ((n - k) / (k + 1)) * (p / (1 - p));
  }
  return sum;
};

describe('the binomial and Poisson tails', () => {
  it('equal the sums term by term', () => {
    const n = 40;
    for (const p of [0.01, 0.2, 0.5, 0.73, 0.97]) {
      for (let x = 0; x <= n; x++) {
        near(Math.exp(lnBinomialLower(x, n, p)), binomialSum(0, x, n, p), 2e-13);
        near(Math.exp(lnBinomialUpper(x, n, p)), binomialSum(x, n, n, p), 2e-13);
      }
    }
  });

  it('add up to 1 from both sides, far out and large', () => {
    for (const [x, n, p] of [[1e6, 1e9, 1e-3], [5e8, 1e9, 0.5], [900, 1e6, 1e-3], [3, 1e9, 1e-9]] as const) {
      expect(Math.exp(lnBinomialLower(x - 1, n, p)) + Math.exp(lnBinomialUpper(x, n, p))).toBeCloseTo(1, 12);
      expect(Math.exp(lnPoissonLower(x - 1, n * p)) + Math.exp(lnPoissonUpper(x, n * p))).toBeCloseTo(1, 12);
    }
  });

  it('answer counts that cannot be', () => {
    expect(lnBinomialLower(-1, 5, 0.1)).toBe(-Infinity);
    expect(lnBinomialLower(5, 5, 0.1)).toBe(0);
    expect(lnBinomialUpper(0, 5, 0.1)).toBe(0);
    expect(lnBinomialUpper(6, 5, 0.1)).toBe(-Infinity);
    expect(lnPoissonLower(-1, 3)).toBe(-Infinity);
    expect(lnPoissonUpper(0, 3)).toBe(0);
  });
});

describe('the solver', () => {
  it('says so when it does not settle', () => {
    const flat = (_: number, point: TailPoint): void => writePoint(point, 1, 1, 1, 0, 0);
    expect(() => rootOfTail(flat, 0, 1)).toThrow(NoConvergence);
    const broken = (_: number, point: TailPoint): void => writePoint(point, NaN, 1, 1, 0, 0);
    expect(() => rootOfTail(broken, 0, 1)).toThrow(NoConvergence);
  });
});
