import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { toleranceFactor } from '../../../core/bound/tolerance.ts';
import { CriticalValue } from '../../../core/evidence/critical-value.ts';
import { tQuantileOfTail } from '../../../core/numerics/student-t.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
const figures: readonly [name: string, of: (n: number) => number][] = [
  ['falling t quantiles', (n) => tQuantileOfTail(tail, n - 1)],
  ['falling tolerance factors', (n) => toleranceFactor(n, 0.99, tail)],
  ['tolerance factors of a small share, below 0', (n) => toleranceFactor(n, 0.01, tail)],
];

describe('a critical value', () => {
  it.each(figures)('decides as %s do, at any n and however near', (_name, of) => {
    const critical = new CriticalValue(of);
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 20_000 }), fc.constantFrom(-1, -1e-3, -1e-6, -1e-12, 0, 1e-12, 1e-6, 1e-3, 1), (n, off) => {
        const exact = of(n);
        expect(critical.reachedBy(exact + off, n)).toBe(exact + off >= exact);
      }),
      { seed: 4401, numRuns: 400 },
    );
  });

  it('computes far fewer values than it is asked for', () => {
    let computed = 0;
    const critical = new CriticalValue((n) => {
      computed += 1;
      return tQuantileOfTail(tail, n - 1);
    });
    for (let n = 2; n <= 100_000; n += 1) critical.reachedBy(Math.sqrt(n) * 0.05, n);
    expect(computed).toBeLessThan(900);
  });

  it('is not reached by what is no number', () => {
    const critical = new CriticalValue(() => 1);
    for (const n of [2, 64, 1000, 1000]) expect(critical.reachedBy(NaN, n)).toBe(false);
  });
});
