import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { capabilityLower, capabilityUpper, distanceLower, distanceUpper } from '../../../core/bound/capability.ts';
import { fractionBeyondLower, fractionBeyondUpper } from '../../../core/bound/fraction-beyond-limit.ts';
import { modelledFractionUpper } from '../../../core/bound/modelled-fraction.ts';
import { fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { normalFit } from '../../../core/bound/normality.ts';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import { toleranceFactor, toleranceRank, toleranceRankUnits } from '../../../core/bound/tolerance.ts';
import { normalQuantileOfTail, normalTail } from '../../../core/numerics/normal.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
const relative = (got: number, wanted: number): number => Math.abs(got / wanted - 1);

describe('fraction beyond a limit by the normal model', () => {
  it('turns the tolerance factor round: at k the bound is what the factor leaves uncovered', () => {
    for (const [n, coverage, confidence] of [[10, 0.99, 0.05], [60, 0.999, 0.01], [5000, 0.9, 0.1]] as const) {
      const k = toleranceFactor(n, coverage, confidence as Tail);
      expect(relative(fractionBeyondUpper(n, k, confidence as Tail), 1 - coverage)).toBeLessThan(1e-11);
    }
  });

  it('at k = 0 it is the tail of the t bound in closed form: z sqrt(n) is normal', () => {
    for (const n of [2, 9, 400]) {
      const wanted = normalTail(-normalQuantileOfTail(tail) / Math.sqrt(n));
      expect(relative(fractionBeyondUpper(n, 0, tail), wanted)).toBeLessThan(1e-13);
      expect(relative(fractionBeyondLower(n, 0, tail), 1 - wanted)).toBeLessThan(1e-13);
    }
  });

  it('is a third of the distance for a capability index, mirrored for the other side', () => {
    expect(capabilityLower(25, 1.2, tail)).toBe(distanceLower(25, 3 * 1.2, tail) / 3);
    expect(capabilityUpper(25, 1.2, tail)).toBe(-capabilityLower(25, -1.2, tail));
    expect(capabilityUpper(25, 1.2, tail)).toBeGreaterThan(1.2);
  });

  it('stands on the safe side of 0 where no double is left', () => {
    expect(fractionBeyondUpper(1000, 60, tail)).toBe(Number.MIN_VALUE);
    expect(fractionBeyondLower(1000, 60, tail)).toBe(0);
    expect(fractionBeyondUpper(1000, -60, tail)).toBe(1);
  });

  it('is monotone and keeps its sides over the whole range, without NaN', () => {
    const anyTail = fc.oneof(fc.double({ min: 1e-9, max: 0.5, noNaN: true }), fc.constantFrom(1e-15, 1e-30, 1e-60));
    fc.assert(
      fc.property(
        fc.oneof(fc.integer({ min: 2, max: 50 }), fc.integer({ min: 2, max: 1e9 })),
        fc.oneof(fc.double({ min: -10, max: 10, noNaN: true }), fc.double({ min: -9e8, max: 9e8, noNaN: true })),
        anyTail,
        (n, k, alpha) => {
          const upper = fractionBeyondUpper(n, k, alpha as Tail);
          const lower = fractionBeyondLower(n, k, alpha as Tail);
          expect(upper).toBeGreaterThan(0);
          expect(upper).toBeLessThanOrEqual(1);
          expect(lower).toBeLessThanOrEqual(upper * (1 + 1e-9));
          const slack = 1 + 1e-12 * (1 + k * k);
          expect(fractionBeyondUpper(n, k, (alpha * 0.9) as Tail)).toBeGreaterThanOrEqual(upper / slack);
          if (k > 0) expect(fractionBeyondUpper(n, k * 1.01, alpha as Tail)).toBeLessThanOrEqual(upper * slack);
          expect(distanceLower(n, k, alpha as Tail)).toBeLessThanOrEqual(distanceUpper(n, k, alpha as Tail) + 1e-12 * (1 + Math.abs(k)));
        },
      ),
      { seed: 31, numRuns: 400 },
    );
  });

  it('names the argument it refuses', () => {
    const refused: readonly (readonly [() => unknown, string])[] = [
      [() => fractionBeyondUpper(1, 3, tail), 'n'],
      [() => fractionBeyondUpper(10, NaN, tail), 'k'],
      [() => fractionBeyondUpper(10, Infinity, tail), 'k'],
      [() => fractionBeyondUpper(10, 3, 0 as Tail), 'tail'],
      [() => capabilityLower(10, 1e9, tail), 'estimate'],
      [() => toleranceFactor(10, 1, tail), 'coverage'],
      [() => toleranceRank(0, 0.9, tail), 'n'],
      [() => toleranceRankUnits(0, 0.9, tail), 'rank'],
      [() => normalFit([1, 2, NaN, 4, 5, 6, 7, 8], 0.05), 'values'],
      [() => normalFit([1, 2], 1), 'level'],
    ];
    for (const [ask, argument] of refused) {
      expect(ask).toThrow(OutOfDomain);
      expect(ask).toThrow(new RegExp(`^${argument} is `));
    }
  });
});

describe('tolerance bounds without a distribution', () => {
  it('first ranks of Wilks: 59, 93 and 124 for 95 %/95 %, 299 for 99 %/95 %', () => {
    // S. S. Wilks 1941, from memory
    expect([1, 2, 3].map((rank) => toleranceRankUnits(rank, 0.95, tail))).toEqual([59, 93, 124]);
    expect(toleranceRankUnits(1, 0.99, tail)).toBe(299);
    expect(toleranceRank(58, 0.95, tail)).toBe(0);
    expect(toleranceRank(59, 0.95, tail)).toBe(1);
    expect(toleranceRank(124, 0.95, tail)).toBe(3);
  });

  it('the rank bounds what the counted bound says', () => {
    for (const n of [120, 500, 3000]) {
      const rank = toleranceRank(n, 0.97, tail);
      expect(fractionUpper(rank - 1, n, tail)).toBeLessThanOrEqual(0.03 * (1 + 1e-12));
      expect(fractionUpper(rank, n, tail)).toBeGreaterThan(0.03);
    }
  });
});

describe('fit of the normal model', () => {
  const spread = (n: number, shape: (tailAbove: number) => number): number[] =>
    Array.from({ length: n }, (_, i) => shape((i + 0.5) / n));

  it('fits normal scores, does not fit exponential or two-valued ones, asks for eight values', () => {
    expect(normalFit(spread(50, normalQuantileOfTail), 0.05).kind).toBe('fits');
    expect(normalFit(spread(50, Math.log), 0.05).kind).toBe('does not fit');
    expect(normalFit(spread(50, (u) => (u < 0.5 ? 1 : 2)), 0.05).kind).toBe('does not fit');
    expect(normalFit(spread(50, () => 3), 0.05)).toMatchObject({ kind: 'does not fit', pValue: 0 });
    expect(normalFit([1, 2, 3], 0.05)).toEqual({ kind: 'too few values', n: 3, needed: 8 });
  });

  it('calls a normal sample unfit as often as it says', () => {
    let state = 5;
    const uniform = (): number => {
      state = (Math.imul(state, 747796405) + 2891336453) >>> 0;
      const word = Math.imul((state >>> ((state >>> 28) + 4)) ^ state, 277803737);
      return (((word >>> 22) ^ word) >>> 0) / 2 ** 32 + 2 ** -33;
    };
    for (const [n, level] of [[10, 0.05], [40, 0.05], [40, 0.2]] as const) {
      const samples = 4000;
      let unfit = 0;
      for (let i = 0; i < samples; i++) {
        const values = Array.from({ length: n }, () => 50 + 2 * normalQuantileOfTail(uniform()));
        if (normalFit(values, level).kind === 'does not fit') unfit += 1;
      }
      // five standard errors (chance 6e-7) and the two hundredths of the level by which the p-value curves may be off
      expect(Math.abs(unfit / samples - level)).toBeLessThan(5 * Math.sqrt((level * (1 - level)) / samples) + 0.02 * level);
    }
  });

  it('gives no bound past a fit that fails, and shows the fit beside one that is given', () => {
    const good = normalFit(spread(50, normalQuantileOfTail), 0.05);
    const given = modelledFractionUpper(good, 50, 3, tail);
    expect(given).toEqual({ ok: true, value: { bound: fractionBeyondUpper(50, 3, tail), fit: good } });
    for (const bad of [normalFit(spread(50, Math.log), 0.05), normalFit([1, 2], 0.05)]) {
      expect(modelledFractionUpper(bad, 50, 3, tail)).toEqual({ ok: false, fault: { kind: 'model refused', fit: bad } });
    }
  });
});
