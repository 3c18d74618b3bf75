import { OutOfDomain, requireInside, requirePositive, requireWhole } from '../bound/out-of-domain.ts';
import type { Tail } from '../units.ts';
import { crossingPoint } from './crossing-point.ts';
import { logGammaAbove } from './gamma-kernel.ts';

/**
 * ln of the evidence that the mean is above a line, with a known standard deviation (or one that
 * bounds the spread of every measurement in the sub-Gaussian sense). For 'below', give -sum.
 *
 * @param sum of (measurement - line) since the run began, any real number
 * @param spread measurements times sigma squared, above 0
 * @param tuning a spread too: where the bound is to be tightest, see `tuningFor`; above 0
 * @returns any real number; absolute error about 1e-14, or 1e-15 of the value where that is more
 * @throws OutOfDomain; NoConvergence
 * @coverage at all looks: the chance that it ever reaches ln(1 / tail) with the mean at or below the line is at most tail
 * @source half-normal mixture, S. R. Howard and others 2021 (library header read); own arrangement of its lower half
 */
export function logMeanEvidence(sum: number, spread: number, tuning: number): number {
  if (!Number.isFinite(sum)) throw new OutOfDomain('sum', sum, 'a finite number');
  requirePositive('spread', spread);
  requirePositive('tuning', tuning);
  return base(spread, tuning) + logHalfMixture(sum / Math.sqrt(spread + tuning));
}

/**
 * Distance between the average of a run and the bound on its mean, at all looks: lower bound =
 * average - this, upper bound = average + this.
 *
 * @param measurements whole, 1 or more
 * @param sigma known standard deviation, above 0
 * @param tail all of alpha in one tail, above 0, below 1
 * @param tuning see `tuningFor`, above 0
 * @returns in the unit of sigma, above 0
 * @throws OutOfDomain; NoConvergence
 * @coverage never below 1 - tail at all looks together
 * @source inversion of `logMeanEvidence`
 */
export function allLooksMeanDistance(measurements: number, sigma: number, tail: Tail, tuning: number): number {
  requireWhole('measurements', measurements, 1);
  requirePositive('sigma', sigma);
  requirePositive('tuning', tuning);
  requireInside('tail', tail);
  const spread = measurements * sigma * sigma;
  const enough = -Math.log(tail) - base(spread, tuning);
  const z = crossingPoint((u) => logHalfMixture(u) - enough, Math.sqrt(2 * Math.max(enough, 0)));
  return (z * Math.sqrt(spread + tuning)) / measurements;
}

/**
 * The tuning that makes the bound tightest around a number of measurements; it stays within a factor
 * of two for ten times fewer or more.
 *
 * @param measurements for which the bound is to be tightest, above 0
 * @param sigma known standard deviation, above 0
 * @param tail above 0, below 1/2
 * @throws OutOfDomain
 * @source S. R. Howard and others 2021 (library header read)
 */
export function tuningFor(measurements: number, sigma: number, tail: Tail): number {
  requirePositive('measurements', measurements);
  requirePositive('sigma', sigma);
  if (!(tail > 0 && tail < 0.5)) throw new OutOfDomain('tail', tail, 'a number above 0 and below 1/2');
  const l = -Math.log(2 * tail);
  return (measurements * sigma * sigma) / (2 * l + Math.log1p(2 * l));
}

function base(spread: number, tuning: number): number {
  return Math.LN2 - 0.5 * Math.log1p(spread / tuning);
}

/**
 * z^2/2 + ln P(Z <= z), the two never subtracted where they cancel: with t = z^2/2 the normal tail is
 * the upper gamma tail of shape 1/2 at t, halved.
 */
function logHalfMixture(z: number): number {
  const t = (z * z) / 2;
  if (t === 0) return -Math.LN2;
  const scaledTail = logGammaAbove(0.5, t) + 0.5 * Math.log(t / Math.PI) - Math.LN2;
  return z < 0 ? scaledTail : t + Math.log1p(-Math.exp(scaledTail - t));
}
