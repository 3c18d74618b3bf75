import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { demonstratedInLot, lotDemonstrationUnits, violatedInLot } from '../../../core/bound/critical-lot.ts';
import { lotAllowance, lotLower, lotUpper } from '../../../core/bound/finite-lot.ts';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import type { Tail } from '../../../core/units.ts';

const choose = (n: number, k: number): bigint => {
  if (k < 0 || k > n) return 0n;
  let ways = 1n;
  for (let i = 0; i < k; i++) ways = (ways * BigInt(n - i)) / BigInt(i + 1);
  return ways;
};
const waysOf = (x: number, marked: number, sampled: number, size: number): bigint =>
  choose(marked, x) * choose(size - marked, sampled - x);
const atMost = (x: number, marked: number, sampled: number, size: number): bigint =>
  Array.from({ length: x + 1 }, (_, k) => waysOf(k, marked, sampled, size)).reduce((sum, ways) => sum + ways, 0n);

const levels = [[50n, 0.05], [200n, 0.2], [100n, 0.1], [500n, 0.5]] as const;

describe('bounds on a finite lot', () => {
  it('are the strict rule in whole numbers, for every sample of every lot to 16', () => {
    for (const [permille, tail] of levels) {
      for (let lotSize = 1; lotSize <= 16; lotSize++) {
        for (let sampled = 1; sampled <= lotSize; sampled++) {
          const limit = permille * choose(lotSize, sampled);
          for (let x = 0; x <= sampled; x++) {
            const believed = Array.from({ length: lotSize + 1 }, (_, marked) => marked).filter((marked) => 1000n * atMost(x, marked, sampled, lotSize) > limit);
            const sample = { nonconforming: x, sampled, lotSize };
            expect(lotUpper(sample, tail as Tail)).toBe(Math.max(...believed.filter((marked) => marked >= x && marked <= lotSize - sampled + x)));
            expect(lotLower({ ...sample, nonconforming: sampled - x }, tail as Tail)).toBe(lotSize - lotUpper(sample, tail as Tail));
          }
        }
      }
    }
  });

  it('cover every lot at least as often as they say', () => {
    for (const [permille, tail] of levels) {
      for (const [lotSize, sampled] of [[20, 5], [30, 12], [17, 16]] as const) {
        for (let marked = 0; marked <= lotSize; marked++) {
          let [upper, lower] = [0n, 0n];
          for (let x = Math.max(0, sampled - lotSize + marked); x <= Math.min(sampled, marked); x++) {
            const sample = { nonconforming: x, sampled, lotSize };
            if (lotUpper(sample, tail as Tail) >= marked) upper += waysOf(x, marked, sampled, lotSize);
            if (lotLower(sample, tail as Tail) <= marked) lower += waysOf(x, marked, sampled, lotSize);
          }
          const least = (1000n - permille) * choose(lotSize, sampled);
          expect(1000n * upper >= least && 1000n * lower >= least).toBe(true);
        }
      }
    }
  });

  it('turn round into critical counts and sample sizes', () => {
    const lots = fc.integer({ min: 2, max: 1e6 }).chain((lotSize) => fc.record({
      lotSize: fc.constant(lotSize),
      allowed: fc.integer({ min: 0, max: Math.min(lotSize - 1, 2000) }),
      sampled: fc.integer({ min: 1, max: Math.min(lotSize, 5000) }),
      tail: fc.constantFrom(0.2, 0.05, 0.01, 1e-6) as fc.Arbitrary<Tail>,
    }));
    fc.assert(fc.property(lots, ({ lotSize, allowed, sampled, tail }) => {
      const upper = (x: number): number => lotUpper({ nonconforming: x, sampled, lotSize }, tail);
      const lower = (x: number): number => lotLower({ nonconforming: x, sampled, lotSize }, tail);
      const demonstrated = demonstratedInLot(sampled, { lotSize, allowed }, tail);
      if (demonstrated >= 0) expect(upper(demonstrated)).toBeLessThanOrEqual(allowed);
      if (demonstrated < sampled) expect(upper(demonstrated + 1)).toBeGreaterThan(allowed);
      const violated = violatedInLot(sampled, { lotSize, allowed }, tail);
      if (violated <= sampled) expect(lower(violated)).toBeGreaterThan(allowed);
      expect(lower(violated - 1)).toBeLessThanOrEqual(allowed);
      if (demonstrated >= 0) expect(lotDemonstrationUnits(demonstrated, { lotSize, allowed }, tail)).toBeLessThanOrEqual(sampled);
      const units = lotDemonstrationUnits(0, { lotSize, allowed }, tail);
      expect(demonstratedInLot(units, { lotSize, allowed }, tail)).toBeGreaterThanOrEqual(0);
      if (units > 1) expect(demonstratedInLot(units - 1, { lotSize, allowed }, tail)).toBe(-1);
    }), { seed: 20_240_503, numRuns: 200 });
  });

  it('know all of a lot that was inspected whole, and little of a huge one', () => {
    expect(lotUpper({ nonconforming: 3, sampled: 50, lotSize: 50 }, 0.05 as Tail)).toBe(3);
    expect(lotLower({ nonconforming: 3, sampled: 50, lotSize: 50 }, 0.05 as Tail)).toBe(3);
    const huge = lotUpper({ nonconforming: 0, sampled: 1, lotSize: 1e9 }, 1e-300 as Tail);
    expect(huge).toBe(1e9 - 1);
  });

  it('count what a line allows in decimals: 0.1 of 30 is 3', () => {
    expect([lotAllowance(0.1, 30), lotAllowance(0.07, 100), lotAllowance(0.0299, 1000), lotAllowance(0.5, 3)]).toEqual([3, 7, 29, 1]);
  });

  it('name the argument that is out of range', () => {
    expect(() => lotUpper({ nonconforming: 0, sampled: 11, lotSize: 10 }, 0.05 as Tail)).toThrow(/^sampled is 11/);
    expect(() => lotUpper({ nonconforming: 6, sampled: 5, lotSize: 10 }, 0.05 as Tail)).toThrow(OutOfDomain);
    expect(() => lotLower({ nonconforming: 1, sampled: 5, lotSize: 0 }, 0.05 as Tail)).toThrow(/^lotSize/);
    expect(() => lotLower({ nonconforming: 1, sampled: 5, lotSize: 10 }, 0 as Tail)).toThrow(/^tail/);
    expect(() => demonstratedInLot(5, { lotSize: 10, allowed: 10 }, 0.05 as Tail)).toThrow(/^allowed/);
  });
});
