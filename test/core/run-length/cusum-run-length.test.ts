import { describe, expect, it } from 'vitest';
import { latticeAtRest, latticeFor, latticeRunLength } from '../../../core/run-length/cusum-lattice.ts';
import { cusumDelay, cusumPlan, cusumRunLength } from '../../../core/run-length/cusum-run-length.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { simulateDelay, simulateRunLength } from '../../../core/run-length/simulated-run-length.ts';
import { cusumWatch } from '../../../core/run-length/watch.ts';
import { finished } from './finished.ts';

/** Mean units to the alarm from each state, by solving the whole system of equations. */
function bySolving(climb: number, states: number, rate: number): number[] {
  const rows = Array.from({ length: states }, (_, i) => {
    const row = Array.from({ length: states + 1 }, (_, j) => Number(i === j));
    row[Math.max(0, i - 1)]! -= 1 - rate;
    if (i + climb - 1 < states) row[i + climb - 1]! -= rate;
    row[states] = 1;
    return row;
  });
  for (let i = 0; i < states; i++) {
    for (let k = 0; k < states; k++) {
      const factor = k === i ? 0 : rows[k]![i]! / rows[i]![i]!;
      if (factor !== 0) rows[k] = rows[k]!.map((value, j) => value - factor * rows[i]![j]!);
    }
  }
  return rows.map((row, i) => row[states]! / row[i]!);
}

describe('run length of a cumulative sum on whole steps', () => {
  it.each([[2, 1, 0.3], [2, 6, 0.2], [4, 9, 0.1], [7, 20, 0.3], [12, 30, 0.04]] as const)('climb %i, %i states, rate %d: as by solving the equations', (climb, states, rate) => {
    bySolving(climb, states, rate).forEach((units, start) => {
      expect(latticeRunLength({ climb, states }, rate, start) / units).toBeCloseTo(1, 10);
    });
  });

  it('averages over the states it may start from', () => {
    const lattice = { climb: 7, states: 20 };
    const start = new Float64Array(20);
    start[3] = 0.25;
    start[11] = 0.75;
    const expected = 0.25 * latticeRunLength(lattice, 0.1, 3) + 0.75 * latticeRunLength(lattice, 0.1, 11);
    expect(latticeRunLength(lattice, 0.1, start)).toBeCloseTo(expected, 9);
  });

  it('keeps its digits for runs of any length', () => {
    /* climb 2, rate p: rising by one with p, falling by one (not below 0) with 1 - p. N_0 by the textbook sum
     * over i < H of (1/p) sum over k <= i of ((1-p)/p)^k; at p = 0.01 and H = 12 that is about 1e24. */
    let expected = 0;
    for (let i = 0; i < 12; i++) for (let k = 0; k <= i; k++) expected += 99 ** k / 0.01;
    expect(latticeRunLength({ climb: 2, states: 12 }, 0.01) / expected).toBeCloseTo(1, 12);
  });

  it('finds the fewest states for a wanted length', () => {
    const { lattice, units } = latticeFor(14, 0.05, 2000, 500);
    expect(units).toBe(latticeRunLength(lattice, 0.05));
    expect(units).toBeGreaterThanOrEqual(2000);
    expect(latticeRunLength({ ...lattice, states: lattice.states - 1 }, 0.05)).toBeLessThan(2000);
    expect(latticeFor(14, 0.05, 1e9, 50).lattice.states).toBe(50);
  });

  it('knows where it rests', () => {
    const lattice = { climb: 5, states: 200 };
    let chance = new Float64Array(200);
    chance[0] = 1;
    for (let unit = 0; unit < 4000; unit++) {
      const next = new Float64Array(200);
      chance.forEach((value, i) => {
        next[Math.max(0, i - 1)]! += 0.92 * value;
        if (i + 4 < 200) next[i + 4]! += 0.08 * value;
      });
      chance = next;
    }
    latticeAtRest(lattice, 0.08).forEach((value, i) => expect(value).toBeCloseTo(chance[i]!, 12));
    const rising = latticeAtRest({ climb: 5, states: 2000 }, 0.9);
    expect(rising.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1, 12);
  });

  it('refuses what cannot be', () => {
    expect(() => latticeRunLength({ climb: 1, states: 5 }, 0.1)).toThrow('climb');
    expect(() => latticeRunLength({ climb: 3, states: 5 }, 0.1, 5)).toThrow('start');
    expect(() => latticeRunLength({ climb: 3, states: 5 }, 1)).toThrow('rate');
  });
});

describe('a planned cumulative sum', () => {
  const plan = cusumPlan(0.001, 2, 1e6);

  /* The project's statistical specification, section 4.2, worked for a tuned fraction of 0.0020006. */
  it('is that of the worked example', () => {
    expect(plan.lattice).toEqual({ climb: 693, states: 5509 });
    expect(plan.ratio * 0.001).toBeCloseTo(0.0020006, 7);
    expect(plan.tuning.threshold).toBeCloseTo(5.5203, 2);
    expect(cusumRunLength(plan, 0.0005) / 2.47e9).toBeCloseTo(1, 2);
    expect(cusumRunLength(plan, 0.002) / 12_323).toBeCloseTo(1, 4);
    expect(cusumRunLength(plan, 0.005) / 2265).toBeCloseTo(1, 3);
    expect(cusumRunLength(plan, 0.01) / 962).toBeCloseTo(1, 3);
  });

  it('does what the detector it sets up does', () => {
    const small = cusumPlan(0.02, 3, 4000);
    const watch = cusumWatch(small.tuning);
    const length = finished(simulateRunLength({ watch, runs: 20_000, uniform: seededUniform(22) }, 0.02));
    /* Six standard errors: chance 2e-9 each. */
    expect(Math.abs(length.units - small.runLength)).toBeLessThan(6 * length.standardError);
    for (const [normal, rate] of [[0.01, 0.06], [0.01, 0.1]] as const) {
      const delay = finished(simulateDelay({ watch, runs: 20_000, uniform: seededUniform(23) }, normal, rate));
      expect(Math.abs(delay.units - cusumDelay(small, normal, rate))).toBeLessThan(6 * delay.standardError);
    }
  });

  it('scales to tiny fractions', () => {
    const tiny = cusumPlan(1e-6, 2, 1e9);
    expect(tiny.scale).toBeCloseTo(1000, 9);
    expect(tiny.lattice).toEqual(plan.lattice);
    expect(cusumRunLength(tiny, 2e-6)).toBeCloseTo(1000 * cusumRunLength(plan, 0.002), 3);
    expect(tiny.tuning.down).toBeCloseTo(1e-6 * (tiny.ratio - 1), 11);
    expect(() => cusumRunLength(tiny, 0.002)).toThrow('rate');
  });

  it('refuses what cannot be', () => {
    expect(() => cusumPlan(0.001, 1, 1e6)).toThrow('ratio');
    expect(() => cusumPlan(0.001, 1.01, 1e12)).toThrow('wanted');
    expect(() => cusumPlan(0, 2, 1e6)).toThrow('baseline');
    expect(() => cusumDelay(plan, 0, 0.01)).toThrow('rate');
  });
});
