import { describe, expect, it } from 'vitest';
import { lindstromMaddenLower, sidakYieldLower } from '../../../core/bound/chained-yield-compared.ts';
import { chainedYieldLower, stationsInSeries, type StationCount } from '../../../core/bound/chained-yield.ts';
import { yieldLower } from '../../../core/bound/yield.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
const chain = (...counts: readonly (readonly [number, number])[]): readonly StationCount[] =>
  counts.map(([nonconforming, inspected], i) => ({ station: `station ${i + 1}`, nonconforming, inspected }));

/** Exact coverage over all outcomes of two stations. */
function coverage(bound: (stations: readonly StationCount[]) => number, sizes: readonly [number, number], yields: readonly [number, number]): number {
  const chances = sizes.map((n, i) => {
    const p = 1 - yields[i]!;
    const list = [(1 - p) ** n];
    for (let x = 0; x < n; x++) list.push((list[x]! * ((n - x) / (x + 1)) * p) / (1 - p));
    return list;
  });
  let covered = 0;
  for (let first = 0; first <= sizes[0]; first++) {
    for (let second = 0; second <= sizes[1]; second++) {
      if (bound(chain([first, sizes[0]], [second, sizes[1]])) <= yields[0] * yields[1]) covered += chances[0]![first]! * chances[1]![second]!;
    }
  }
  return covered;
}

// The values to 15 digits stand in test/reference/sequential-vectors-open.json.
describe('the chained yield', () => {
  it('is the exact bound of the smallest station when nothing is lost', () => {
    expect(chainedYieldLower(chain([0, 500], [0, 200], [0, 900]), tail).lower).toBeCloseTo(0.05 ** (1 / 200), 14);
    expect(chainedYieldLower(chain([0, 200]), tail).lower).toBeCloseTo(yieldLower(0, 200, tail), 14);
  });

  it('covers 95 % where every outcome is counted, and is tighter than the product of bounds', () => {
    for (const yields of [[0.95, 0.98], [0.9, 0.9], [0.99, 0.8]] as const) {
      expect(coverage((stations) => chainedYieldLower(stations, tail).lower, [40, 60], yields)).toBeGreaterThan(0.95);
      expect(coverage((stations) => lindstromMaddenLower(stations, tail), [40, 60], yields)).toBeGreaterThan(0.95);
      expect(coverage((stations) => sidakYieldLower(stations, tail), [40, 60], yields)).toBeGreaterThan(0.95);
    }
    const stations = chain([2, 1000], [1, 1000], [0, 1000]);
    expect(chainedYieldLower(stations, tail).lower).toBeGreaterThan(sidakYieldLower(stations, tail));
    expect(chainedYieldLower(stations, tail).lower).toBeGreaterThanOrEqual(lindstromMaddenLower(stations, tail));
  });

  it('names the station that holds it down: the bad one, or the one with few units', () => {
    expect(chainedYieldLower(chain([1, 1000], [40, 1000], [2, 1000]), tail)).toMatchObject({ limiting: 'station 2' });
    expect(chainedYieldLower(chain([1, 5000], [0, 60], [2, 5000]), tail)).toMatchObject({ limiting: 'station 2', scarcest: 'station 2' });
    expect(chainedYieldLower(chain([5, 100]), tail)).toMatchObject({ limiting: 'station 1', estimate: 0.95 });
  });

  it('is 0 when a station lets nothing pass', () => {
    expect(chainedYieldLower(chain([3, 3], [0, 10]), tail).lower).toBe(0);
    expect(lindstromMaddenLower(chain([3, 3], [0, 10]), tail)).toBe(0);
  });

  it('counts at a station only units that reached it', () => {
    const losses = [{ station: 'crimp', nonconforming: 4 }, { station: 'leak', nonconforming: 1 }, { station: 'final', nonconforming: 0 }];
    expect(stationsInSeries(100, losses).map(({ inspected }) => inspected)).toEqual([100, 96, 95]);
    expect(() => stationsInSeries(3, losses)).toThrow(/^nonconforming at crimp is 4/);
    expect(() => stationsInSeries(4, losses)).toThrow(/^units reaching leak is 0/);
  });

  it('refuses what is no chain', () => {
    expect(() => chainedYieldLower([], tail)).toThrow(/^stations/);
    expect(() => chainedYieldLower(chain([5, 4]), tail)).toThrow(/^nonconforming at station 1/);
    expect(() => sidakYieldLower(chain([0, 4]), 1 as Tail)).toThrow(/^tail/);
  });
});
