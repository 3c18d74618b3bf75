import { requireInside } from '../bound/out-of-domain.ts';
import type { Tail } from '../units.ts';
import { crossingPoint } from './crossing-point.ts';
import { type GammaPrior, logRateEvidenceAbove, logRateEvidenceBelow, requireRateRun } from './rate-evidence.ts';

/**
 * Upper bound on a line's rate of nonconformities that holds at every look of a run.
 *
 * @param count nonconformities since the run began, whole, 0 or more
 * @param exposure units, metres or hours they were counted in, 0 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @param prior fixed before the run began
 * @returns per unit of exposure, [count / exposure, Infinity]; Infinity before any exposure
 * @throws OutOfDomain; NoConvergence
 * @coverage never below 1 - tail at all looks together, for any rate that stays the same through the run
 * @source inversion of `logRateEvidenceDemonstrated` in the tested rate
 */
export function allLooksRateUpper(count: number, exposure: number, tail: Tail, prior: GammaPrior): number {
  requireRateRun(count, exposure, prior);
  requireInside('tail', tail);
  if (exposure === 0) return Infinity;
  const enough = -Math.log(tail);
  const start = Math.log(Math.max(count, 0.5) / exposure);
  return Math.exp(crossingPoint((u) => logRateEvidenceBelow(count, exposure, Math.exp(u), prior) - enough, start));
}

/**
 * Lower bound on a line's rate that holds at every look of a run; arguments, errors and coverage as
 * of `allLooksRateUpper`.
 *
 * @returns per unit of exposure, [0, count / exposure]; exactly 0 while nothing was found or before any exposure
 * @coverage never below 1 - tail at all looks together
 * @source inversion of `logRateEvidenceViolated` in the tested rate
 */
export function allLooksRateLower(count: number, exposure: number, tail: Tail, prior: GammaPrior): number {
  requireRateRun(count, exposure, prior);
  requireInside('tail', tail);
  if (count === 0 || exposure === 0) return 0;
  const enough = -Math.log(tail);
  const start = Math.log(count / exposure);
  return Math.exp(crossingPoint((u) => enough - logRateEvidenceAbove(count, exposure, Math.exp(u), prior), start));
}
