import { describe, expect, it } from 'vitest';
import { highestRateOverExposure, leastExposure, lostShareOfExposure, steadyExposure } from '../../../core/run-length/steady-exposure.ts';
import { steadyWindow } from '../../../core/run-length/steady-window.ts';
import { nearestNormalMean } from '../../../core/run-length/steady-mean.ts';
import { chanceOfMeanDemonstration, meanDemonstrationUnits } from '../../../core/plan/mean-demonstration.ts';
import type { Tail } from '../../../core/units.ts';

const wish = { line: 1, tail: 0.05 as Tail, lost: 0.01 as Tail };

/** Chance of more than `count` at an expectation, summed term by term. */
function moreThan(count: number, expected: number): number {
  let term = Math.exp(-expected);
  let sum = 0;
  for (let k = 0; k <= count; k += 1) {
    sum += term;
    term *= expected / (k + 1);
  }
  return 1 - sum;
}
/** The most with which an exposure demonstrates a rate of 1, by trying. */
function allowed(exposure: number): number {
  let count = -1;
  while (1 - moreThan(count + 1, exposure) <= 0.05) count += 1;
  return count;
}

describe('the window of a rate', () => {
  // The window's expected nonconformities at the line, for these normal rates: own specification of the methods, from the binomial law.
  it.each([[1 / 4, 16], [1 / 3, 23.5], [1 / 2, 48], [0.7, 150]])('at %d of the line expects about %d at the line', (normal, expected) => {
    // Those figures are steady ones, between the least window and the one from which every larger one does.
    expect(leastExposure(wish, normal) / expected).toBeGreaterThan(0.9);
    expect(leastExposure(wish, normal) / expected).toBeLessThan(1.02);
    expect(steadyExposure(wish, normal) / expected).toBeGreaterThan(0.98);
    expect(steadyExposure(wish, normal) / expected).toBeLessThan(1.1);
  });

  it.each([0.1, 0.25, 0.5, 0.7])('keeps a line at %d demonstrated, and so does every larger one from the steady one on', (normal) => {
    const least = leastExposure(wish, normal);
    const steady = steadyExposure(wish, normal);
    expect(steady).toBeGreaterThanOrEqual(least);
    const lost = (exposure: number): number => moreThan(allowed(exposure), exposure * normal);
    expect(lost(least * (1 + 1e-9))).toBeLessThanOrEqual(0.01);
    for (let step = 0; step < 400; step += 1) expect(lost(steady * (1.000001 + step / 400))).toBeLessThanOrEqual(0.01);
    let better = 0;
    for (let step = 1; step < 400; step += 1) if (lost(least * (1 - step / 400)) <= 0.01) better += 1;
    expect(better).toBe(0);
    expect(lostShareOfExposure(least * 1.01, normal, 1, wish.tail)).toBeCloseTo(lost(least * 1.01), 12);
  });

  it('is the limit of the window of a fraction, as units become small', () => {
    expect(steadyExposure(wish, 0.25)).toBeCloseTo(steadyWindow({ ...wish, line: 1e-7 }, 0.25e-7) * 1e-7, 5);
    expect(steadyExposure(wish, 0)).toBeCloseTo(-Math.log(0.05), 12);
  });

  it('told the other way round, gives the rate', () => {
    const highest = highestRateOverExposure(wish, 20);
    expect(moreThan(allowed(20), 20 * highest)).toBeCloseTo(0.01, 12);
    expect(highestRateOverExposure(wish, 1)).toBe(0);
    expect(lostShareOfExposure(1, 0.001, 1, wish.tail)).toBe(1);
  });

  it.each([[{ normal: 1 }, 'normal'], [{ normal: -1 }, 'normal'], [{ normal: 0.9999999 }, 'normal'], [{ lost: 0 }, 'lost'], [{ line: 0 }, 'line']])('refuses %j', (bad, argument) => {
    const { normal, ...rest } = { normal: 0.5, ...bad };
    expect(() => steadyExposure({ ...wish, ...rest } as never, normal)).toThrow(new RegExp(`^${argument} `));
  });
});

describe('the window of a mean', () => {
  const promise = { side: 'at-least', line: 1000 } as const;

  it('with a known sigma, told the other way round: the two quantiles over the root of its size', () => {
    // z(0.05) = 1.6448536269514722, z(0.01) = 2.3263478740408408: standard tables.
    const off = (3 * (1.6448536269514722 + 2.3263478740408408)) / Math.sqrt(50);
    expect(nearestNormalMean(50, promise, { sigma: 3, sigmaKnown: true }, 0.05 as Tail, 0.01 as Tail)).toBeCloseTo(1000 + off, 9);
    expect(nearestNormalMean(50, { ...promise, side: 'at-most' }, { sigma: 3, sigmaKnown: true }, 0.05 as Tail, 0.01 as Tail)).toBeCloseTo(1000 - off, 9);
  });

  it('with the spread of the window, agrees with the measurements a normal mean needs', () => {
    const process = { sigma: 3, sigmaKnown: false };
    const units = meanDemonstrationUnits(promise, { ...process, mean: 1002 }, 0.05 as Tail, 0.99)!;
    const nearest = nearestNormalMean(units, promise, process, 0.05 as Tail, 0.01 as Tail);
    expect(nearest).toBeLessThanOrEqual(1002);
    expect(nearestNormalMean(units - 1, promise, process, 0.05 as Tail, 0.01 as Tail)).toBeGreaterThan(1002);
    expect(chanceOfMeanDemonstration(units, promise, { ...process, mean: nearest }, 0.05 as Tail)).toBeCloseTo(0.99, 10);
  });
});
