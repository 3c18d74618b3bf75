import { OutOfDomain, requireInside, requirePositive, requireWhole } from '../bound/out-of-domain.ts';
import { logBetaAbove, logBetaBelow } from './beta-kernel.ts';

/** Where the evidence expects the rate before the run: a beta distribution, both parameters above 0. */
export interface BetaPrior {
  readonly a: number;
  readonly b: number;
}

/**
 * The prior whose mean is the guarantee line. Weight 1 is the default: it demonstrates soonest on a
 * well line without giving much away on others.
 *
 * @param line the guaranteed nonconforming fraction, above 0, below 1
 * @param weight how strongly the prior holds to the line, above 0
 * @throws OutOfDomain
 */
export function betaPriorAt(line: number, weight = 1): BetaPrior {
  requireInside('line', line);
  requirePositive('weight', weight);
  return { a: weight, b: (weight * (1 - line)) / line };
}

/**
 * ln of the evidence that a line keeps a guaranteed nonconforming fraction: an e-process, never
 * expected to exceed 1 while the rate is at or above the line, whatever else it does. The guarantee
 * is demonstrated when it reaches ln(1 / tail).
 *
 * @param nonconforming whole, 0 to units
 * @param units units judged since the run began, whole, 0 or more; up to 1e9 in full precision
 * @param line tested fraction, above 0, below 1
 * @param prior fixed before the run began
 * @returns any real number; absolute error about 2e-14, or 1e-15 of the value where that is more
 * @throws OutOfDomain; NoConvergence
 * @coverage at all looks: the chance that it ever reaches ln(1 / tail) with the rate at or above the line is at most tail
 * @source mixture method, H. Robbins 1970 (memory), one-sided; ratio of kernels: own derivation
 */
export function logEvidenceDemonstrated(nonconforming: number, units: number, line: number, prior: BetaPrior): number {
  requireRun(nonconforming, units, line, prior);
  return logEvidenceBelow(nonconforming, units, { p: line, q: 1 - line }, prior);
}

/**
 * ln of the evidence that a line breaks a guaranteed nonconforming fraction: the mirror of
 * `logEvidenceDemonstrated`, for rates at or below the line. Arguments and errors likewise.
 *
 * @coverage at all looks, as `logEvidenceDemonstrated`
 * @source as `logEvidenceDemonstrated`
 */
export function logEvidenceViolated(nonconforming: number, units: number, line: number, prior: BetaPrior): number {
  requireRun(nonconforming, units, line, prior);
  return logEvidenceAbove(nonconforming, units, { p: line, q: 1 - line }, prior);
}

/** A tested fraction with its complement, both in full precision. */
export interface Split {
  readonly p: number;
  readonly q: number;
}

/** `logEvidenceDemonstrated` for checked arguments; units may be a real number. */
export function logEvidenceBelow(nonconforming: number, units: number, { p, q }: Split, { a, b }: BetaPrior): number {
  return logBetaBelow(a + nonconforming, b + (units - nonconforming), p, q) - logBetaBelow(a, b, p, q);
}

/** `logEvidenceViolated` for checked arguments; units may be a real number. */
export function logEvidenceAbove(nonconforming: number, units: number, { p, q }: Split, { a, b }: BetaPrior): number {
  return logBetaAbove(a + nonconforming, b + (units - nonconforming), p, q) - logBetaAbove(a, b, p, q);
}

/** @throws OutOfDomain unless 0 <= nonconforming <= units, 0 < line < 1 and both prior parameters are above 0 */
export function requireRun(nonconforming: number, units: number, line: number, prior: BetaPrior): void {
  requireInside('line', line);
  requireCounts(nonconforming, units);
  requirePrior(prior);
}

/** @throws OutOfDomain unless both are whole and 0 <= nonconforming <= units */
export function requireCounts(nonconforming: number, units: number): void {
  requireWhole('units', units, 0);
  requireWhole('nonconforming', nonconforming, 0);
  if (nonconforming > units) throw new OutOfDomain('nonconforming', nonconforming, `at most the ${units} units`);
}

/** @throws OutOfDomain unless both parameters are finite and above 0 */
export function requirePrior(prior: BetaPrior): void {
  requirePositive('prior a', prior.a);
  requirePositive('prior b', prior.b);
}
