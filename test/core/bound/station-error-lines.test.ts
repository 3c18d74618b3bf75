import { describe, expect, it } from 'vitest';
import { knownErrorLower, knownErrorUpper, triedErrorLower, triedErrorUpper } from '../../../core/bound/inspection-error.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { errorLines, tellsUnitsApart, type ErrorFigures } from '../../../core/bound/station-error-lines.ts';
import type { Fraction, Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
const known = { kind: 'known', sensitivity: 0.95, falseReject: 0.002 } as const;
const tried = { kind: 'tried', seeded: 200, caught: 190, good: 5_000, rejectedGood: 10 } as const;
const samples = [1_000, 5_000, 20_000].flatMap((inspected) => [0, 1, 3, 10, 40, 200].map((rejected) => ({ inspected, rejected })));

const upperOf = (error: ErrorFigures, seen: { inspected: number; rejected: number }): number | undefined => {
  const found = error.kind === 'known' ? knownErrorUpper(seen, error, tail) : triedErrorUpper(seen, error, tail);
  return found.ok ? found.value : undefined;
};
const lowerOf = (error: ErrorFigures, seen: { inspected: number; rejected: number }): Fraction => {
  const found = error.kind === 'known' ? knownErrorLower(seen, error, tail) : triedErrorLower(seen, error, tail);
  if (!found.ok) throw new Error(found.fault.because);
  return found.value;
};

describe.each([known, tried])('a guarantee corrected for inspection errors ($kind)', (error) => {
  const lines = errorLines(error, tail);

  it('gives the bounds that correct the data instead', () => {
    let compared = 0;
    for (const { inspected, rejected } of samples) {
      const upper = upperOf(error, { inspected, rejected });
      const lower = lowerOf(error, { inspected, rejected });
      if (upper !== undefined) {
        expect(Math.min(1, lines.upper(fractionUpper(rejected, inspected, lines.tail)))).toBeCloseTo(upper, 14);
        compared += 1;
      }
      expect(Math.min(1, Math.max(0, lines.lower(fractionLower(rejected, inspected, lines.tail))))).toBeCloseTo(lower, 14);
    }
    expect(compared).toBeGreaterThan(10);
  });

  it('decides about a line as they do', () => {
    for (const line of [0.0005, 0.002, 0.01, 0.05]) {
      for (const { inspected, rejected } of samples) {
        const upper = upperOf(error, { inspected, rejected });
        if (upper !== undefined) expect(fractionUpper(rejected, inspected, lines.tail) <= lines.toDemonstrate(line)).toBe(upper <= line);
        expect(fractionLower(rejected, inspected, lines.tail) > lines.toViolate(line)).toBe(lowerOf(error, { inspected, rejected }) > line);
      }
    }
  });
});

describe('a station', () => {
  it.each([
    [{ kind: 'known', sensitivity: 0.2, falseReject: 0.2 } as const, false],
    [{ kind: 'tried', seeded: 10, caught: 2, good: 10, rejectedGood: 3 } as const, false],
    [{ kind: 'tried', seeded: 10, caught: 0, good: 10, rejectedGood: 5 } as const, false],
    [tried, true],
    [known, true],
  ])('%o tells good from bad: %s', (error, tells) => {
    expect(tellsUnitsApart(error, tail)).toBe(tells);
  });
});
