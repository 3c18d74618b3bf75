import { requireFinite } from '../bound/mean.ts';
import { requirePositive, requireWhole } from '../bound/out-of-domain.ts';
import { admitMean, newMeanDetector, type MeanDetectorState, type MeanDetectorTuning } from '../sequential/mean-detector.ts';
import type { Uniform } from './seeded-uniform.ts';
import { normalDeviates } from './normal-deviates.ts';
import { RunTally, type SimulatedUnits } from './run-tally.ts';

export interface MeanSimulation {
  readonly tuning: MeanDetectorTuning;
  /** standard deviation of the measurements that are simulated, above 0; they are normally distributed */
  readonly sigma: number;
  /** runs wanted, whole, 1 or more */
  readonly runs: number;
  readonly uniform: Uniform;
}

/** Measurements simulated between two reports: a few milliseconds. */
const stepsPerReport = 20_000;
/** Measurements between two changes tried on the same long good run, and after a false call on the way. */
const apart = 100;
/** A rule that calls falsely all the time is left for a change after this many nevertheless. */
const mostApart = 2000;

/**
 * Mean measurements to the alarm after the mean has shifted at any moment, once the line has long run at its normal
 * mean without a false call. Hands over the figure so far, as `simulateDelay`.
 *
 * @param normal mean before the shift
 * @param mean and after it
 * @throws OutOfDomain
 * @source simulation: one long good run, left for a shift every hundred measurements
 */
export function* simulateMeanDelay({ tuning, sigma, runs, uniform }: MeanSimulation, normal: number, mean: number): Generator<SimulatedUnits, SimulatedUnits, undefined> {
  requireFinite('normal', normal);
  requireFinite('mean', mean);
  requirePositive('sigma', sigma);
  requireWhole('runs', runs, 1);
  const tally = new RunTally(runs);
  const deviate = normalDeviates(uniform);
  let state = newMeanDetector(tuning);
  const calm = (next: MeanDetectorState): boolean => next.alarms === state.alarms;
  let sinceCall = 0;
  let sinceShift = 0;
  for (let steps = 1; tally.count < runs; steps++) {
    const next = admitMean(state, normal + sigma * deviate(), tuning);
    sinceCall = calm(next) ? sinceCall + 1 : 0;
    sinceShift += 1;
    state = next;
    if (sinceShift >= apart && (sinceCall >= apart || sinceShift >= mostApart)) {
      sinceShift = 0;
      let shifted = state;
      let measurements = 0;
      while (calm(shifted)) {
        shifted = admitMean(shifted, mean + sigma * deviate(), tuning);
        measurements += 1;
        if (++steps % stepsPerReport === 0) yield tally.figure();
      }
      tally.add(measurements);
    }
    if (steps % stepsPerReport === 0) yield tally.figure();
  }
  return tally.figure();
}
