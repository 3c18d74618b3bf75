import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { chanceOfLotPassing, chanceOfPassing, fractionPlan, lotPlan, ratePlan, ruleOfThree, yieldPlan } from '../../../core/plan/demonstration.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;

describe('demonstration plans', () => {
  it('are the smallest for what they allow (rows: test/reference, demonstration-n)', () => {
    expect(fractionPlan(0.001, 0, tail)).toEqual({ of: 'units', size: 2995, allowed: 0 });
    expect(fractionPlan(0.05, 0, tail).size).toBe(59);
    expect(yieldPlan(0.985, 1, tail)).toEqual(fractionPlan(0.015, 1, tail));
    expect(ratePlan(0.02, 0, tail).size).toBeCloseTo(-Math.log(0.05) / 0.02, 10);
    expect(lotPlan({ lotSize: 1200, allowed: 59 }, 0, 0.1 as Tail)).toEqual({ of: 'lot', size: 45, allowed: 0 });
  });

  it('let a line that does not hold pass with the tail at most, and fail only just', () => {
    const line = fc.double({ min: 1e-5, max: 0.5, noNaN: true });
    fc.assert(fc.property(line, fc.integer({ min: 0, max: 30 }), fc.constantFrom(0.2, 0.05, 1e-3), (p, allowed, at) => {
      const plan = fractionPlan(p, allowed, at as Tail);
      expect(chanceOfPassing(plan, p)).toBeLessThanOrEqual(at * (1 + 1e-12));
      if (plan.size > allowed + 1) expect(chanceOfPassing({ ...plan, size: plan.size - 1 }, p)).toBeGreaterThan(at * (1 - 1e-12));
      expect(chanceOfPassing(ratePlan(p, allowed, at as Tail), p) / at).toBeCloseTo(1, 9);
    }), { seed: 20_240_505, numRuns: 300 });
  });

  it('pass a faultless line always and a hopeless one never', () => {
    const plan = fractionPlan(0.01, 2, tail);
    expect([chanceOfPassing(plan, 0), chanceOfPassing(plan, 1), chanceOfPassing(ratePlan(1, 2, tail), 0)]).toEqual([1, 0, 1]);
    expect(chanceOfPassing(plan, 0.001)).toBeGreaterThan(chanceOfPassing(plan, 0.002));
    const lot = lotPlan({ lotSize: 1200, allowed: 59 }, 0, 0.1 as Tail);
    expect(chanceOfLotPassing(lot, 60, 1200)).toBeLessThanOrEqual(0.1);
    expect([chanceOfLotPassing(lot, 0, 1200), chanceOfLotPassing(lot, 1200, 1200)]).toEqual([1, 0]);
  });

  it('show the rule of three as the safe rounding it is', () => {
    for (const n of [1, 10, 300, 1e6]) {
      const { says, exact } = ruleOfThree(n);
      expect(says).toBeGreaterThan(exact);
      if (n >= 300) expect(says / exact).toBeLessThan(1.007);
    }
  });

  it('refuse what is out of range', () => {
    expect(() => fractionPlan(0, 0, tail)).toThrow(/^line/);
    expect(() => chanceOfPassing(fractionPlan(0.1, 0, tail), 1.1)).toThrow(/^rate/);
    expect(() => chanceOfPassing(ratePlan(1, 0, tail), NaN)).toThrow(/^rate/);
    expect(() => chanceOfPassing(lotPlan({ lotSize: 10, allowed: 1 }, 0, tail), 0.1)).toThrow(/^plan/);
    expect(() => chanceOfLotPassing(lotPlan({ lotSize: 10, allowed: 1 }, 0, tail), 11, 10)).toThrow(/^marked/);
    expect(() => ruleOfThree(0)).toThrow(/^inspected/);
  });
});
