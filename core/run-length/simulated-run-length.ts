import { requireInside, requireWhole } from '../bound/out-of-domain.ts';
import { RunTally, type SimulatedUnits } from './run-tally.ts';
import type { Uniform } from './seeded-uniform.ts';
import type { Watch } from './watch.ts';

export interface Simulation {
  readonly watch: Watch;
  /** runs wanted, whole, 1 or more */
  readonly runs: number;
  /** numbers with a fixed seed */
  readonly uniform: Uniform;
}

/** Nonconforming units simulated between two reports: a few milliseconds. */
const stepsPerReport = 20_000;
/** Nonconforming units between two changes tried on the same long good run, and after a false call on the way. */
const apart = 100;
/** A rule that calls falsely all the time is left for a change after this many nevertheless. */
const mostApart = 2000;

/**
 * Mean units from a fresh start to the alarm at one rate, by simulating nonconforming units only. A
 * generator: it hands over the figure so far every few milliseconds, and whoever runs it stops when
 * the figure is good enough, or when asked to.
 *
 * @param rate nonconforming fraction, above 0, below 1
 * @throws OutOfDomain
 * @source event-driven simulation; the gap to the next nonconforming unit is geometric
 */
export function* simulateRunLength({ watch, runs, uniform }: Simulation, rate: number): Generator<SimulatedUnits, SimulatedUnits, undefined> {
  requireInside('rate', rate);
  requireWhole('runs', runs, 1);
  const tally = new RunTally(runs);
  const conforming = gapsAt(rate, uniform);
  watch.reset();
  let units = 0;
  for (let steps = 1; tally.count < runs; steps++) {
    const gap = conforming();
    units += gap + 1;
    if (watch.strike(gap)) {
      tally.add(units);
      watch.reset();
      units = 0;
    }
    if (steps % stepsPerReport === 0) yield tally.figure();
  }
  return tally.figure();
}

/**
 * Mean units to the alarm after a change at any moment, once the line has long run at its normal rate
 * without a false call. Reports as `simulateRunLength`.
 *
 * @param normal nonconforming fraction before the change, above 0, below 1
 * @param rate and after it, likewise
 * @throws OutOfDomain
 * @source event-driven simulation: one long good run, left for a change every hundred nonconforming units
 */
export function* simulateDelay({ watch, runs, uniform }: Simulation, normal: number, rate: number): Generator<SimulatedUnits, SimulatedUnits, undefined> {
  requireInside('normal', normal);
  requireInside('rate', rate);
  requireWhole('runs', runs, 1);
  const tally = new RunTally(runs);
  const before = gapsAt(normal, uniform);
  const after = gapsAt(rate, uniform);
  watch.reset();
  let sinceCall = 0;
  let sinceChange = 0;
  for (let steps = 1; tally.count < runs; steps++) {
    const called = watch.strike(before());
    if (called) watch.reset();
    sinceCall = called ? 0 : sinceCall + 1;
    sinceChange += 1;
    if (sinceChange >= apart && (sinceCall >= apart || sinceChange >= mostApart)) {
      sinceChange = 0;
      watch.mark();
      /* The change may come at any unit, so part of a good stretch lies behind it; the geometric gap has no memory. */
      let gap = after();
      let units = gap + 1;
      let alarm = watch.strike(before() + gap);
      while (!alarm) {
        gap = after();
        units += gap + 1;
        alarm = watch.strike(gap);
        if (++steps % stepsPerReport === 0) yield tally.figure();
      }
      tally.add(units);
      watch.back();
    }
    if (steps % stepsPerReport === 0) yield tally.figure();
  }
  return tally.figure();
}

/** Conforming units before the next nonconforming one. */
function gapsAt(rate: number, uniform: Uniform): () => number {
  const perUnit = 1 / Math.log1p(-rate);
  return () => Math.floor(Math.log(uniform()) * perUnit);
}
