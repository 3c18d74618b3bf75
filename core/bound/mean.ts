import { normalQuantileOfTail } from '../numerics/normal.ts';
import { tQuantileOfTail } from '../numerics/student-t.ts';
import type { Tail } from '../units.ts';
import { OutOfDomain, requireInside, requirePositive, requireWhole } from './out-of-domain.ts';

/** Sizes of samples beyond which no t quantile is vouched for. */
export const mostMeasurements = 1e12;

/**
 * Lower bound on the mean of a measurement: the smallest true mean at which an average this high would
 * still happen with probability `tail`, sigma unknown.
 *
 * @param n    measurements, whole, 2 to 1e12
 * @param mean their average, finite, in the unit of measure
 * @param sd   their sample standard deviation (n - 1), 0 or more, same unit
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns at or below the mean for tails up to 1/2; -Infinity where it is below every double
 * @throws OutOfDomain naming the argument
 * @coverage exactly 1 - tail at one look fixed in advance, for independent measurements of a normal distribution;
 *   about that for other distributions when n is large; too low when the distribution is skewed against the bound
 * @source W. S. Gosset ('Student'), Biometrika 6 (1908) 1-25 (memory): mean - t(tail; n - 1) sd / sqrt(n)
 */
export function meanLower(n: number, mean: number, sd: number, tail: Tail): number {
  return mean - tMargin(n, mean, sd, tail);
}

/** Upper bound on the mean; arguments, errors, coverage and source as of `meanLower`. */
export function meanUpper(n: number, mean: number, sd: number, tail: Tail): number {
  return mean + tMargin(n, mean, sd, tail);
}

/**
 * Lower bound on the mean when the standard deviation is known and not taken from these measurements.
 * Whoever shows it must show where sigma is known from.
 *
 * @param n     measurements, whole, 1 to 1e12
 * @param mean  their average, finite
 * @param sigma the known standard deviation of one measurement, above 0, same unit
 * @param tail  above 0, below 1
 * @returns at or below the mean for tails up to 1/2
 * @throws OutOfDomain naming the argument
 * @coverage 1 - tail at one look fixed in advance, if sigma is right and the average normal
 * @source normal distribution of an average: mean - z(tail) sigma / sqrt(n)
 */
export function meanLowerKnownSigma(n: number, mean: number, sigma: number, tail: Tail): number {
  return mean - zMargin(n, mean, sigma, tail);
}

/** Upper bound on the mean with sigma known; arguments, errors, coverage and source as of `meanLowerKnownSigma`. */
export function meanUpperKnownSigma(n: number, mean: number, sigma: number, tail: Tail): number {
  return mean + zMargin(n, mean, sigma, tail);
}

function tMargin(n: number, mean: number, sd: number, tail: number): number {
  requireWhole('n', n, 2, mostMeasurements);
  requireFinite('mean', mean);
  if (!(sd >= 0 && sd < Infinity)) throw new OutOfDomain('sd', sd, 'a finite number, 0 or more');
  requireInside('tail', tail);
  return sd === 0 ? 0 : tQuantileOfTail(tail, n - 1) * (sd / Math.sqrt(n));
}

function zMargin(n: number, mean: number, sigma: number, tail: number): number {
  requireWhole('n', n, 1, mostMeasurements);
  requireFinite('mean', mean);
  requirePositive('sigma', sigma);
  requireInside('tail', tail);
  return normalQuantileOfTail(tail) * (sigma / Math.sqrt(n));
}

/** @throws OutOfDomain unless the value is a finite number */
export function requireFinite(argument: string, value: number): void {
  if (!Number.isFinite(value)) throw new OutOfDomain(argument, value, 'a finite number');
}
