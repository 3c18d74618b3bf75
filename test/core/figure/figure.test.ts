import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { amountOf, finiteOf } from '../../../core/figure/amount.ts';
import { spanMsOf } from '../../../core/figure/duration.ts';
import { complementOf, doubleOf, exactOfText } from '../../../core/figure/exact.ts';
import { shareOf } from '../../../core/figure/share.ts';

const share = (text: string | number): number | undefined => {
  const exact = shareOf(text);
  return exact && doubleOf(exact);
};
const complement = (text: string | number): number => doubleOf(complementOf(shareOf(text)!));

describe('share', () => {
  // The wanted figures are decimal literals: the language rounds each to the nearest double.
  it.each([
    ['200 ppm', 0.0002], ['200ppm', 0.0002], ['0.02 %', 0.0002], ['0.02%', 0.0002], ['1 in 5000', 0.0002],
    ['1 in 3', 1 / 3], ['98.5 %', 0.985], ['5 ppb', 5e-9], ['3 ‰', 0.003], ['.5', 0.5], ['2e-4', 0.0002],
    ['1.1 %', 0.011], ['0', 0], ['100 %', 1], [0.0002, 0.0002], [1e-7, 1e-7], ['  7 ppm ', 7e-6], ['+3 %', 0.03],
  ])('%j is %d', (text, wanted) => {
    expect(share(text)).toBe(wanted);
  });

  it.each([
    'two hundred ppm', '', ' ', '%', '101 %', '-1 ppm', '0,02 %', '1 in 0', '6 in 5', '1.5 in 5000', '1 in 5,000', 'NaN', 'Infinity',
    '1e999999999', `0.${'1'.repeat(80)}`, '1 ppmm', '0x10', '2 per 100 m', '1_000 ppm', '5 PPM', '1 %%', Number.NaN, Infinity, 1.5, -0.1,
  ])('%j is none', (text) => {
    expect(shareOf(text)).toBeUndefined();
  });

  it.each([
    ['98.5 %', 0.015], ['99.9999 %', 1e-6], ['0.999999', 1e-6], [0.95, 0.05], ['99 %', 0.01], ['4999 in 5000', 0.0002], ['95%', 0.05],
  ])('complement of %j is exactly %d', (text, wanted) => {
    expect(complement(text)).toBe(wanted);
  });

  it('every double in [0, 1] is read back as itself', () => {
    fc.assert(fc.property(fc.double({ min: 1e-300, max: 1, noNaN: true }), (value) => {
      expect(share(value)).toBe(value);
    }), { seed: 20260603, numRuns: 500 });
  });

  it('complement of the complement is the share, and both are off by at most half a unit in the last place', () => {
    fc.assert(fc.property(fc.bigInt({ min: 0n, max: 10n ** 12n }), (ppt) => {
      const exact = { numerator: ppt, denominator: 10n ** 12n };
      expect(complementOf(complementOf(exact))).toEqual(exact);
      expect(doubleOf(complementOf(exact))).toBe(Number(10n ** 12n - ppt) / 1e12);
    }), { seed: 20260604, numRuns: 300 });
  });

  it('a number beyond what is believed is refused before it costs anything', () => {
    expect(exactOfText(`1e${'9'.repeat(20)}`)).toBeUndefined();
    expect(exactOfText('1e401')).toBeUndefined();
    expect(exactOfText('-2.50')).toEqual({ numerator: -250n, denominator: 100n });
  });
});

describe('duration', () => {
  it.each([
    ['3 min', 180_000], ['8 h', 28_800_000], ['90 s', 90_000], ['500 ms', 500], ['2 d', 172_800_000], ['1 h 30 min', 5_400_000],
    ['1.5 h', 5_400_000], ['0.1 s', 100], ['8h', 28_800_000], ['PT5M', 300_000], ['PT1H30M', 5_400_000], ['P1D', 86_400_000],
    ['P1DT0.5S', 86_400_500], ['PT0.001S', 1],
  ])('%j lasts %d ms', (text, wanted) => {
    expect(spanMsOf(text)).toBe(wanted);
  });

  it.each(['', '5', 'min', '0 s', '-1 s', '0.5 ms', '1.5 ms', '1.0005 s', '5 minutes', '1 month', 'P1M', 'P1Y', 'P', 'PT', 'P1DT', '1,5 h', '3660 d', 'PT5', '1 h30', '5 m'])(
    '%j is none',
    (text) => {
      expect(spanMsOf(text)).toBeUndefined();
    },
  );
});

describe('amount over an exposure', () => {
  it.each([
    ['2 per 100 m', { value: 2, per: 100, unit: 'm' }],
    ['0.5 per m2', { value: 0.5, per: 1, unit: 'm2' }],
    ['0 per 1000 h', { value: 0, per: 1000, unit: 'h' }],
    ['3 per 1e3 units', { value: 3, per: 1000, unit: 'units' }],
  ])('%j', (text, wanted) => {
    expect(amountOf(text)).toEqual(wanted);
  });

  it.each(['2', '2 per', 'per 100 m', '2 per 100', '-2 per m', '2 per 0 m', '2 per -1 m', 'two per m', '2 per 100 m per h', '1e399 per m'])('%j is none', (text) => {
    expect(amountOf(text)).toBeUndefined();
  });

  it('a plain number keeps its sign and is never infinite', () => {
    expect(finiteOf('-40.5')).toBe(-40.5);
    expect(finiteOf('1e400')).toBeUndefined();
    expect(finiteOf('Infinity')).toBeUndefined();
  });
});
