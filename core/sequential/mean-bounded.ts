import { OutOfDomain, requireInside } from '../bound/out-of-domain.ts';
import type { Tail } from '../units.ts';

/** Stakes of the bet and of the closed-form bound are capped here, so that no single value ruins them. */
const mostStake = 0.75;
const mostWeight = 0.5;

/**
 * A run of measurements that can only lie between two known ends, scaled to [0, 1]. Plain data: it is
 * stored and read back as it stands. Every field is a sum over the values in their order, so cutting
 * the stream into other batches changes no bit.
 */
export interface BoundedRun {
  /** values so far */
  readonly values: number;
  readonly sum: number;
  /** sum of squared distances of each value from the average foreseen before it */
  readonly squares: number;
  /** ln of the evidence that the mean is above the line */
  readonly logEvidence: number;
  /** sums of the closed-form bound: weights, weighted values, penalties */
  readonly weights: number;
  readonly weighted: number;
  readonly penalties: number;
}

/** A run with no values yet. */
export const emptyBoundedRun: BoundedRun = {
  values: 0, sum: 0, squares: 0, logEvidence: 0, weights: 0, weighted: 0, penalties: 0,
};

/**
 * The run with one more value. The evidence is a bet against 'the mean is at or below the line', each
 * stake fixed before its value is seen.
 *
 * @param value in [0, 1]; mirror it (1 - value) for the other side
 * @param line tested mean, above 0, below 1, mirrored likewise
 * @param tail the stakes are tuned to this alpha; above 0, below 1
 * @throws OutOfDomain
 * @coverage at all looks: the chance that `logEvidence` ever reaches ln(1 / tail) with the mean at or below the line
 *   is at most tail, whatever the distribution
 * @source I. Waudby-Smith, A. Ramdas 2023 (abstract and authors' code read): predictable plug-in, sections 3 and 4
 */
export function admitBounded(run: BoundedRun, value: number, line: number, tail: Tail): BoundedRun {
  if (!(value >= 0 && value <= 1)) throw new OutOfDomain('value', value, 'a number from 0 to 1');
  requireInside('line', line);
  requireInside('tail', tail);
  const t = run.values + 1;
  const foreseen = (0.5 + run.sum) / t;
  const variance = (0.25 + run.squares) / t;
  const stake = Math.sqrt((-2 * Math.log(tail)) / (variance * t * Math.log1p(t)));
  const bet = Math.min(stake, mostStake / line);
  const weight = Math.min(stake, mostWeight);
  const square = (value - foreseen) * (value - foreseen);
  return {
    values: t,
    sum: run.sum + value,
    squares: run.squares + square,
    logEvidence: run.logEvidence + Math.log1p(bet * (value - line)),
    weights: run.weights + weight,
    weighted: run.weighted + weight * value,
    penalties: run.penalties + square * (-Math.log1p(-weight) - weight),
  };
}

/**
 * Lower bound on the mean of a bounded measurement, in closed form, at all looks. Wider than the
 * evidence for one line, but it needs no line.
 *
 * @param tail the tail the run was admitted with
 * @returns below the average; -Infinity before any value; may lie below 0, where it says nothing
 * @coverage never below 1 - tail at all looks together, whatever the distribution
 * @source I. Waudby-Smith, A. Ramdas 2023, predictable plug-in empirical Bernstein bound
 */
export function allLooksBoundedLower(run: BoundedRun, tail: Tail): number {
  requireInside('tail', tail);
  if (run.values === 0) return -Infinity;
  return (run.weighted + Math.log(tail) - run.penalties) / run.weights;
}
