import { describe, expect, it } from 'vitest';
import { designedLower, designedUpper, eventLine, eventsOf, lotsAsUnits } from '../../../core/bound/clustered-defects.ts';
import { chiSquareDispersion, dispersionOf, type Batch } from '../../../core/bound/dispersion.ts';
import { gapShares } from '../../../core/bound/gap-diagnostic.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import type { Tail } from '../../../core/units.ts';

const tail = 0.05 as Tail;
/** A small seeded generator (linear congruence of Knuth's MMIX, memory), enough for a test. */
function seeded(seed: bigint): () => number {
  let state = seed;
  return () => {
    state = (state * 6_364_136_223_846_793_005n + 1_442_695_040_888_963_407n) % (1n << 64n);
    return Number(state >> 11n) / 2 ** 53;
  };
}
const batches = (inspected: number, ...counts: readonly number[]): readonly Batch[] => counts.map((nonconforming) => ({ nonconforming, inspected }));

describe('dispersion', () => {
  // phi and chance to 15 digits stand in test/reference/sequential-vectors-open.json.
  it('deals the defects anew where they are few', () => {
    const clustered = dispersionOf(batches(500, 0, 0, 0, 0, 0, 0, 0, 0, 0, 7), seeded(1n));
    expect(clustered).toMatchObject({ by: 'dealing', chance: 1 / 200 });
    const spread = dispersionOf(batches(500, 1, 0, 1, 0, 1, 1, 0, 1, 1, 1), seeded(1n));
    expect(spread?.by).toBe('dealing');
    expect(spread?.chance).toBeGreaterThan(0.5);
  });

  it('is the same for the same seed, and chi-square where defects are many', () => {
    const window = batches(1000, 0, 1, 0, 3, 0, 0, 2, 0, 0, 1);
    expect(dispersionOf(window, seeded(7n))).toEqual(dispersionOf(window, seeded(7n)));
    const many = batches(1000, 12, 9, 14, 8, 11);
    expect(dispersionOf(many, seeded(7n))).toEqual(chiSquareDispersion(many));
  });

  it('speaks of independent units at 0.05 in no more windows than that', () => {
    const random = seeded(3n);
    let spoke = 0;
    for (let window = 0; window < 400; window++) {
      const counts = Array.from({ length: 20 }, () => 0);
      for (let event = 0; event < 12; event++) counts[Math.floor(random() * 20)]! += 1;
      if (dispersionOf(batches(1000, ...counts), random)!.chance <= 0.05) spoke += 1;
    }
    // binomial(400, <= 0.05): more than 35 has a chance below 1e-3
    expect(spoke).toBeLessThan(36);
  });

  it('has nothing to say of a faultless window, and refuses what is no batch', () => {
    expect(chiSquareDispersion(batches(10, 0, 0))).toBeUndefined();
    expect(chiSquareDispersion(batches(3, 3, 3))).toBeUndefined();
    expect(() => chiSquareDispersion(batches(10, 1))).toThrow(/^batches/);
    expect(() => chiSquareDispersion(batches(10, 1, 11))).toThrow(/^nonconforming/);
  });
});

describe('gaps', () => {
  it('tell neighbours from independent units', () => {
    const pairs = Array.from({ length: 10 }, (_, i) => [1000 * i + 1, 1000 * i + 2]).flat();
    const [next, five, twenty] = gapShares(pairs, 10_000);
    expect(next).toMatchObject({ within: 1, seen: 10 / 19 });
    expect(next!.expected).toBeCloseTo(0.002, 12);
    expect(next!.chance).toBeLessThan(1e-9);
    expect([five!.within, twenty!.within]).toEqual([5, 20]);
    const even = gapShares(Array.from({ length: 20 }, (_, i) => 500 * i + 1), 10_000);
    expect(even.every(({ seen, chance }) => seen === 0 && chance === 1)).toBe(true);
  });

  it('need two positions that rise', () => {
    expect(gapShares([5], 100)).toEqual([]);
    expect(gapShares([1, 2, 3], 3).map(({ expected }) => expected)).toEqual([1, 1, 1]);
    expect(() => gapShares([5, 5], 100)).toThrow(/^positions/);
    expect(() => gapShares([1, 2], 1)).toThrow(/^inspected/);
  });
});

describe('declared remedies', () => {
  it('merge units within the gap into one event, where its first stood', () => {
    expect(eventsOf([3, 5, 9, 20, 21, 60], 4)).toEqual([3, 20, 60]);
    expect(eventsOf([], 4)).toEqual([]);
    expect(eventLine(0.01, 2.5)).toBeCloseTo(0.004, 16);
    expect(() => eventLine(0.01, 0.5)).toThrow(/^clusterSize/);
    expect(() => eventsOf([1], 0)).toThrow(/^gap/);
  });

  it('a planned design effect is a smaller sample: 1 changes nothing, more widens', () => {
    expect(designedUpper(4, 500, 1, tail)).toBe(fractionUpper(4, 500, tail));
    expect(designedLower(4, 500, 1, tail)).toBe(fractionLower(4, 500, tail));
    expect(designedUpper(4, 500, 2, tail)).toBeCloseTo(fractionUpper(2, 250, tail), 14);
    expect(designedLower(4, 500, 2, tail)).toBeCloseTo(fractionLower(2, 250, tail), 14);
    expect([designedUpper(5, 5, 3, tail), designedLower(0, 5, 3, tail)]).toEqual([1, 0]);
    expect(() => designedUpper(4, 500, 0.9, tail)).toThrow(/^designEffect/);
    expect(() => designedLower(4, 500, NaN, tail)).toThrow(/^designEffect/);
  });

  it('the lot as the unit counts lots over what they may hold', () => {
    expect(lotsAsUnits(batches(50, 0, 2, 1, 9), 1)).toEqual({ nonconforming: 2, inspected: 4 });
    expect(() => lotsAsUnits([], 0)).toThrow(/^lots/);
  });
});
