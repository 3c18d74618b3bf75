import { requireInside } from '../bound/out-of-domain.ts';
import type { Thresholds } from '../evidence/thresholds.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Tail } from '../units.ts';
import { crossingPoint } from './crossing-point.ts';
import { type BetaPrior, logEvidenceBelow, requireRun } from './nonconforming-evidence.ts';

/** More in a row than any line makes. */
const mostMore = 2 ** 40;

/** How a run stands in counts. */
export interface RunCounts {
  readonly units: number;
  readonly nonconforming: number;
}

/**
 * Conforming units in a row until the run's evidence demonstrates the guarantee.
 *
 * @returns whole, 0 where it does already; Infinity where no number would do
 */
export function conformingUntilDemonstrated({ units, nonconforming }: RunCounts, thresholds: Thresholds): number {
  return Math.max(0, thresholds.sizeToDemonstrate(nonconforming) - units);
}

/**
 * Nonconforming units in a row the run can take and stay demonstrated.
 *
 * @returns whole, 0 or more; undefined where it is not demonstrated as it stands
 */
export function nonconformingAffordable({ units, nonconforming }: RunCounts, thresholds: Thresholds): number | undefined {
  const stands = (more: number): boolean => units + more >= thresholds.sizeToDemonstrate(nonconforming + more);
  const last = lastWhere(stands, 0, mostMore, 0);
  return last < 0 ? undefined : last;
}

/**
 * Nonconforming units in a row until the run's evidence violates the guarantee.
 *
 * @returns whole, 0 where it does already
 */
export function nonconformingUntilViolated({ units, nonconforming }: RunCounts, thresholds: Thresholds): number {
  const open = (more: number): boolean =>
    nonconforming + more === 0 || !(units + more <= thresholds.sizeViolated(nonconforming + more));
  return lastWhere(open, 0, mostMore, 0) + 1;
}

/**
 * About how many units more the demonstration takes if the line goes on at one rate: where the
 * evidence gets there along the expected counts. More than half of all runs take less; a tenth take
 * one and a half times to twice as long.
 *
 * @param rate nonconforming fraction from here on, 0 or more
 * @returns 0 or more; Infinity for a rate at or above the line
 * @throws OutOfDomain; NoConvergence
 * @source own derivation
 */
export function unitsToDemonstrate(run: RunCounts, rate: number, line: number, tail: Tail, prior: BetaPrior): number {
  requireRun(run.nonconforming, run.units, line, prior);
  requireInside('tail', tail);
  if (!(rate < line)) return Infinity;
  const split = { p: line, q: 1 - line };
  const short = (more: number): number => logEvidenceBelow(run.nonconforming + more * rate, run.units + more, split, prior) + Math.log(tail);
  return short(0) >= 0 ? 0 : Math.exp(crossingPoint((u) => short(Math.exp(u)), Math.log(3 / (line - rate))));
}
