import { describe, expect, it } from 'vitest';
import { designedLower, designedUpper } from '../../../core/bound/clustered-defects.ts';
import { jeffreysLower, jeffreysUpper } from '../../../core/bound/jeffreys.ts';
import { midPLower, midPUpper } from '../../../core/bound/mid-p.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { normalApproximationUpper } from '../../../core/bound/normal-approximation.ts';
import { jeffreysRateUpper, midPRateLower, midPRateUpper, rateLower, rateUpper } from '../../../core/bound/rate.ts';
import { stoppedFractionLower, stoppedFractionUpper } from '../../../core/bound/stopped-sampling.ts';
import { wilsonLower, wilsonUpper } from '../../../core/bound/wilson.ts';
import { yieldLower, yieldUpper } from '../../../core/bound/yield.ts';
import type { Tail } from '../../../core/units.ts';

/*
 * Coverage by enumeration: the exact chance, at a true rate, of all outcomes whose bound holds. The
 * worst rates lie just beside a bound, so these are tried, and a grid besides.
 */
type SampleBound = (nonconforming: number, inspected: number, tail: Tail) => number;

const sizes = [1, 2, 5, 12, 30, 100];
const tails = [0.2, 0.1, 0.05, 0.01, 0.001] as Tail[];

function chancesOf(n: number, p: number): readonly number[] {
  const chances: number[] = [];
  let lnWays = 0;
  for (let x = 0; x <= n; x++) {
    chances.push(Math.exp(lnWays + x * Math.log(p) + (n - x) * Math.log1p(-p)));
    lnWays += Math.log((n - x) / (x + 1));
  }
  return chances;
}

function worstCoverage(bound: SampleBound, holds: (bound: number, p: number) => boolean, n: number, tail: Tail, most = 1): number {
  const bounds = Array.from({ length: n + 1 }, (_, x) => bound(x, n, tail));
  const beside = bounds.flatMap((value) => [value * (1 - 1e-10), value * (1 + 1e-10)]);
  const rates = [0.002, ...beside, ...Array.from({ length: 99 }, (_, i) => (i + 1) / 100)].filter((p) => p > 1e-12 && p < 1 && p <= most);
  return Math.min(...rates.map((p) => chancesOf(n, p).reduce((sum, chance, x) => (holds(bounds[x]!, p) ? sum + chance : sum), 0)));
}

const above = (bound: number, p: number): boolean => bound >= p;
const below = (bound: number, p: number): boolean => bound <= p;
const worstOver = (bound: SampleBound, holds: typeof above, tail: Tail, most = 1): number =>
  Math.min(...sizes.map((n) => worstCoverage(bound, holds, n, tail, most)));

describe('exact bounds on a fraction never cover less than they say', () => {
  it.each(tails)('at tail %d', (tail) => {
    for (const [bound, holds] of [[fractionUpper, above], [fractionLower, below]] as const) {
      const worst = worstOver(bound, holds, tail);
      expect(worst).toBeGreaterThanOrEqual(1 - tail - 1e-9);
      expect(worst).toBeLessThan(1 - tail + 1e-6); // and are reached: no slack is given away
    }
    const yielded = (bound: SampleBound): SampleBound => (x, n, at) => bound(n - x, n, at);
    expect(worstOver(yielded(yieldLower), below, tail)).toBeGreaterThanOrEqual(1 - tail - 1e-9);
    expect(worstOver(yielded(yieldUpper), above, tail)).toBeGreaterThanOrEqual(1 - tail - 1e-9);
  });
});

describe('the other bounds on a fraction fall short as their docs say', () => {
  it.each(tails)('mid-P at tail %d: down to 1 - 2 tail, not below', (tail) => {
    for (const [bound, holds] of [[midPUpper, above], [midPLower, below]] as const) {
      const worst = worstOver(bound, holds, tail);
      expect(worst).toBeGreaterThanOrEqual(1 - 2 * tail - 1e-9);
      expect(worst).toBeLessThan(1 - 2 * tail + 1e-6);
    }
  });

  it('Wilson at 95 %: 0.88 for fractions up to 1/2 above, 0.73 below', () => {
    expect(worstOver(wilsonUpper, above, 0.05 as Tail, 0.5)).toBeCloseTo(0.885, 2);
    expect(worstOver(wilsonLower, below, 0.05 as Tail)).toBeCloseTo(0.73, 2);
  });

  it('Jeffreys at 95 %: 0.83 for fractions up to 1/2 above; none below its value for a faultless sample', () => {
    const worst = worstOver(jeffreysUpper, above, 0.05 as Tail, 0.5);
    expect(worst).toBeGreaterThan(0.83);
    expect(worst).toBeLessThan(0.85);
    expect(worstOver(jeffreysLower, below, 0.05 as Tail)).toBeLessThan(1e-3);
  });

  it('the normal approximation covers nearly nothing where it is refused', () => {
    const forced: SampleBound = (x, n, tail) => {
      const judged = normalApproximationUpper(x, n, tail);
      return judged.ok ? judged.value : judged.fault.wouldSay;
    };
    expect(worstCoverage(forced, above, 100, 0.05 as Tail)).toBeLessThan(0.2);
  });

  it('a planned design effect never covers less on independent units than without it', () => {
    const designed = (bound: typeof designedUpper): SampleBound => (x, n, tail) => bound(x, n, 2.5, tail);
    expect(worstOver(designed(designedUpper), above, 0.05 as Tail)).toBeGreaterThan(0.95);
    expect(worstOver(designed(designedLower), below, 0.05 as Tail)).toBeGreaterThan(0.95);
  });
});

describe('sampling stopped at the x-th nonconforming unit', () => {
  it.each([1, 2, 4])('covers at x = %d', (x) => {
    for (const p of [0.15, 0.3, 0.5, 0.8]) {
      let chance = p ** x;
      let [upper, lower, total] = [0, 0, 0];
      for (let n = x; total < 1 - 1e-12 && n < 2000; n++) {
        if (stoppedFractionUpper(x, n, 0.05 as Tail) >= p) upper += chance;
        if (stoppedFractionLower(x, n, 0.05 as Tail) <= p) lower += chance;
        total += chance;
        chance *= (n / (n - x + 1)) * (1 - p);
      }
      expect(upper).toBeGreaterThanOrEqual(0.95 - 1e-9);
      expect(lower).toBeGreaterThanOrEqual(0.95 - 1e-9);
    }
  });
});

describe('bounds on a rate', () => {
  type Bound = (count: number, exposure: number, tail: Tail) => number;
  const worstRate = (bound: Bound, holds: typeof above, tail: Tail): number => {
    const bounds = Array.from({ length: 120 }, (_, x) => bound(x, 2, tail));
    const rates = bounds.flatMap((value) => [value * (1 - 1e-10), value * (1 + 1e-10)]).filter((rate) => rate > 1e-9 && rate < 20);
    return Math.min(...rates.map((rate) => {
      let chance = Math.exp(-2 * rate);
      let covered = 0;
      bounds.forEach((value, x) => {
        if (holds(value, rate)) covered += chance;
        chance *= (2 * rate) / (x + 1);
      });
      return covered;
    }));
  };

  it.each(tails)('are never below 1 - %d when exact, and reach it', (tail) => {
    for (const [bound, holds] of [[rateUpper, above], [rateLower, below]] as const) {
      expect(worstRate(bound, holds, tail)).toBeGreaterThanOrEqual(1 - tail - 1e-9);
      expect(worstRate(bound, holds, tail)).toBeLessThan(1 - tail + 1e-6);
    }
    expect(worstRate(midPRateUpper, above, tail)).toBeGreaterThanOrEqual(1 - 2 * tail - 1e-9);
    expect(worstRate(midPRateLower, below, tail)).toBeGreaterThanOrEqual(1 - 2 * tail - 1e-9);
  });

  it('Jeffreys at 95 %: 0.85 above', () => {
    expect(worstRate(jeffreysRateUpper, above, 0.05 as Tail)).toBeCloseTo(0.8535, 3);
  });
});
