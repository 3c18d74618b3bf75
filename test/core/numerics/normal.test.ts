import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  logNormalCdf,
  normalDensity,
  normalFromMiddle,
  normalQuantileOfTail,
  normalTail,
} from '../../../core/numerics/normal.ts';

const relative = (got: number, wanted: number): number => Math.abs(got / wanted - 1);

/** z, upper tail; mpmath 1.3, 50 digits, erfc(z/sqrt 2)/2 with z taken as the double it is. */
const tails: readonly (readonly [number, number])[] = [
  [0, 0.5],
  [0.1, 0.46017216272297102],
  [0.4, 0.34457825838967583],
  [1, 0.15865525393145705],
  [2.5, 0.0062096653257761352],
  [4.069054771661685, 2.3602125328808745e-5],
  [6, 9.8658764503769814e-10],
  [10, 7.6198530241605261e-24],
  [37, 5.7255712225245768e-300],
];

describe('normal distribution', () => {
  it.each(tails)('upper tail beyond %d', (z, tail) => {
    expect(relative(normalTail(z), tail)).toBeLessThan(1e-15);
    expect(relative(Math.exp(logNormalCdf(-z)), tail)).toBeLessThan(1e-13);
    expect(normalTail(-z)).toBe(1 - normalTail(z));
  });

  it.each(tails.slice(1))('quantile of the tail beyond %d', (z, tail) => {
    expect(relative(normalQuantileOfTail(tail), z)).toBeLessThan(2e-15);
  });

  it('quantiles of the outside grid to 1e-14', () => {
    const grid = JSON.parse(readFileSync(new URL('../../reference/grid-t-quantile-open.json', import.meta.url), 'utf8')) as {
      rows: [number | 'inf', number, number][];
    };
    const rows = grid.rows.filter(([df]) => df === 'inf');
    expect(rows.length).toBe(4);
    for (const [, confidence, quantile] of rows) {
      const tail = Number((1 - confidence).toFixed(12));
      expect(relative(normalQuantileOfTail(tail), quantile)).toBeLessThan(1e-14);
    }
  });

  it('reaches the smallest double and stays exact around the middle', () => {
    // mpmath 1.3, 50 digits
    expect(relative(normalQuantileOfTail(5e-324), 38.467405617144346)).toBeLessThan(1e-15);
    expect(normalQuantileOfTail(0.5)).toBe(0);
    expect(relative(normalQuantileOfTail(0.5 - 2 ** -50), 2 ** -50 * Math.sqrt(2 * Math.PI))).toBeLessThan(1e-15);
  });

  it('pieces of the fits meet without a step', () => {
    for (const z of [0.4, 1, 2.5, 6]) {
      const below = z * (1 - 2 ** -50);
      expect(relative(normalTail(below), normalTail(z))).toBeLessThan(1e-13);
      expect(normalTail(below)).toBeGreaterThanOrEqual(normalTail(z) * (1 - 1e-15));
      expect(normalFromMiddle(z)).toBeCloseTo(0.5 - normalTail(z), 15);
    }
  });

  it('answers the ends and refuses what is no tail', () => {
    expect(normalTail(Infinity)).toBe(0);
    expect(normalTail(-Infinity)).toBe(1);
    expect(normalDensity(Infinity)).toBe(0);
    for (const tail of [0, 1, -0.1, 1.5, NaN]) expect(normalQuantileOfTail(tail)).toBeNaN();
    expect(normalTail(NaN)).toBeNaN();
    expect(normalDensity(NaN)).toBeNaN();
  });
});
