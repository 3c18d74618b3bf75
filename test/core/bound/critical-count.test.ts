import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { demonstratedCount, demonstrationUnits, violatedCount, violationUnits } from '../../../core/bound/critical-count.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import type { Tail } from '../../../core/units.ts';

const seed = { seed: 20_240_502, numRuns: 400 };
const tail = fc.double({ min: -9, max: Math.log10(0.5), noNaN: true }).map((power) => 10 ** power as Tail);
const line = fc.double({ min: -6, max: Math.log10(0.9), noNaN: true }).map((power) => 10 ** power);

/** Sum of binomial chances as a fraction of whole numbers: p = percent/100. */
function sumInWholes(from: number, to: number, n: number, percent: number): bigint {
  let ways = 1n;
  let sum = 0n;
  for (let k = 0; k <= to; k++) {
    if (k >= from) sum += ways * BigInt(percent) ** BigInt(k) * BigInt(100 - percent) ** BigInt(n - k);
    ways = (ways * BigInt(n - k)) / BigInt(k + 1);
  }
  return sum;
}

describe('critical counts', () => {
  it('are those of the table (methods, section 1, 50-digit arithmetic): 10,000 units at 1 in 1,000', () => {
    const levels = [0.05, 0.01, 0.001] as Tail[];
    expect(levels.map((at) => demonstratedCount(10_000, 0.001, at))).toEqual([4, 2, 1]);
    expect(levels.map((at) => violatedCount(10_000, 0.001, at))).toEqual([16, 19, 22]);
    expect(demonstrationUnits(0, 0.001, 0.05 as Tail)).toBe(2995);
  });

  it('are exact in whole numbers, for every size to 40, with every tie', () => {
    for (const percent of [1, 10, 50, 90]) {
      for (const [permille, at] of [[50n, 0.05], [500n, 0.5], [810n, 0.81], [125n, 0.125]] as const) {
        for (let n = 1; n <= 40; n++) {
          const limit = permille * 100n ** BigInt(n);
          const atMost = (from: number, to: number): boolean => 1000n * sumInWholes(from, to, n, percent) <= limit;
          let demonstrated = -1;
          while (atMost(0, demonstrated + 1)) demonstrated += 1;
          let violated = n + 1;
          while (atMost(violated - 1, n)) violated -= 1;
          expect(demonstratedCount(n, percent / 100, at as Tail)).toBe(demonstrated);
          expect(violatedCount(n, percent / 100, at as Tail)).toBe(violated);
        }
      }
    }
  });

  it('agree with the bounds they stand for', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 1e9 }), line, tail, (n, p, at) => {
      const demonstrated = demonstratedCount(n, p, at);
      if (demonstrated >= 0) expect(fractionUpper(demonstrated, n, at)).toBeLessThanOrEqual(p * (1 + 1e-12));
      if (demonstrated + 1 < n) expect(fractionUpper(demonstrated + 1, n, at)).toBeGreaterThan(p * (1 - 1e-12));
      const violated = violatedCount(n, p, at);
      if (violated <= n) expect(fractionLower(violated, n, at)).toBeGreaterThanOrEqual(p * (1 - 1e-12));
      expect(fractionLower(violated - 1, n, at)).toBeLessThan(p * (1 + 1e-12));
    }), seed);
  });

  it('and units answer the same question from both ends', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 1e6 }), line, tail, (x, p, at) => {
      const units = demonstrationUnits(x, p, at);
      expect(demonstratedCount(units, p, at)).toBeGreaterThanOrEqual(x);
      expect(units === x + 1 || demonstratedCount(units - 1, p, at) < x).toBe(true);
      const most = violationUnits(x, p, at);
      if (most > 0) expect(violatedCount(most, p, at)).toBeLessThanOrEqual(x);
      expect(violatedCount(Math.max(most + 1, x, 1), p, at)).toBeGreaterThan(x);
    }), seed);
  });

  it('never let one sample be demonstrated and violated at tails up to 1/2', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 1e6 }), line, tail, (n, p, at) => {
      expect(demonstratedCount(n, p, at)).toBeLessThan(violatedCount(n, p, at));
    }), seed);
  });

  it('answer the ends', () => {
    expect(demonstratedCount(1, 0.5, 0.05 as Tail)).toBe(-1);
    expect(violatedCount(1, 0.5, 0.05 as Tail)).toBe(2);
    expect(violationUnits(0, 0.1, 0.05 as Tail)).toBe(0);
    expect(violationUnits(1, 0.1, 0.05 as Tail)).toBe(0);
    expect(demonstrationUnits(0, 0.999, 0.5 as Tail)).toBe(1);
    expect(demonstratedCount(1e9, 0.5, 1e-300 as Tail)).toBeGreaterThan(4.99e8);
    expect(demonstrationUnits(3, 1e-9, 1e-300 as Tail)).toBeGreaterThan(6.9e11);
  });

  it('name the argument that is out of range', () => {
    const bad = (run: () => number, argument: string): void => {
      expect(run).toThrow(OutOfDomain);
      expect(run).toThrow(argument);
    };
    bad(() => demonstratedCount(0, 0.1, 0.05 as Tail), 'inspected');
    bad(() => violatedCount(10.5, 0.1, 0.05 as Tail), 'inspected');
    bad(() => demonstrationUnits(-1, 0.1, 0.05 as Tail), 'nonconforming');
    bad(() => violationUnits(2 ** 53, 0.1, 0.05 as Tail), 'nonconforming');
    bad(() => demonstratedCount(10, 0, 0.05 as Tail), 'line');
    bad(() => demonstratedCount(10, 1, 0.05 as Tail), 'line');
    bad(() => demonstratedCount(10, NaN, 0.05 as Tail), 'line');
    bad(() => demonstratedCount(10, 0.1, 1.5 as Tail), 'tail');
    bad(() => demonstrationUnits(0, 1e-300, 0.05 as Tail), 'line');
  });
});
