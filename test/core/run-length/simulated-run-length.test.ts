import { describe, expect, it } from 'vitest';
import { runLengthStanding } from '../../../core/run-length/cluster-guard.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { simulateDelay, simulateRunLength } from '../../../core/run-length/simulated-run-length.ts';
import { highestNormalRate, lostShare, steadyWindow } from '../../../core/run-length/steady-window.ts';
import { detectorWatch, type Watch, windowWatch } from '../../../core/run-length/watch.ts';
import { admitRun, newDetector } from '../../../core/sequential/change-detector.ts';
import { fractionDetector } from '../../../core/sequential/detector-tuning.ts';
import { demonstratedCount } from '../../../core/bound/critical-count.ts';
import type { Tail } from '../../../core/units.ts';
import { finished } from './finished.ts';

/** Calls at every nonconforming unit. */
const first: Watch = { strike: () => true, reset: () => undefined, mark: () => undefined, back: () => undefined };

describe('numbers with a seed', () => {
  it('are even, in order, and the same again', () => {
    const uniform = seededUniform(7);
    const again = seededUniform(7);
    let sum = 0;
    let squares = 0;
    let products = 0;
    let last = 0.5;
    for (let i = 0; i < 200_000; i++) {
      const value = uniform();
      expect(again()).toBe(value);
      sum += value;
      squares += value * value;
      products += (value - 0.5) * (last - 0.5);
      last = value;
    }
    /* Six standard errors: chance 2e-9 each. */
    expect(Math.abs(sum / 200_000 - 1 / 2)).toBeLessThan(6 * Math.sqrt(1 / 12 / 200_000));
    expect(Math.abs(squares / 200_000 - 1 / 3)).toBeLessThan(6 * Math.sqrt(4 / 45 / 200_000));
    expect(Math.abs(products / 200_000)).toBeLessThan(6 / 12 / Math.sqrt(200_000));
    expect(seededUniform(8)()).not.toBe(seededUniform(7)());
  });
});

describe('simulated run lengths', () => {
  it('wait 1 / rate for the first nonconforming unit, before a change as after it', () => {
    const length = finished(simulateRunLength({ watch: first, runs: 40_000, uniform: seededUniform(24) }, 0.01));
    expect(Math.abs(length.units - 100)).toBeLessThan(6 * length.standardError);
    expect(length.standardError).toBeCloseTo(Math.sqrt(0.99) / 0.01 / 200, 1);
    expect(length).toMatchObject({ runs: 40_000, done: 1 });
    const never: Watch = { ...first, strike: strikeOdd() };
    const delay = finished(simulateDelay({ watch: never, runs: 5000, uniform: seededUniform(25) }, 0.5, 0.01));
    expect(Math.abs(delay.units - 100)).toBeLessThan(6 * delay.standardError);
  });

  /** Calls at every hundred and first nonconforming unit: the one after each change. */
  function strikeOdd(): () => boolean {
    let count = 0;
    return () => ++count % 101 === 0;
  }

  it('report on the way and can be left', () => {
    const simulation = simulateRunLength({ watch: windowWatch({ units: 100, count: 5 }), runs: 1e9, uniform: seededUniform(26) }, 0.01);
    const one = simulation.next();
    const two = simulation.next();
    expect(one.done).toBe(false);
    expect(two.value.runs).toBeGreaterThan(one.value.runs);
    expect(two.value.done).toBeCloseTo(two.value.runs / 1e9, 15);
    expect(simulation.return(two.value).done).toBe(true);
    const patient: Watch = { ...first, strike: () => false };
    const none = simulateRunLength({ watch: patient, runs: 1, uniform: seededUniform(27) }, 0.01).next().value;
    expect(none.units).toBeNaN();
    let strikes = 0;
    const late: Watch = { ...patient, strike: () => ++strikes > 90_000 };
    expect(simulateDelay({ watch: late, runs: 1, uniform: seededUniform(27) }, 0.01, 0.02).next().value.runs).toBe(0);
  });

  it('are about the very detector that runs', () => {
    const tuning = fractionDetector(0.02, 2000);
    const watch = detectorWatch(tuning);
    const uniform = seededUniform(28);
    let state = newDetector(tuning);
    for (let i = 0; i < 5000; i++) {
      const gap = Math.floor(-Math.log(uniform()) / 0.03);
      const alarms = state.alarms;
      state = admitRun(state, gap, tuning);
      expect(watch.strike(gap)).toBe(state.alarms > alarms);
      if (state.alarms > alarms) watch.reset();
    }
    expect(state.alarms).toBeGreaterThan(20);
  });

  it('keep the guarantee of the detector, on the line and at half of it', () => {
    const tuning = fractionDetector(0.02, 2000);
    const onLine = finished(simulateRunLength({ watch: detectorWatch(tuning), runs: 20_000, uniform: seededUniform(29) }, 0.02));
    /* Six standard errors: chance 2e-9. */
    expect(onLine.units).toBeGreaterThan(2000 - 6 * onLine.standardError);
    expect(onLine.units).toBeLessThan(2 * 2000);
    const well = finished(simulateRunLength({ watch: detectorWatch(tuning), runs: 100, uniform: seededUniform(30) }, 0.01));
    expect(well.units).toBeGreaterThan(5 * onLine.units);
  });

  it('put the change at any unit of a long good run', () => {
    /* A window of 50 that calls at the third, simulated unit by unit. Six standard errors: chance 2e-9. */
    const [normal, rate] = [0.002, 0.05];
    const uniform = seededUniform(31);
    let sum = 0;
    let squares = 0;
    let runs = 0;
    while (runs < 4000) {
      const places: number[] = [];
      let unit = 0;
      let called = false;
      for (; unit < 400 && !called; unit++) {
        if (uniform() < normal) places.push(unit);
        called = places.length > 2 && unit - places.at(-3)! < 50 && places.at(-1) === unit;
      }
      if (called) continue;
      let delay = 0;
      for (called = false; !called; unit++) {
        delay += 1;
        if (uniform() < rate) places.push(unit);
        called = places.length > 2 && unit - places.at(-3)! < 50 && places.at(-1) === unit;
      }
      runs += 1;
      sum += delay;
      squares += delay * delay;
    }
    const mean = sum / runs;
    const error = Math.sqrt((squares / runs - mean * mean) / runs);
    const simulated = finished(simulateDelay({ watch: windowWatch({ units: 50, count: 3 }), runs: 20_000, uniform: seededUniform(32) }, normal, rate));
    expect(Math.abs(simulated.units - mean)).toBeLessThan(6 * Math.hypot(error, simulated.standardError));
  });

  it('find the detector later after a small change than after a large one, and later from a better line', () => {
    const watch = detectorWatch(fractionDetector(0.02, 2000));
    const delay = (normal: number, rate: number): number =>
      finished(simulateDelay({ watch, runs: 4000, uniform: seededUniform(33) }, normal, rate)).units;
    expect(delay(0.02, 0.04)).toBeGreaterThan(2 * delay(0.02, 0.1));
    expect(delay(0.01, 0.1)).toBeGreaterThan(delay(0.02, 0.1));
  });

  it('leave even a rule that calls falsely all the time', () => {
    const { runs } = finished(simulateDelay({ watch: windowWatch({ units: 50, count: 2 }), runs: 50, uniform: seededUniform(34) }, 0.02, 0.1));
    expect(runs).toBe(50);
  });

  it('refuse what cannot be', () => {
    const simulation = { watch: first, runs: 1, uniform: seededUniform(1) };
    expect(() => simulateRunLength(simulation, 0).next()).toThrow('rate');
    expect(() => simulateRunLength({ ...simulation, runs: 0 }, 0.1).next()).toThrow('runs');
    expect(() => simulateDelay(simulation, 1, 0.1).next()).toThrow('normal');
  });
});

describe('steady windows', () => {
  const wish = { line: 0.02, tail: 0.05 as Tail, lost: 0.01 as Tail };

  it.each([0.002, 0.005, 0.01])('at a normal rate of %d hold from there on, and not one unit before', (normal) => {
    const units = steadyWindow(wish, normal);
    for (let window = units; window < 2 * units; window++) expect(lostShare(window, normal, wish.line, wish.tail)).toBeLessThanOrEqual(0.01);
    expect(lostShare(units - 1, normal, wish.line, wish.tail)).toBeGreaterThan(0.01);
  });

  it('run backwards give the highest normal rate that a window bears', () => {
    for (const units of [149, 150, 400, 2000]) {
      const rate = highestNormalRate(wish, units);
      if (demonstratedCount(units, wish.line, wish.tail) < 0) {
        expect(rate).toBe(0);
        expect(lostShare(units, 0.001, wish.line, wish.tail)).toBe(1);
      } else expect(lostShare(units, rate, wish.line, wish.tail)).toBeCloseTo(0.01, 10);
    }
  });

  it('answer the ends and refuse a normal rate too near the line', () => {
    expect(steadyWindow(wish, 0)).toBe(149);
    expect(() => steadyWindow(wish, 0.02)).toThrow('normal');
    expect(() => steadyWindow(wish, 0.019999)).toThrow('farther below');
    expect(() => steadyWindow({ ...wish, lost: 0 as Tail }, 0.01)).toThrow('lost');
  });
});

describe('the guard against clusters', () => {
  it('lets a figure stand only where the dispersion test has nothing to say', () => {
    expect(runLengthStanding(0.4)).toEqual({ kind: 'holds' });
    expect(runLengthStanding(0.01)).toEqual({ kind: 'holds' });
    expect(runLengthStanding(0.009)).toEqual({ kind: 'clustered', remedies: ['merge', 'temper', 'design-effect', 'lots'] });
    expect(runLengthStanding(NaN)).toEqual({ kind: 'unknown' });
    expect(runLengthStanding(1.2)).toEqual({ kind: 'unknown' });
    expect(runLengthStanding(0.02, 0.05).kind).toBe('clustered');
  });
});
