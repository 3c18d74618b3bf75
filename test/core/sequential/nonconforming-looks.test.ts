import { describe, expect, it } from 'vitest';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { allLooksLower, allLooksUpper } from '../../../core/sequential/nonconforming-all-looks.ts';
import { largestUnitsViolated, smallestUnitsDemonstrated } from '../../../core/sequential/nonconforming-critical.ts';
import { betaPriorAt, logEvidenceDemonstrated, logEvidenceViolated } from '../../../core/sequential/nonconforming-evidence.ts';
import type { Tail } from '../../../core/units.ts';
import { gapAt, mostMisses, paths } from './simulated-paths.ts';

const alpha = 0.05 as Tail;
const prior = betaPriorAt(0.001);

describe('bounds on a nonconforming fraction at all looks', () => {
  it('stand where the evidence is just enough', () => {
    for (const [x, n] of [[0, 1], [0, 4188], [2, 3], [12, 9000], [150, 1e9], [5e5, 1e9]] as const) {
      const upper = allLooksUpper(x, n, alpha, prior);
      expect(upper).toBeGreaterThan(x / n);
      expect(logEvidenceDemonstrated(x, n, upper, prior)).toBeCloseTo(Math.log(20), 8);
      const lower = allLooksLower(x, n, alpha, prior);
      expect(lower).toBeLessThanOrEqual(x / n);
      if (x > 0) expect(logEvidenceViolated(x, n, lower, prior)).toBeCloseTo(Math.log(20), 8);
    }
  });

  it('say nothing where nothing was seen', () => {
    expect(allLooksUpper(0, 0, alpha, prior)).toBe(1);
    expect(allLooksUpper(3, 3, alpha, prior)).toBe(1);
    expect(allLooksLower(0, 0, alpha, prior)).toBe(0);
    expect(allLooksLower(0, 5000, alpha, prior)).toBe(0);
    expect(allLooksLower(3, 3, alpha, prior)).toBeGreaterThan(0);
  });

  it('refuse counts and tails that cannot be', () => {
    expect(() => allLooksUpper(2, 1, alpha, prior)).toThrow('nonconforming');
    expect(() => allLooksLower(1, 2, 1 as Tail, prior)).toThrow('tail');
    expect(() => allLooksLower(1, 2, alpha, { a: 1, b: NaN })).toThrow('prior b');
  });
});

describe('whole numbers for the record path', () => {
  /* 4188, 6595, 10524, 18806: the project's statistical specification, section 9 (50-digit arithmetic). */
  it.each([[0, 4188], [1, 6595], [3, 10_524], [8, 18_806]])('%i nonconforming demonstrate one in a thousand from %i units on', (x, units) => {
    expect(smallestUnitsDemonstrated(x, 0.001, alpha, prior)).toBe(units);
  });

  it('decide as the evidence does', () => {
    for (const line of [0.3, 0.01, 1e-4, 1e-7]) {
      for (const tail of [0.2, 0.05, 1e-6] as Tail[]) {
        const own = betaPriorAt(line);
        for (const x of [0, 1, 2, 7, 40, 900]) {
          const first = smallestUnitsDemonstrated(x, line, tail, own);
          expect(logEvidenceDemonstrated(x, first, line, own)).toBeGreaterThanOrEqual(-Math.log(tail));
          if (first > x + 1) expect(logEvidenceDemonstrated(x, first - 1, line, own)).toBeLessThan(-Math.log(tail));
          const last = largestUnitsViolated(x, line, tail, own);
          if (last > 0) expect(logEvidenceViolated(x, last, line, own)).toBeGreaterThanOrEqual(-Math.log(tail));
          expect(logEvidenceViolated(x, Math.max(x, last + 1), line, own)).toBeLessThan(-Math.log(tail));
        }
      }
    }
  });

  it('are none or out of reach where they must be', () => {
    expect(largestUnitsViolated(0, 0.001, alpha, prior)).toBe(0);
    expect(largestUnitsViolated(1, 0.3, 1e-9 as Tail, betaPriorAt(0.3))).toBe(0);
    expect(smallestUnitsDemonstrated(0, 1e-300, alpha, { a: 1, b: 1 })).toBe(Infinity);
    expect(() => smallestUnitsDemonstrated(-1, 0.001, alpha, prior)).toThrow('nonconforming');
    expect(() => largestUnitsViolated(1, 1.5, alpha, prior)).toThrow('line');
  });
});

describe('coverage at all looks', () => {
  /* Each path has 400 nonconforming units and is looked at after every unit; the demonstration can only be reached on
   * conforming units, the violation only on a nonconforming one. Chance of a false failure below 1e-8 a comparison. */
  const nonconforming = 400;

  function everReached(line: number, rate: number, seed: number): { demonstrated: number; violated: number } {
    const counts = Array.from({ length: nonconforming + 1 }, (_, x) => x);
    const from = counts.map((x) => smallestUnitsDemonstrated(x, line, alpha, prior));
    const upTo = counts.map((x) => largestUnitsViolated(x, line, alpha, prior));
    const uniform = seededUniform(seed);
    let demonstrated = 0;
    let violated = 0;
    for (let path = 0; path < paths; path++) {
      let units = 0;
      let below = false;
      let above = false;
      for (let x = 0; x < nonconforming && !(below && above); x++) {
        units += gapAt(rate, uniform);
        below ||= units >= from[x]!;
        units += 1;
        above ||= units <= upTo[x + 1]!;
      }
      demonstrated += Number(below);
      violated += Number(above);
    }
    return { demonstrated, violated };
  }

  it.each([['on the line', 0.001], ['at half of it', 0.0005], ['at twice it', 0.002]] as const)('the bounds miss a rate %s at most once in twenty runs', (_, rate) => {
    const { demonstrated, violated } = everReached(rate, rate, 1);
    expect(demonstrated).toBeLessThanOrEqual(mostMisses(alpha));
    expect(violated).toBeLessThanOrEqual(mostMisses(alpha));
    /* And they are no wider than they need be: close to the twentieth that is allowed. */
    expect(demonstrated / paths).toBeGreaterThan(0.04);
    expect(violated / paths).toBeGreaterThan(0.025);
  });

  it('a line at twice its guarantee is all but never called demonstrated, one at half of it all but never violated', () => {
    expect(everReached(0.001, 0.002, 2).demonstrated).toBeLessThan(0.02 * paths);
    expect(everReached(0.001, 0.0005, 3).violated).toBeLessThan(0.02 * paths);
  });
});
