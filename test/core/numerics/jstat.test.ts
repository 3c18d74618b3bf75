import { describe, expect, it } from 'vitest';
import { betaChance, gammaChance, jstatAccuracy, studentChance } from '../../../core/numerics/jstat.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { rateLower, rateUpper } from '../../../core/bound/rate.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { tQuantileOfTail } from '../../../core/numerics/student-t.ts';
import type { Tail } from '../../../core/units.ts';

/** Bounds of ours, held to 1e-12 elsewhere, put back into the distribution: the largest relative error of the chance. */
function worst(chanceOf: (size: number, count: number, tail: Tail) => number | undefined): number {
  const uniform = seededUniform(17);
  let most = 0;
  for (let i = 0; i < 4000; i++) {
    const size = Math.ceil(10 ** (7 * uniform()));
    const tail = 10 ** (-6 * uniform()) as Tail;
    const chance = chanceOf(size, Math.min(size - 1, Math.floor(10 ** (4 * uniform()) - 1)), tail);
    if (chance !== undefined) most = Math.max(most, Math.abs(chance / tail - 1));
  }
  return most;
}

describe('jstat, within the range it is asked in, is as accurate as stated and no more', () => {
  it.each([
    ['beta from above', (n: number, x: number, tail: Tail) => betaChance(1 - fractionUpper(x, n, tail), n - x, x + 1)],
    ['beta from below', (n: number, x: number, tail: Tail) => (x === 0 ? undefined : betaChance(fractionLower(x, n, tail), x, n - x + 1))],
    ['gamma from above', (_: number, x: number, tail: Tail) => 1 - gammaChance(x + 1, rateUpper(x, 1, tail))],
    ['gamma from below', (_: number, x: number, tail: Tail) => (x === 0 ? undefined : gammaChance(x, rateLower(x, 1, tail)))],
    ['Student t', (n: number, _: number, tail: Tail) => (n > 1e4 ? undefined : studentChance(-tQuantileOfTail(tail, n), n))],
  ] as const)('%s', (_, chanceOf) => {
    const error = worst(chanceOf);
    expect(error).toBeLessThan(jstatAccuracy);
    expect(error).toBeGreaterThan(1e-12); // Were it finer, it could serve the bounds themselves.
  });
});

describe('jstat is not asked where it has no answer', () => {
  it.each([
    ['x', () => betaChance(1.5, 2, 3)],
    ['x', () => betaChance(0, 2, 3)],
    ['x', () => betaChance(NaN, 2, 3)],
    ['a', () => betaChance(0.5, 0, 3)],
    ['b', () => betaChance(0.5, 2, 1e8)],
    ['smaller of a and b', () => betaChance(0.5, 1e5, 1e5)],
    ['shape', () => gammaChance(-1, 1)],
    ['shape', () => gammaChance(1e5, 1e5)],
    ['x', () => gammaChance(1, Infinity)],
    ['t', () => studentChance(Infinity, 5)],
    ['freedom', () => studentChance(1, 1e6)],
    ['freedom', () => studentChance(1, NaN)],
  ])('refuses %s', (argument, ask) => {
    expect(ask).toThrow(new RegExp(`^${argument} is`));
  });
});
