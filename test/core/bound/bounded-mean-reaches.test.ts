import fc from 'fast-check';
import { expect, it } from 'vitest';
import { boundedMeanLower, boundedMeanReaches } from '../../../core/bound/bounded-mean.ts';
import type { Tail } from '../../../core/units.ts';

it('the lower bound on a bounded mean reaches the lines up to itself and none beyond', () => {
  fc.assert(
    fc.property(fc.integer({ min: 2, max: 1e5 }), fc.double({ min: 0.01, max: 1, noNaN: true }), fc.double({ min: 0, max: 0.5, noNaN: true }), fc.constantFrom(0.1, 0.001), (n, share, spread, tail) => {
      const sample = { n, mean: 240 + 20 * share, sd: 20 * spread, from: 240, to: 260 };
      const bound = boundedMeanLower(sample, tail as Tail);
      for (const off of [-1, -1e-3, -1e-9]) if (bound + off > 240) expect(boundedMeanReaches(sample, bound + off, tail as Tail)).toBe(true);
      expect([boundedMeanReaches(sample, 239, tail as Tail), boundedMeanReaches(sample, 260, tail as Tail), boundedMeanReaches(sample, NaN, tail as Tail)]).toEqual([true, false, false]);
      for (const off of [1e-9, 1e-3, 1]) if (bound + off < 260) expect(boundedMeanReaches(sample, bound + off, tail as Tail)).toBe(false);
    }),
    { seed: 4601, numRuns: 500 },
  );
});
