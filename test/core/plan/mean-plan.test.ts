import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { meanLower, meanUpper } from '../../../core/bound/mean.ts';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import { normalQuantileOfTail } from '../../../core/numerics/normal.ts';
import { chanceOfMeanDemonstration, meanDemonstrationUnits } from '../../../core/plan/mean-demonstration.ts';
import { meanMargin, type MeanEvidence } from '../../../core/plan/mean-margin.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
const fill: MeanEvidence = { n: 30, mean: 501, spread: 2, sigmaKnown: false };

describe('margin of a mean', () => {
  it('the mean may move by the clearance, the spread grow by its factor, and the bound is on the line', () => {
    const promise = { side: 'at-least', line: 500 } as const;
    const { clearance, spreadFactor, untilDemonstrated } = meanMargin(fill, promise, tail);
    expect(clearance).toBeGreaterThan(0);
    expect(untilDemonstrated).toBe(0);
    expect(meanLower(30, 501 - clearance, 2, tail)).toBeCloseTo(500, 12);
    expect(meanLower(30, 501, 2 * spreadFactor!, tail)).toBeCloseTo(500, 12);
  });

  it('counts the measurements that are still missing, exactly', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 50 }), fc.double({ min: 0.01, max: 3, noNaN: true }), fc.boolean(), (n, room, sigmaKnown) => {
        const evidence: MeanEvidence = { n, mean: 500 - room, spread: 2, sigmaKnown };
        const promise = { side: 'at-most', line: 500 } as const;
        const { clearance, untilDemonstrated } = meanMargin(evidence, promise, tail);
        if (untilDemonstrated === 0) expect(clearance).toBeGreaterThanOrEqual(0);
        else {
          const enough = n + untilDemonstrated!;
          expect(meanMargin({ ...evidence, n: enough }, promise, tail).clearance).toBeGreaterThanOrEqual(0);
          expect(meanMargin({ ...evidence, n: enough - 1 }, promise, tail).clearance).toBeLessThan(0);
        }
      }),
      { seed: 61, numRuns: 300 },
    );
  });

  it('says that more measurements cannot help a mean on the wrong side', () => {
    const margin = meanMargin({ ...fill, mean: 499 }, { side: 'at-least', line: 500 }, tail);
    expect(margin.untilDemonstrated).toBeUndefined();
    expect(margin.spreadFactor).toBeUndefined();
    expect(margin.clearance).toBeLessThan(-1);
  });
});

describe('demonstrating a mean', () => {
  const promise = { side: 'at-least', line: 500 } as const;

  it('on the line it passes with the chance of the tail', () => {
    for (const sigmaKnown of [false, true]) {
      for (const n of [2, 10, 1000]) {
        const process = { mean: 500, sigma: 2, sigmaKnown };
        expect(Math.abs(chanceOfMeanDemonstration(n, promise, process, tail) / 0.05 - 1)).toBeLessThan(1e-12);
      }
    }
  });

  it('sigma known: the closed form ((z + z) sigma / distance)^2', () => {
    const process = { mean: 501, sigma: 2, sigmaKnown: true };
    const closed = ((normalQuantileOfTail(0.05) + normalQuantileOfTail(0.1)) * 2) ** 2;
    expect(meanDemonstrationUnits(promise, process, tail, 0.9)).toBe(Math.ceil(closed));
  });

  it('sigma unknown: the smallest number, and a simulation passes as often as said', () => {
    const process = { mean: 501, sigma: 2, sigmaKnown: false };
    const n = meanDemonstrationUnits(promise, process, tail, 0.9)!;
    expect(chanceOfMeanDemonstration(n, promise, process, tail)).toBeGreaterThanOrEqual(0.9);
    expect(chanceOfMeanDemonstration(n - 1, promise, process, tail)).toBeLessThan(0.9);
    let state = 9;
    const uniform = (): number => {
      state = (Math.imul(state, 747796405) + 2891336453) >>> 0;
      const word = Math.imul((state >>> ((state >>> 28) + 4)) ^ state, 277803737);
      return (((word >>> 22) ^ word) >>> 0) / 2 ** 32 + 2 ** -33;
    };
    const chance = chanceOfMeanDemonstration(12, promise, process, tail);
    const samples = 20_000;
    let passed = 0;
    for (let i = 0; i < samples; i++) {
      const values = Array.from({ length: 12 }, () => 501 + 2 * normalQuantileOfTail(uniform()));
      const mean = values.reduce((sum, value) => sum + value, 0) / 12;
      const sd = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / 11);
      if (meanLower(12, mean, sd, tail) >= 500) passed += 1;
    }
    // five standard errors: chance of failing 6e-7
    expect(Math.abs(passed / samples - chance)).toBeLessThan(5 * Math.sqrt((chance * (1 - chance)) / samples));
  });

  it('the other side is the mirror image', () => {
    const mirrored = meanDemonstrationUnits({ side: 'at-most', line: 500 }, { mean: 499, sigma: 2, sigmaKnown: false }, tail, 0.9);
    expect(mirrored).toBe(meanDemonstrationUnits(promise, { mean: 501, sigma: 2, sigmaKnown: false }, tail, 0.9));
    expect(meanUpper(12, 499, 2, tail)).toBeLessThan(500.1);
  });

  it('refuses a mean that cannot demonstrate, and says where no number is enough', () => {
    const ill = { mean: 500, sigma: 2, sigmaKnown: false };
    expect(() => meanDemonstrationUnits(promise, ill, tail, 0.9)).toThrow(OutOfDomain);
    expect(() => meanDemonstrationUnits(promise, { ...ill, mean: 501 }, tail, 1)).toThrow('chance is 1');
    expect(() => chanceOfMeanDemonstration(1, promise, ill, tail)).toThrow('n is 1');
    expect(() => chanceOfMeanDemonstration(5, promise, { ...ill, sigma: 0 }, tail)).toThrow('sigma is 0');
    expect(meanDemonstrationUnits(promise, { mean: 500 + 1e-7, sigma: 2, sigmaKnown: true }, tail, 0.9)).toBeUndefined();
  });
});
