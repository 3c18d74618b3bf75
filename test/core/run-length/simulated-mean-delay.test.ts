import { describe, expect, it } from 'vitest';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { simulateMeanDelay } from '../../../core/run-length/simulated-mean-delay.ts';
import { usualShifts } from '../../../core/sequential/mean-detector.ts';
import { finished } from './finished.ts';

const model = { kind: 'known sigma', sigma: 2, shifts: usualShifts } as const;
const simulation = (threshold: number) => ({ tuning: { baseline: 100, watchesFor: 'fallen', model, threshold } as const, sigma: 2, runs: 2000, uniform: seededUniform(7) });

describe('the delay of a detector of a mean', () => {
  it('of one that a shift sets off at once is one measurement', () => {
    expect(finished(simulateMeanDelay(simulation(50), 101, 40)).units).toBe(1);
  });

  it('grows as the shift shrinks, and with the wanted distance between false calls', () => {
    const delays = [94, 96, 98, 99].map((mean) => finished(simulateMeanDelay(simulation(10_000), 100, mean)).units);
    expect(delays).toEqual([...delays].sort((a, b) => a - b));
    expect(finished(simulateMeanDelay(simulation(1e6), 100, 98)).units).toBeGreaterThan(delays[2]!);
  });

  it('of a lasting shift is near what the evidence gains a measurement', () => {
    // A shift of d sigma gains d^2/2 a measurement on average: ln(threshold * 6) / (d^2/2) and a little for the start (own derivation).
    const { units, standardError } = finished(simulateMeanDelay(simulation(1e6), 100, 98));
    expect(units).toBeGreaterThan(Math.log(1e6) / 0.5 - 6);
    expect(units).toBeLessThan(Math.log(6e6) / 0.5 + 6);
    expect(standardError).toBeLessThan(0.02 * units);
  });

  it('comes out the same every time', () => {
    expect(finished(simulateMeanDelay(simulation(1000), 100, 97))).toEqual(finished(simulateMeanDelay(simulation(1000), 100, 97)));
  });

  it.each([[NaN, 1], [1, Infinity]])('refuses %d and %d', (normal, mean) => {
    expect(() => simulateMeanDelay(simulation(1000), normal, mean).next()).toThrow(/expected/);
  });
});
