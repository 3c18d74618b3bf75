import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { demonstratedNonconformities, demonstrationExposure, violatedNonconformities, violationExposure } from '../../../core/bound/critical-exposure.ts';
import { jeffreysLower, jeffreysUpper } from '../../../core/bound/jeffreys.ts';
import { midPLower, midPUpper } from '../../../core/bound/mid-p.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { normalApproximationLower, normalApproximationUpper } from '../../../core/bound/normal-approximation.ts';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import { jeffreysRateLower, jeffreysRateUpper, midPRateLower, midPRateUpper, rateLower, rateUpper } from '../../../core/bound/rate.ts';
import { stoppedFractionLower, stoppedFractionUpper } from '../../../core/bound/stopped-sampling.ts';
import { tailOfConfidence } from '../../../core/bound/tail-of.ts';
import { wilsonLower, wilsonUpper } from '../../../core/bound/wilson.ts';
import { lineOfYield, yieldLower, yieldUpper } from '../../../core/bound/yield.ts';
import type { Tail } from '../../../core/units.ts';

const seed = { seed: 20_240_504, numRuns: 600 };
const size = fc.oneof(fc.integer({ min: 1, max: 50 }), fc.integer({ min: 1, max: 1e9 }), fc.constantFrom(1, 2, 1e9));
const sample = size.chain((inspected) => fc.record({
  inspected: fc.constant(inspected),
  nonconforming: fc.oneof(
    fc.constantFrom(0, 1, inspected, inspected - 1, Math.floor(inspected / 2)),
    fc.integer({ min: 0, max: inspected }),
    fc.integer({ min: 0, max: Math.min(inspected, 2000) }),
  ),
}));
const tail = fc.oneof(
  fc.double({ min: -300, max: -1, noNaN: true }).map((power) => 10 ** power),
  fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }),
  fc.constantFrom(0.05, 0.5, 5e-324, 1e-310, 1 - 2 ** -53),
) as fc.Arbitrary<Tail>;

const pairs = {
  exact: [fractionLower, fractionUpper],
  'mid-P': [midPLower, midPUpper],
  Wilson: [wilsonLower, wilsonUpper],
  Jeffreys: [jeffreysLower, jeffreysUpper],
} as const;

describe.each(Object.entries(pairs))('%s bounds on a fraction', (_, [lower, upper]) => {
  it('answer a fraction over the whole space of arguments, and mirror each other', () => {
    fc.assert(fc.property(sample, tail, ({ nonconforming, inspected }, at) => {
      const [low, high] = [lower(nonconforming, inspected, at), upper(nonconforming, inspected, at)];
      for (const bound of [low, high]) expect(bound >= 0 && bound <= 1).toBe(true);
      if (at < 0.5) expect(low).toBeLessThanOrEqual(high);
      expect(lower(inspected - nonconforming, inspected, at)).toBeCloseTo(1 - high, 12);
    }), seed);
  });

  it('never fall when a unit turns nonconforming, nor when the confidence grows', () => {
    fc.assert(fc.property(sample, tail, tail, ({ nonconforming, inspected }, one, other) => {
      const [small, large] = [Math.min(one, other) as Tail, Math.max(one, other) as Tail];
      const slack = 1 + 1e-12;
      if (nonconforming < inspected) {
        expect(upper(nonconforming, inspected, one)).toBeLessThanOrEqual(upper(nonconforming + 1, inspected, one) * slack);
        expect(lower(nonconforming, inspected, one)).toBeLessThanOrEqual(lower(nonconforming + 1, inspected, one) * slack);
      }
      expect(upper(nonconforming, inspected, large)).toBeLessThanOrEqual(upper(nonconforming, inspected, small) * slack);
      expect(lower(nonconforming, inspected, small)).toBeLessThanOrEqual(lower(nonconforming, inspected, large) * slack);
    }), seed);
  });

  it.each([[3, 2, 0.05, 'nonconforming'], [0, 0, 0.05, 'inspected'], [0.5, 3, 0.05, 'nonconforming'], [-1, 3, 0.05, 'nonconforming'],
    [NaN, 3, 0.05, 'nonconforming'], [1, Infinity, 0.05, 'inspected'], [1, 3, 0, 'tail'], [1, 3, 1, 'tail'], [1, 3, 1.5, 'tail'], [1, 3, NaN, 'tail'],
  ])('refuse %d of %d at tail %d and name %s', (x, n, at, argument) => {
    for (const bound of [lower, upper]) {
      expect(() => bound(x, n, at as Tail)).toThrow(OutOfDomain);
      expect(() => bound(x, n, at as Tail)).toThrow(new RegExp(`^${argument} is`));
    }
  });
});

describe('bounds on a fraction at the ends', () => {
  it('answer without a solver', () => {
    const at = 0.05 as Tail;
    expect(fractionUpper(7, 7, at)).toBe(1);
    expect(fractionLower(0, 7, at)).toBe(0);
    expect(fractionUpper(0, 1, at)).toBeCloseTo(0.95, 15);
    expect(fractionLower(1, 1, at)).toBeCloseTo(0.05, 15);
    expect(stoppedFractionUpper(1, 1, at)).toBe(1);
    expect(stoppedFractionUpper(1, 20, at)).toBe(fractionUpper(0, 19, at));
    expect(stoppedFractionLower(2, 20, at)).toBe(fractionLower(2, 20, at));
    expect(() => stoppedFractionUpper(0, 20, at)).toThrow(/^nonconforming/);
    expect(midPUpper(0, 5, 0.6 as Tail)).toBe(0);
    expect(midPLower(5, 5, 0.6 as Tail)).toBe(1);
  });

  it('the exact bounds are wider than the mid-P bounds', () => {
    fc.assert(fc.property(sample, tail.filter((at) => at < 0.5), ({ nonconforming, inspected }, at) => {
      expect(fractionUpper(nonconforming, inspected, at)).toBeGreaterThanOrEqual(midPUpper(nonconforming, inspected, at) * (1 - 1e-12));
      expect(fractionLower(nonconforming, inspected, at)).toBeLessThanOrEqual(midPLower(nonconforming, inspected, at) * (1 + 1e-12));
    }), seed);
  });
});

describe('yield', () => {
  it('keeps its digits where one minus the other bound loses them', () => {
    const at = 1e-6 as Tail;
    expect(yieldLower(999_999, 1_000_000, at)).toBe(fractionLower(1, 1_000_000, at));
    expect(yieldUpper(1, 1_000_000, at)).toBe(fractionUpper(999_999, 1_000_000, at));
    expect(() => yieldLower(5, 4, at)).toThrow(/^nonconforming/);
  });

  it('is promised as a fraction in decimals', () => {
    expect([lineOfYield(0.985), lineOfYield(0.999999), lineOfYield(0.9)]).toEqual([0.015, 1e-6, 0.1]);
    expect(() => lineOfYield(1)).toThrow(/^yieldLine/);
  });
});

describe('the normal approximation', () => {
  it('is refused where either kind of unit is scarce, and says what it would have said', () => {
    expect(normalApproximationUpper(0, 10_000, 0.05 as Tail)).toEqual({ ok: false, fault: { kind: 'too-few-for-normal', scarce: 0, needed: 10, wouldSay: 0 } });
    expect(normalApproximationLower(9_995, 10_000, 0.05 as Tail)).toMatchObject({ ok: false, fault: { scarce: 5 } });
  });

  it('is near the exact bound where it is not', () => {
    const judged = normalApproximationUpper(5_000, 10_000, 0.05 as Tail);
    expect(judged.ok && judged.value).toBeCloseTo(fractionUpper(5_000, 10_000, 0.05 as Tail), 3);
  });
});

describe('bounds on a rate', () => {
  const count = fc.oneof(fc.integer({ min: 0, max: 60 }), fc.integer({ min: 0, max: 1e9 }));
  const exposure = fc.double({ min: 1e-9, max: 1e9, noNaN: true });
  const bounds = [[rateLower, rateUpper], [midPRateLower, midPRateUpper], [jeffreysRateLower, jeffreysRateUpper]] as const;

  it('answer over the whole space of arguments, and rise with the count', () => {
    fc.assert(fc.property(count, exposure, tail, (x, e, at) => {
      for (const [lower, upper] of bounds) {
        for (const bound of [lower, upper]) {
          const found = bound(x, e, at);
          expect(found >= 0 && found < Infinity).toBe(true);
          expect(found).toBeLessThanOrEqual(bound(x + 1, e, at) * (1 + 1e-12));
        }
        if (at < 0.5) expect(lower(x, e, at)).toBeLessThanOrEqual(upper(x, e, at));
      }
    }), seed);
  });

  it('are the limit of bounds on a small fraction', () => {
    for (const x of [0, 1, 7, 300]) {
      expect(fractionUpper(x, 1e9, 0.05 as Tail) * 1e9).toBeCloseTo(rateUpper(x, 1, 0.05 as Tail), 4);
      expect(fractionLower(x, 1e9, 0.05 as Tail) * 1e9).toBeCloseTo(rateLower(x, 1, 0.05 as Tail), 4);
    }
  });

  it('turn round into counts and exposures that agree with them', () => {
    const line = fc.double({ min: 1e-4, max: 100, noNaN: true });
    const small = tail.filter((at) => at < 0.5 && at > 1e-12);
    fc.assert(fc.property(fc.double({ min: 0.01, max: 1e5, noNaN: true }), line, small, (e, at, alpha) => {
      const demonstrated = demonstratedNonconformities(e, at, alpha);
      if (demonstrated >= 0) expect(rateUpper(demonstrated, e, alpha)).toBeLessThanOrEqual(at * (1 + 1e-12));
      expect(rateUpper(demonstrated + 1, e, alpha)).toBeGreaterThan(at * (1 - 1e-12));
      const violated = violatedNonconformities(e, at, alpha);
      expect(rateLower(violated, e, alpha)).toBeGreaterThanOrEqual(at * (1 - 1e-12));
      expect(rateLower(violated - 1, e, alpha)).toBeLessThan(at * (1 + 1e-12));
      expect(rateUpper(3, demonstrationExposure(3, at, alpha), alpha) / at).toBeCloseTo(1, 12);
      expect(rateLower(3, violationExposure(3, at, alpha), alpha) / at).toBeCloseTo(1, 12);
    }), seed);
  });

  it('refuse what is out of range and name it', () => {
    expect(violationExposure(0, 1, 0.05 as Tail)).toBe(0);
    expect(() => rateUpper(-1, 1, 0.05 as Tail)).toThrow(/^count/);
    expect(() => rateLower(1, 0, 0.05 as Tail)).toThrow(/^exposure/);
    expect(() => midPRateUpper(1, Infinity, 0.05 as Tail)).toThrow(/^exposure/);
    expect(() => demonstratedNonconformities(1, -1, 0.05 as Tail)).toThrow(/^line/);
    expect(() => violatedNonconformities(1e9, 1e9, 0.05 as Tail)).toThrow(/^exposure/);
    expect(() => demonstrationExposure(0, 1, 2 as Tail)).toThrow(/^tail/);
  });
});

describe('the tail of a confidence level', () => {
  it('is its complement in decimal digits', () => {
    const levels = [0.95, 0.999999, '0.99999999999999999999', 0.1, 1e-7, '.5', '9.5e-1', '0.90'];
    expect(levels.map(tailOfConfidence)).toEqual([0.05, 1e-6, 1e-20, 0.9, 0.9999999, 0.5, 0.05, 0.1]);
    expect(1 - 0.999999).not.toBe(1e-6);
  });

  it.each([0, 1, 1.5, -0.5, NaN, Infinity, '', '95 %', '0x1', '1e999', '1e-99999', 'one'])('refuses %s', (value) => {
    expect(() => tailOfConfidence(value)).toThrow(/^confidence is/);
  });
});
