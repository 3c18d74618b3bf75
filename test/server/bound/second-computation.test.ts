import { describe, expect, it } from 'vitest';
import { askedAttributes } from '../../../server/bound/asked-attributes.ts';
import { askedMeasurements } from '../../../server/bound/asked-measurements.ts';
import { figureOf } from '../../../server/bound/figure-of.ts';
import { secondComputation } from '../../../server/bound/second-computation.ts';
import type { Given } from '../../../server/bound/given.ts';
import type { Tail } from '../../../core/units.ts';

const all = [...askedAttributes, ...askedMeasurements];

function asked(command: string, given: Given, tail: number): { second: ReturnType<typeof secondComputation>; off: ReturnType<typeof secondComputation> } {
  const kind = all.find((found) => found.command === command)!;
  const side = given['side'] === 'lower' ? 'lower' : 'upper';
  const request = { given, tail: tail as Tail, side, line: undefined, unit: undefined, sigmaSource: undefined, column: undefined } as const;
  const figure = figureOf(kind.quantity, given, () => request.tail);
  if (!figure.ok) throw new Error(figure.fault.because);
  return { second: secondComputation(kind, request, figure.value), off: secondComputation(kind, request, figure.value * (1 + 1e-4)) };
}

describe('a second computation', () => {
  it.each([
    ['nonconforming-fraction', { n: 20_000, nonconforming: 1, side: 'upper' }],
    ['nonconforming-fraction', { n: 20_000, nonconforming: 7, side: 'lower' }],
    ['yield', { n: 5000, nonconforming: 41, side: 'lower' }],
    ['yield', { n: 5000, nonconforming: 41, side: 'upper' }],
    ['rate', { count: 3, exposure: 1200, side: 'upper' }],
    ['rate', { count: 3, exposure: 1200, side: 'lower' }],
    ['mean', { n: 12, mean: 10, sd: 2, side: 'lower' }],
    ['mean', { n: 12, mean: 10, sd: 2, side: 'upper' }],
  ])('agrees with the bound on %s %j, and not with one that is off', (command, given) => {
    for (const tail of [0.6, 0.05, 1e-5]) {
      const { second, off } = asked(command, given, tail);
      expect(second).toMatchObject({ agrees: true });
      expect(off).toMatchObject({ agrees: false });
    }
  });

  it.each([
    ['nonconforming-fraction', { n: 20_000, nonconforming: 1, side: 'upper', method: 'wilson' }, 0.05],
    ['nonconforming-fraction', { n: 20_000, nonconforming: 1, side: 'upper', looks: 'all', line: 0.001 }, 0.05],
    ['nonconforming-fraction', { n: 20_000, nonconforming: 0, side: 'lower' }, 0.05],
    ['nonconforming-fraction', { n: 20_000, nonconforming: 1, side: 'upper' }, 1e-9],
    ['nonconforming-fraction', { n: 1e9, nonconforming: 1, side: 'upper' }, 0.05],
    ['mean', { n: 1e6, mean: 10, sd: 2, side: 'upper' }, 0.05],
    ['mean', { n: 12, mean: 1e6, sd: 1e-6, side: 'upper' }, 0.05],
    ['mean', { n: 12, mean: 10, sigma: 2, side: 'upper' }, 0.05],
    ['capability', { n: 12, estimate: 1, side: 'lower' }, 0.05],
  ])('is not asked for where it could not tell: %s %j at %d', (command, given, tail) => {
    expect(asked(command, given, tail).second).toBeUndefined();
  });
});
