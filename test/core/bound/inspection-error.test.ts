import { describe, expect, it } from 'vitest';
import { knownErrorLower, knownErrorUpper, rejectLine, triedErrorLower, triedErrorUpper } from '../../../core/bound/inspection-error.ts';
import { meldedErrorLower, meldedErrorUpper } from '../../../core/bound/melded-error.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import type { Result } from '../../../core/result.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
const value = (result: Result<number, unknown>): number => {
  if (result.ok) return result.value;
  throw new Error(JSON.stringify(result.fault));
};
const chances = (n: number, p: number): readonly number[] => {
  const list = [(1 - p) ** n];
  for (let x = 0; x < n; x++) list.push((list[x]! * ((n - x) / (x + 1)) * p) / (1 - p));
  return list;
};

describe('known inspection errors', () => {
  it('change nothing at a faultless station', () => {
    const perfect = { sensitivity: 1, falseReject: 0 };
    expect(value(knownErrorUpper({ rejected: 3, inspected: 900 }, perfect, tail))).toBe(fractionUpper(3, 900, tail));
    expect(value(knownErrorLower({ rejected: 3, inspected: 900 }, perfect, tail))).toBe(fractionLower(3, 900, tail));
  });

  it('raise the bound of a station that overlooks, lower that of one that rejects good units', () => {
    const seen = { rejected: 3, inspected: 900 };
    expect(value(knownErrorUpper(seen, { sensitivity: 0.5, falseReject: 0 }, tail))).toBeCloseTo(2 * fractionUpper(3, 900, tail), 14);
    expect(value(knownErrorUpper(seen, { sensitivity: 1, falseReject: 0.002 }, tail))).toBeLessThan(fractionUpper(3, 900, tail));
    expect(value(knownErrorLower(seen, { sensitivity: 1, falseReject: 0.01 }, tail))).toBe(0);
  });

  it('refuse a station that does not tell, and figures that contradict each other', () => {
    expect(knownErrorUpper({ rejected: 3, inspected: 900 }, { sensitivity: 0.1, falseReject: 0.1 }, tail)).toMatchObject({ ok: false, fault: { kind: 'station-does-not-tell' } });
    expect(knownErrorUpper({ rejected: 0, inspected: 900 }, { sensitivity: 1, falseReject: 0.1 }, tail)).toMatchObject({ ok: false, fault: { kind: 'rejects-below-false-rejects' } });
    expect(() => knownErrorUpper({ rejected: 0, inspected: 9 }, { sensitivity: 1.1, falseReject: 0 }, tail)).toThrow(/^sensitivity/);
    expect(() => knownErrorUpper({ rejected: 0, inspected: 9 }, { sensitivity: 1, falseReject: NaN }, tail)).toThrow(/^falseReject/);
  });

  it('turn a line for nonconforming units into one for rejects', () => {
    expect(rejectLine(0.01, { sensitivity: 0.9, falseReject: 0.002 })).toBeCloseTo(0.01 * 0.9 + 0.99 * 0.002, 16);
  });
});

describe('inspection errors that were tried', () => {
  /** Exact coverage over all rejects and both trials; refusals count as not covered. */
  function coverage(n: number, seeded: number, good: number, truth: { p: number; se: number; fr: number }, bound: 'upper' | 'lower', by: typeof triedErrorUpper): number {
    const rejects = chances(n, truth.p * truth.se + (1 - truth.p) * truth.fr);
    const [caughts, falses] = [chances(seeded, truth.se), chances(good, truth.fr)];
    let covered = 0;
    rejects.forEach((a, rejected) => caughts.forEach((b, caught) => falses.forEach((c, rejectedGood) => {
      const found = by({ rejected, inspected: n }, { seeded, caught, good, rejectedGood }, tail);
      const holds = !found.ok ? found.fault.kind === 'station-does-not-tell' : bound === 'upper' ? found.value >= truth.p : found.value <= truth.p;
      if (holds) covered += a * b * c;
    })));
    return covered;
  }
  const truths = [{ p: 0.1, se: 0.9, fr: 0.05 }, { p: 0.3, se: 0.8, fr: 0.02 }];

  it('three exact bounds together cover at least 95 %', () => {
    for (const truth of truths) {
      expect(coverage(15, 8, 10, truth, 'upper', triedErrorUpper)).toBeGreaterThanOrEqual(0.95);
      expect(coverage(15, 8, 10, truth, 'lower', triedErrorLower)).toBeGreaterThanOrEqual(0.95);
    }
  });

  it('the melded bound covers 95 % and is narrower', () => {
    expect(coverage(10, 4, 4, { p: 0.3, se: 0.8, fr: 0.05 }, 'upper', meldedErrorUpper)).toBeGreaterThanOrEqual(0.95);
    const seen = { rejected: 100, inspected: 5000 };
    const tried = { seeded: 100, caught: 90, good: 2000, rejectedGood: 20 };
    expect(value(meldedErrorUpper(seen, tried, tail))).toBeLessThan(value(triedErrorUpper(seen, tried, tail)));
    expect(value(meldedErrorLower(seen, tried, tail))).toBeGreaterThan(value(triedErrorLower(seen, tried, tail)));
    expect(value(meldedErrorLower(seen, tried, tail))).toBeLessThan(value(meldedErrorUpper(seen, tried, tail)));
  });

  it('the melded bound does not flicker and becomes the exact one at a faultless station', () => {
    const seen = { rejected: 5, inspected: 1000 };
    const sure = { seeded: 10_000_000, caught: 10_000_000, good: 1_000_000_000, rejectedGood: 0 };
    const once = value(meldedErrorUpper(seen, sure, tail));
    expect(value(meldedErrorUpper(seen, sure, tail))).toBe(once);
    expect(Math.abs(once / fractionUpper(5, 1000, tail) - 1)).toBeLessThan(5e-3);
  });

  it('refuse what cannot be corrected', () => {
    const seen = { rejected: 5, inspected: 1000 };
    expect(triedErrorUpper(seen, { seeded: 5, caught: 1, good: 5, rejectedGood: 5 }, tail)).toMatchObject({ ok: false, fault: { kind: 'station-does-not-tell' } });
    expect(meldedErrorUpper(seen, { seeded: 5, caught: 1, good: 5, rejectedGood: 1 }, tail)).toMatchObject({ ok: false, fault: { kind: 'station-does-not-tell' } });
    expect(meldedErrorUpper(seen, { seeded: 5, caught: 5, good: 5, rejectedGood: 0 }, 1e-4 as Tail)).toMatchObject({ ok: false, fault: { kind: 'tail-beyond-points' } });
    expect(() => triedErrorUpper(seen, { seeded: 0, caught: 0, good: 5, rejectedGood: 0 }, tail)).toThrow(/^seeded/);
    expect(() => meldedErrorUpper(seen, { seeded: 5, caught: 6, good: 5, rejectedGood: 0 }, tail)).toThrow(/^caught/);
  });
});
