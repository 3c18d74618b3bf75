import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { writtenNumber, writtenTo } from '../../../core/describe/rounded.ts';
import { briefShare, confidenceText, shareText } from '../../../core/describe/share-text.ts';

const read = (text: string): number => Number(text.replaceAll(' ', ''));

describe('a written number', () => {
  it.each([
    [0, 4, 'nearest', '0'],
    [1234, 2, 'nearest', '1234'],
    [20_000, 2, 'nearest', '20 000'],
    [12_345.678, 7, 'nearest', '12 345.68'],
    [-12_345.678, 7, 'nearest', '-12 345.68'],
    [0.00023717, 3, 'nearest', '0.000237'],
    [0.00023717, 3, 'up', '0.000238'],
    [0.00023777, 3, 'down', '0.000237'],
    [0.9996, 3, 'up', '1'],
    [1e-9 / 3, 3, 'nearest', '3.33e-10'],
    [0.25, 4, 'up', '0.25'],
    [-0.1234, 2, 'up', '-0.12'],
    [-0.1234, 2, 'down', '-0.13'],
  ] as const)('%d in %d digits, %s: %s', (value, digits, rounding, text) => {
    expect(writtenNumber(value, digits, rounding)).toBe(text);
  });

  it('never stands on the unsafe side', () => {
    const figures = fc.double({ min: 1e-300, max: 1e300, noNaN: true });
    fc.assert(
      fc.property(figures, fc.integer({ min: 1, max: 12 }), fc.boolean(), (size, digits, negative) => {
        const value = negative ? -size : size;
        const [low, near, high] = (['down', 'nearest', 'up'] as const).map((rounding) => read(writtenNumber(value, digits, rounding)));
        expect(low!).toBeLessThanOrEqual(value);
        expect(high!).toBeGreaterThanOrEqual(value);
        expect(Math.abs(near! - value)).toBeLessThanOrEqual(Math.abs(value) * 10 ** (1 - digits));
        expect(high! - low!).toBeLessThanOrEqual(Math.abs(value) * 2.000001 * 10 ** (1 - digits));
      }),
      { seed: 5, numRuns: 2000 },
    );
  });

  it('is written to decimals likewise', () => {
    expect(writtenTo(98.7656, 2, 'down')).toBe('98.76');
    expect(writtenTo(98.7616, 2, 'up')).toBe('98.77');
    expect(writtenTo(98.7616, 2)).toBe('98.76');
  });
});

describe('a written share', () => {
  it.each([
    [0.0002, 'nearest', '200 ppm (0.02 %, 1 in 5000)'],
    [0.00023717102659408986, 'up', '237.2 ppm (0.02372 %, 1 in 4216)'],
    [0.00023717102659408986, 'down', '237.1 ppm (0.02371 %, 1 in 4217)'],
    [0.026, 'up', '2.6 % (1 in 38.46)'],
    [0, 'up', '0 ppm'],
    [1, 'down', '100 %'],
    [0.985, 'nearest', '98.5 %'],
    [0.99923765, 'down', '99.9237 %'],
    [0.9999999, 'down', '99.99999 %'],
  ] as const)('%d, %s: %s', (share, rounding, text) => {
    expect(shareText(share, rounding)).toBe(text);
  });

  it('has a brief form', () => {
    expect([0.0002, 0.01, 0.985].map((share) => briefShare(share))).toEqual(['200 ppm', '1 %', '98.5 %']);
  });
});

it('a confidence level keeps every digit of its tail', () => {
  expect([0.05, 0.0005, 1e-6, 0.5].map(confidenceText)).toEqual(['95 %', '99.95 %', '99.9999 %', '50 %']);
  expect(confidenceText(1e-20)).toBe('99.999999999999999999 %');
});
