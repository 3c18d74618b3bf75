import { noncentralityOfTail } from '../numerics/noncentral-t-root.ts';
import type { Tail } from '../units.ts';
import { mostMeasurements } from './mean.ts';
import { OutOfDomain, requireInside, requireWhole } from './out-of-domain.ts';

/** Largest distance of a limit from the mean, in standard deviations, that is computed with. */
const farthest = 1e9;

/**
 * Lower bound on how many true standard deviations the true mean stands inside a specification limit.
 *
 * @param n        measurements, whole, 2 to 1e12
 * @param distance (USL - mean)/sd or (mean - LSL)/sd of the sample, -1e9 to 1e9
 * @param tail     above 0, below 1
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage exactly 1 - tail at one look fixed in advance, for independent measurements of a normal distribution only
 * @source distance sqrt(n) is noncentral t with n - 1 degrees of freedom (definition); solved for the noncentrality
 */
export function distanceLower(n: number, distance: number, tail: Tail): number {
  requireDistance(n, 'k', distance, farthest, tail);
  return noncentralityOfTail(tail, n - 1, distance * Math.sqrt(n)) / Math.sqrt(n);
}

/** Upper bound on the same; arguments, errors, coverage and source as of `distanceLower`. */
export function distanceUpper(n: number, distance: number, tail: Tail): number {
  return -distanceLower(n, -distance, tail);
}

/**
 * Lower bound on a one-sided capability index, (USL - mu)/(3 sigma) or (mu - LSL)/(3 sigma).
 *
 * @param n        measurements, whole, 2 to 1e12
 * @param estimate the index of the sample, -3e8 to 3e8
 * @param tail     above 0, below 1
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage as `distanceLower`
 * @source a third of `distanceLower` at three times the estimate
 */
export function capabilityLower(n: number, estimate: number, tail: Tail): number {
  requireDistance(n, 'estimate', estimate, 3e8, tail);
  return distanceLower(n, 3 * estimate, tail) / 3;
}

/** Upper bound on a one-sided capability index; all else as of `capabilityLower`. */
export function capabilityUpper(n: number, estimate: number, tail: Tail): number {
  return -capabilityLower(n, -estimate, tail);
}

function requireDistance(n: number, argument: string, value: number, most: number, tail: number): void {
  requireWhole('n', n, 2, mostMeasurements);
  if (!(Math.abs(value) <= most)) throw new OutOfDomain(argument, value, `a number from ${-most} to ${most}`);
  requireInside('tail', tail);
}
