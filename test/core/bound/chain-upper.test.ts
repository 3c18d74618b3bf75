import { describe, expect, it } from 'vitest';
import { chainedYieldLower, chainLower, chainUpper } from '../../../core/bound/chained-yield.ts';
import { yieldUpper } from '../../../core/bound/yield.ts';
import type { Tail } from '../../../core/units.ts';

/** Chances of 0 to n nonconforming units of n, by the ratio of neighbours. */
function binomial(n: number, p: number): number[] {
  const chances = [(1 - p) ** n];
  for (let x = 1; x <= n; x += 1) chances.push((chances[x - 1]! * (n - x + 1) * p) / (x * (1 - p)));
  return chances;
}

function missed(n: readonly [number, number], p: readonly [number, number], tail: Tail): number {
  const truth = (1 - p[0]) * (1 - p[1]);
  const [first, second] = [binomial(n[0], p[0]), binomial(n[1], p[1])];
  let miss = 0;
  first.forEach((a, x) => {
    second.forEach((b, y) => {
      if (a * b < 1e-14) return;
      const stations = [
        { station: 'crimping', nonconforming: x, inspected: n[0] },
        { station: 'leak test', nonconforming: y, inspected: n[1] },
      ];
      if (chainUpper(stations, tail) < truth) miss += a * b;
    });
  });
  return miss;
}

describe('the upper bound on a chained yield', () => {
  it.each([0.1, 0.05, 0.01, 0.001])('misses the true yield with its tail %d at most in 36 cases, by enumeration', (tail) => {
    let worst = 0;
    for (const n of [[60, 60], [60, 200], [150, 150]] as const) {
      for (const first of [0.003, 0.01, 0.05, 0.2]) for (const second of [0.003, 0.02, 0.1]) worst = Math.max(worst, missed(n, [first, second], tail as Tail));
    }
    expect(worst).toBeLessThanOrEqual(tail);
    expect(worst).toBeGreaterThan(tail / 2);
  });

  it('of one station stands near the exact bound, and is it where nothing passed', () => {
    for (const [x, n] of [[1, 100], [5, 1000], [30, 2000]] as const) {
      const stations = [{ station: 'leak test', nonconforming: x, inspected: n }];
      expect(Math.abs((1 - chainUpper(stations, 0.05 as Tail)) / (1 - yieldUpper(x, n, 0.05 as Tail)) - 1)).toBeLessThan(0.01);
    }
    expect(chainUpper([{ station: 'leak test', nonconforming: 20, inspected: 20 }], 0.05 as Tail)).toBe(yieldUpper(20, 20, 0.05 as Tail));
    expect(chainUpper([{ station: 'leak test', nonconforming: 0, inspected: 20 }], 0.05 as Tail)).toBe(1);
  });

  it('stands above the lower one, which is that of the whole answer', () => {
    const stations = [{ station: 'a', nonconforming: 3, inspected: 300 }, { station: 'b', nonconforming: 0, inspected: 500 }];
    expect(chainLower(stations, 0.05 as Tail)).toBe(chainedYieldLower(stations, 0.05 as Tail).lower);
    expect(chainUpper(stations, 0.05 as Tail)).toBeGreaterThan(chainedYieldLower(stations, 0.05 as Tail).estimate);
  });
});
