import { requirePositive, requireWhole } from '../bound/out-of-domain.ts';
import { logGammaAbove, logGammaBelow } from './gamma-kernel.ts';

/** Where the evidence expects the rate before the run: a gamma distribution with mean shape / exposure. */
export interface GammaPrior {
  readonly shape: number;
  readonly exposure: number;
}

/**
 * The prior whose mean is the guaranteed rate.
 *
 * @param line guaranteed nonconformities per unit of exposure, above 0
 * @param weight how strongly the prior holds to the line, above 0
 * @throws OutOfDomain
 */
export function gammaPriorAt(line: number, weight = 1): GammaPrior {
  requirePositive('line', line);
  requirePositive('weight', weight);
  return { shape: weight, exposure: weight / line };
}

/**
 * ln of the evidence that a line keeps a guaranteed rate of nonconformities: an e-process for every
 * stream whose rate is at or above the line. Demonstrated when it reaches ln(1 / tail).
 *
 * @param count nonconformities since the run began, whole, 0 or more
 * @param exposure units, metres or hours they were counted in, 0 or more
 * @param line tested rate per unit of exposure, above 0
 * @param prior fixed before the run began
 * @returns any real number; absolute error about 2e-14, or 1e-15 of the value where that is more
 * @throws OutOfDomain; NoConvergence
 * @coverage at all looks: the chance that it ever reaches ln(1 / tail) with the rate at or above the line is at most tail
 * @source gamma-Poisson mixture, S. R. Howard and others 2021 (opening read); one-sided ratio of kernels: own derivation
 */
export function logRateEvidenceDemonstrated(count: number, exposure: number, line: number, prior: GammaPrior): number {
  requireRateRun(count, exposure, prior);
  requirePositive('line', line);
  return logRateEvidenceBelow(count, exposure, line, prior);
}

/**
 * ln of the evidence that a line breaks a guaranteed rate: the mirror of `logRateEvidenceDemonstrated`,
 * for rates at or below the line. Arguments and errors likewise.
 *
 * @coverage at all looks, as `logRateEvidenceDemonstrated`
 * @source as `logRateEvidenceDemonstrated`
 */
export function logRateEvidenceViolated(count: number, exposure: number, line: number, prior: GammaPrior): number {
  requireRateRun(count, exposure, prior);
  requirePositive('line', line);
  return logRateEvidenceAbove(count, exposure, line, prior);
}

/** `logRateEvidenceDemonstrated` for checked arguments. */
export function logRateEvidenceBelow(count: number, exposure: number, line: number, prior: GammaPrior): number {
  const { shape } = prior;
  return logGammaBelow(shape + count, (prior.exposure + exposure) * line) - logGammaBelow(shape, prior.exposure * line);
}

/** `logRateEvidenceViolated` for checked arguments. */
export function logRateEvidenceAbove(count: number, exposure: number, line: number, prior: GammaPrior): number {
  const { shape } = prior;
  return logGammaAbove(shape + count, (prior.exposure + exposure) * line) - logGammaAbove(shape, prior.exposure * line);
}

/** @throws OutOfDomain unless the count is whole, 0 or more, the exposure 0 or more, and the prior positive */
export function requireRateRun(count: number, exposure: number, prior: GammaPrior): void {
  requireWhole('count', count, 0);
  if (exposure !== 0) requirePositive('exposure', exposure);
  requirePositive('prior shape', prior.shape);
  requirePositive('prior exposure', prior.exposure);
}
