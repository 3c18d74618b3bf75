import { describe, expect, it } from 'vitest';
import { batchRunLength } from '../../../core/run-length/batch-run-length.ts';
import { binomialChance, binomialChances } from '../../../core/run-length/binomial-chances.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { simulateRunLength } from '../../../core/run-length/simulated-run-length.ts';
import { windowWatch } from '../../../core/run-length/watch.ts';
import { clumpRunLength, productRunLength, unitsWhileFilling, type WindowCall, windowRunLength } from '../../../core/run-length/window-run-length.ts';
import { finished } from './finished.ts';

/** Mean units to the first call by the chain of all windows, looked at every `batch` units; small windows only. */
function byAllWindows({ units, count }: WindowCall, batch: number, rate: number): number {
  const states = 2 ** units;
  const mask = states - 1;
  const calls = Array.from({ length: states }, (_, window) => window.toString(2).replaceAll('0', '').length >= count);
  let chance = new Float64Array(states);
  chance[0] = 1;
  let sum = 0;
  let left = 1;
  let before = 1;
  for (let unit = 1; left > 1e-9 && unit <= 1200; unit++) {
    sum += left;
    const next = new Float64Array(states);
    for (let window = 0; window < states; window++) {
      const value = chance[window]!;
      if (value === 0) continue;
      next[(window << 1) & mask]! += value * (1 - rate);
      next[((window << 1) | 1) & mask]! += value * rate;
    }
    chance = next;
    if (unit % batch !== 0) continue;
    for (let window = 0; window < states; window++) if (calls[window]) next[window] = 0;
    before = left;
    left = next.reduce((total, value) => total + value, 0);
  }
  /* What is left dies out at a constant rate a look; followed on as a geometric series where it was cut. */
  return left > 1e-9 && before > left ? sum + (batch * left) / (1 - left / before) : sum;
}

describe('chances of a count', () => {
  it('are those of the binomial law', () => {
    const { exactly, atMost } = binomialChances(5, 0.3, 7);
    [0.16807, 0.36015, 0.3087, 0.1323, 0.02835, 0.00243, 0, 0].forEach((chance, k) => {
      expect(exactly[k]).toBeCloseTo(chance, 14);
      expect(binomialChance(k, 5, 0.3)).toBeCloseTo(chance, 14);
    });
    expect(atMost[7]).toBeCloseTo(1, 14);
    expect(binomialChance(-1, 5, 0.3)).toBe(0);
  });
});

describe('run length of a window rule', () => {
  it.each([[{ units: 8, count: 3 }, 0.05], [{ units: 10, count: 4 }, 0.1], [{ units: 10, count: 2 }, 0.02], [{ units: 10, count: 5 }, 0.15]] as const)(
    'of %o at %d is close to that of the chain of all windows', (call, rate) => {
      const exact = byAllWindows(call, 1, rate);
      expect(windowRunLength(call, rate).units / exact).toBeGreaterThan(0.97);
      expect(windowRunLength(call, rate).units / exact).toBeLessThan(1.03);
    });

  it.each([[{ units: 8, count: 3 }, 2, 0.05], [{ units: 8, count: 3 }, 4, 0.05], [{ units: 12, count: 4 }, 6, 0.1], [{ units: 10, count: 4 }, 5, 0.12]] as const)(
    'of %o looked at every %i units at %d likewise', (call, batch, rate) => {
      const { units, standing } = batchRunLength(call, batch, rate);
      const exact = byAllWindows(call, batch, rate);
      expect(standing).toBe('close');
      expect(units / exact).toBeGreaterThan(0.98);
      expect(units / exact).toBeLessThan(1.02);
    });

  it('of batches as long as the window is exact', () => {
    /* Independent looks, each of chance P(X >= 4 | 40, 0.03) = 0.0302…; only the last looks within its window, half a look early. */
    const called = 1 - binomialChances(40, 0.03, 3).atMost[3]!;
    const units = batchRunLength({ units: 40, count: 4 }, 40, 0.03).units;
    const filling = unitsWhileFilling({ units: 40, count: 4 }, 0.03);
    expect(units).toBeCloseTo(filling + (40 * (1 - called)) / called, 6);
  });

  it('is watched to the very unit', () => {
    const watch = windowWatch({ units: 3, count: 2 });
    expect([0, 2, 1, 0].map((conforming) => watch.strike(conforming))).toEqual([false, false, true, true]);
    watch.reset();
    expect(watch.strike(0)).toBe(false);
  });

  it('agrees with simulation', () => {
    for (const [call, rate] of [[{ units: 1000, count: 4 }, 0.001], [{ units: 1000, count: 5 }, 0.002], [{ units: 300, count: 12 }, 0.02]] as const) {
      const { units, standardError } = finished(simulateRunLength({ watch: windowWatch(call), runs: 20_000, uniform: seededUniform(21) }, rate));
      /* Six standard errors (chance 2e-9 each) and the 2 % of the form. */
      expect(Math.abs(windowRunLength(call, rate).units - units)).toBeLessThan(6 * standardError + 0.02 * units);
    }
  });

  it('passes from form to form without a jump, and counts to the end where the rate is high', () => {
    const call = { units: 1000, count: 9 };
    const near = productRunLength(call, 0.0004).runLength;
    expect(clumpRunLength(call, 0.0004) / near).toBeCloseTo(1, 2);
    expect(windowRunLength(call, 0.0004).form).toBe('product');
    expect(windowRunLength(call, 2e-5).form).toBe('clump');
    expect(windowRunLength(call, 2e-5).units).toBe(clumpRunLength(call, 2e-5));
    expect(windowRunLength(call, 0.2).units).toBeCloseTo(9 / 0.2, 6);
  });

  it('says at least where too many looks and counts would have to be followed', () => {
    const call = { units: 100_000, count: 150 };
    expect(batchRunLength(call, 10, 0.001)).toEqual({ units: windowRunLength(call, 0.001).units, standing: 'at least' });
  });

  it('refuses what cannot be', () => {
    expect(() => productRunLength({ units: 1, count: 1 }, 0.1)).toThrow('units');
    expect(() => productRunLength({ units: 10, count: 11 }, 0.1)).toThrow('count');
    expect(() => windowRunLength({ units: 10, count: 2 }, 0)).toThrow('rate');
    expect(() => clumpRunLength({ units: 10, count: 2 }, 0.3)).toThrow('rate is 0.3, expected below count / units = 0.2');
    expect(() => batchRunLength({ units: 10, count: 2 }, 3, 0.1)).toThrow('batch is 3, expected a divisor');
  });
});
