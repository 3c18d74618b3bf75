import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatsFor, written } from '../../client/format.ts';
import { card, english, loose } from './made-up.ts';

const inUnit = (unit: 'ppm' | '%' | '1 in N', value: number, locale = 'en-GB'): string =>
  loose(written(formatsFor(locale, 'UTC', unit).figure(card(), value)));

describe('figures', () => {
  it.each([
    ['ppm', 148e-6, '148 ppm'], ['ppm', 1234.4e-6, '1,234 ppm'], ['ppm', 0.53e-6, '0.53 ppm'], ['ppm', 0, '0 ppm'],
    ['%', 148e-6, '0.0148 %'], ['%', 0.0632, '6.32 %'], ['1 in N', 484e-6, '1 in 2,066'], ['1 in N', 0, 'none'],
  ] as const)('in %s: %d is %s', (unit, value, text) => {
    expect(inUnit(unit, value)).toBe(text);
  });

  it('are written in the reader’s locale', () => {
    expect(inUnit('ppm', 1234.4e-6, 'de-DE')).toBe('1.234 ppm');
  });

  it('of a yield are per cent in every unit, with three digits of what is missing', () => {
    const of = card({ quantity: 'yield', side: 'at-least', guaranteeLine: 0.985, target: 0.99 });
    expect(loose(written(english.figure(of, 0.98631)))).toBe('98.63 %');
    expect(loose(written(english.figure(of, 0.9999966)))).toBe('99.99966 %');
  });

  it('of a rate are told for its own exposure, of a mean with three digits of the allowance', () => {
    expect(loose(written(english.figure(card({ scale: { kind: 'rate', per: 100, unit: 'm' } }), 0.82)))).toBe('0.82 per 100 m');
    expect(loose(written(english.figure(card({ scale: { kind: 'measure', unit: 'ml' }, side: 'at-least', guaranteeLine: 250, target: 252 }), 250.9631)))).toBe('250.96 ml');
  });

  it('that are no number are a dash, never a zero', () => {
    for (const value of [undefined, Number.NaN, Number.POSITIVE_INFINITY]) expect(written(english.figure(card(), value))).toBe('–');
  });

  it('beside the line are never rounded onto it', () => {
    fc.assert(fc.property(fc.double({ min: -1e-3, max: 1e-3, noNaN: true }), (off) => {
      fc.pre(Math.abs(off) > 1e-6);
      const figure = english.figureBesideLine(card(), 200e-6 * (1 + off));
      return figure.text !== '200';
    }), { seed: 1 });
    expect(english.figureBesideLine(card(), 200e-6).text).toBe('200');
  });
});

describe('other numbers', () => {
  it('a confidence level keeps its digits', () => {
    expect(['0.95', '0.9', '0.9995'].map((level) => loose(english.confidence(level)))).toEqual(['95 %', '90 %', '99.95 %']);
  });

  it.each([[400, 'under 1 s'], [1000, '1 s'], [59_999, '59 s'], [250_000, '4 min 10 s'], [11_520_000, '3 h 12 min'], [3_600_000, '1 h'], [90_000_000, '1 d 1 h'], [Number.NaN, '–']])('%d ms is %s', (ms, text) => {
    expect(english.span(ms)).toBe(text);
  });

  it('times stand in the plant’s zone, on both sides of a clock change', () => {
    // Central Europe went to summer time on 29 March 2026 at 01:00 UTC (EU directive 2000/84/EC)
    expect(english.minute(Date.UTC(2026, 2, 29, 0, 59))).toBe('01:59');
    expect(english.minute(Date.UTC(2026, 2, 29, 1, 1))).toBe('03:01');
  });
});
