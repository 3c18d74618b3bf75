import { requireInside, requirePositive } from '../bound/out-of-domain.ts';
import type { Tail } from '../units.ts';
import { crossingPoint } from './crossing-point.ts';
import { type GammaPrior, logRateEvidenceAbove, logRateEvidenceBelow, requireRateRun } from './rate-evidence.ts';

/**
 * The exposure from which on this many nonconformities demonstrate a guaranteed rate at all looks:
 * what the record path compares instead of computing evidence.
 *
 * @param count nonconformities of the run so far, whole, 0 or more
 * @param line guaranteed rate per unit of exposure, above 0
 * @param tail all of alpha in one tail, above 0, below 1
 * @param prior fixed before the run began
 * @returns exposure, above 0
 * @throws OutOfDomain; NoConvergence
 * @coverage at all looks, as `logRateEvidenceDemonstrated`
 * @source own derivation: at a fixed count the evidence rises with exposure
 */
export function smallestExposureDemonstrated(count: number, line: number, tail: Tail, prior: GammaPrior): number {
  requireCritical(count, line, tail, prior);
  const enough = -Math.log(tail);
  const start = Math.log((count + 2 * Math.sqrt(count) + enough) / line);
  return Math.exp(crossingPoint((u) => logRateEvidenceBelow(count, Math.exp(u), line, prior) - enough, start));
}

/**
 * The exposure up to which this many nonconformities violate a guaranteed rate at all looks; arguments
 * and errors as of `smallestExposureDemonstrated`.
 *
 * @returns exposure; 0 where no exposure would do
 * @coverage at all looks, as `logRateEvidenceViolated`
 * @source own derivation: at a fixed count the evidence falls with exposure
 */
export function largestExposureViolated(count: number, line: number, tail: Tail, prior: GammaPrior): number {
  requireCritical(count, line, tail, prior);
  const enough = -Math.log(tail);
  if (!(logRateEvidenceAbove(count, 0, line, prior) > enough)) return 0;
  const start = Math.log(count / line);
  return Math.exp(crossingPoint((u) => enough - logRateEvidenceAbove(count, Math.exp(u), line, prior), start));
}

function requireCritical(count: number, line: number, tail: number, prior: GammaPrior): void {
  requireRateRun(count, 0, prior);
  requirePositive('line', line);
  requireInside('tail', tail);
}
