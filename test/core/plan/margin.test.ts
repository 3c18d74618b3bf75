import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { demonstratedCount, violatedCount } from '../../../core/bound/critical-count.ts';
import { fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { runMargin, windowMargin } from '../../../core/plan/margin.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
const turning = { demonstrated: demonstratedCount(10_000, 0.001, tail), violated: violatedCount(10_000, 0.001, tail) };

describe('the margin of a window', () => {
  it('of 10,000 units at 1 in 1,000 turns at 4 and 16', () => {
    expect(windowMargin({ span: 10_000, ages: [9000, 4000] }, turning)).toEqual({
      untilUndemonstrated: 2, untilViolated: 14, untilRelief: 1000, untilDemonstrated: 0,
    });
    expect(windowMargin({ span: 10_000, ages: [9000, 8000, 7000, 300, 200, 100] }, turning)).toEqual({
      untilUndemonstrated: -2, untilViolated: 10, untilRelief: 1000, untilDemonstrated: 2000,
    });
  });

  it('is what counting unit by unit gives', () => {
    const limits = { demonstrated: 1, violated: 5 };
    fc.assert(fc.property(fc.uniqueArray(fc.integer({ min: 0, max: 29 }), { maxLength: 8 }), (places) => {
      const ages = [...places].sort((a, b) => b - a);
      const { untilDemonstrated } = windowMargin({ span: 30, ages }, limits);
      let units = 0;
      while (ages.filter((age) => age + units < 30).length > limits.demonstrated) units += 1;
      expect(untilDemonstrated).toBe(units);
    }), { seed: 20_240_506 });
  });

  it('knows no way back where the window is too small to demonstrate anything', () => {
    expect(windowMargin({ span: 100, ages: [] }, { demonstrated: -1, violated: 3 })).toEqual({
      untilUndemonstrated: -1, untilViolated: 3, untilRelief: undefined, untilDemonstrated: undefined,
    });
  });

  it('refuses ages that cannot be', () => {
    expect(() => windowMargin({ span: 100, ages: [100] }, turning)).toThrow(/^ages/);
    expect(() => windowMargin({ span: 100, ages: [5, 6] }, turning)).toThrow(/^ages/);
    expect(() => windowMargin({ span: 0, ages: [] }, turning)).toThrow(/^span/);
  });
});

describe('the margin of a run', () => {
  it('counts the conforming units still needed: 2,995 for none (methods, section 9)', () => {
    expect(runMargin(0, 0, 0.001, tail)).toEqual({ untilDemonstrated: 2995, affordable: undefined });
    expect(runMargin(1, 4000, 0.001, tail)).toEqual({ untilDemonstrated: 742, affordable: undefined });
  });

  it('is what the bound says, one unit at a time', () => {
    const runs = fc.record({ inspected: fc.integer({ min: 1, max: 3000 }), share: fc.double({ min: 0, max: 0.02, noNaN: true }) });
    fc.assert(fc.property(runs, ({ inspected, share }) => {
      const x = Math.floor(inspected * share);
      const { untilDemonstrated, affordable } = runMargin(x, inspected, 0.02, tail);
      const holds = (nonconforming: number, units: number): boolean => units > 0 && fractionUpper(nonconforming, units, tail) <= 0.02;
      expect(holds(x, inspected + untilDemonstrated)).toBe(true);
      if (untilDemonstrated > 0) expect(holds(x, inspected + untilDemonstrated - 1)).toBe(false);
      if (affordable !== undefined) {
        expect(holds(x + affordable, inspected + affordable)).toBe(true);
        expect(holds(x + affordable + 1, inspected + affordable + 1)).toBe(false);
      }
    }), { seed: 20_240_507 });
  });

  it('refuses counts that cannot be', () => {
    expect(() => runMargin(2, 1, 0.1, tail)).toThrow(/^nonconforming/);
    expect(() => runMargin(0, -1, 0.1, tail)).toThrow(/^inspected/);
  });
});
