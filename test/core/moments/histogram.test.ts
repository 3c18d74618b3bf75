import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { OutOfDomain } from '../../../core/bound/out-of-domain.ts';
import { Histogram, histogramBins } from '../../../core/moments/histogram.ts';

const value = fc.oneof(
  fc.double({ min: -10, max: 10, noNaN: true }),
  fc.double({ min: -1e4, max: 1e4, noNaN: true }),
  fc.constantFrom(1e300, -1e300, 0, 12.5, -12.5),
);

function of(values: readonly number[], width = 0.1): Histogram {
  const histogram = new Histogram(2, width);
  for (const each of values) histogram.admit(each);
  return histogram;
}

const total = (histogram: Histogram): number => {
  const { counts, below, above } = histogram.snapshot();
  return counts.reduce((sum, count) => sum + count, below + above);
};

describe('running histogram', () => {
  it('counts each value in the bin that holds it, closed below', () => {
    const { counts, width, below, above } = of([2, 2.05, 1.99, 8.35]).snapshot();
    expect([counts[64], counts[63], counts[127]]).toEqual([2, 1, 1]);
    expect([width, below, above]).toEqual([0.1, 0, 0]);
  });

  it('joins bins in pairs when a value lies outside, and never straddles the reference', () => {
    const histogram = of([1.99, 2, 2.05, 8.4]);
    const { counts, width } = histogram.snapshot();
    expect(width).toBe(0.2);
    expect([counts[63], counts[64], counts[96]]).toEqual([1, 2, 1]);
    expect(counts.slice(0, 64).reduce((sum, count) => sum + count, 0)).toBe(1);
  });

  it('loses nothing: what is too far out is counted below or above', () => {
    const { counts, below, above, width } = of([1e300, -1e300, 2]).snapshot();
    expect([below, above, counts[64]]).toEqual([1, 1, 1]);
    expect(width).toBe(0.1 * 4096);
  });

  it('in and out, merged, stored: always the same as counted anew at that width', () => {
    fc.assert(
      fc.property(fc.array(value, { maxLength: 40 }), fc.array(value, { maxLength: 40 }), (stay, go) => {
        const rolled = of([...go, ...stay]);
        for (const each of go) rolled.drop(each);
        expect(total(rolled)).toBe(stay.length);
        const merged = of(stay);
        merged.merge(of(go).snapshot());
        expect(merged.snapshot()).toEqual(of([...stay, ...go]).snapshot());
        const restored = Histogram.restore(JSON.parse(JSON.stringify(rolled.snapshot())) as ReturnType<Histogram['snapshot']>);
        for (const each of stay) restored.drop(each);
        expect(total(restored)).toBe(0);
        expect(restored.snapshot().counts).toEqual(Array(histogramBins).fill(0));
      }),
      { seed: 51, numRuns: 500 },
    );
  });

  it('refuses what it cannot hold', () => {
    const histogram = of([2]);
    const refused: readonly (() => unknown)[] = [
      () => { histogram.admit(NaN); },
      () => { histogram.drop(5); },
      () => { histogram.drop(NaN); },
      () => new Histogram(NaN, 1),
      () => new Histogram(0, 0),
      () => { histogram.merge(new Histogram(3, 0.1).snapshot()); },
      () => { histogram.merge(new Histogram(2, 0.2).snapshot()); },
    ];
    for (const ask of refused) expect(ask).toThrow(OutOfDomain);
    expect(total(histogram)).toBe(1);
  });
});
