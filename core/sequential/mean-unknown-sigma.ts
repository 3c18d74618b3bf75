import { OutOfDomain, requireInside, requirePositive, requireWhole } from '../bound/out-of-domain.ts';
import { lnLogitPeak } from '../numerics/beta-density.ts';
import type { Tail } from '../units.ts';
import { logBetaBelow } from './beta-kernel.ts';
import { crossingPoint } from './crossing-point.ts';

/** Tunes the evidence for about 30 to 100 measurements. */
export const usualTuning = 5;

/**
 * ln of the evidence that the mean of Gaussian measurements is above a line, the standard deviation
 * unknown. For 'below', give -excess.
 *
 * @param measurements since the run began, whole, 1 or more
 * @param excess average minus line, any real number
 * @param squares sum of squared deviations from the average, 0 or more; exactly 0 (no spread seen) proves nothing
 * @param tuning in measurements, above 0
 * @returns any real number; absolute error about 1e-14, or 1e-15 of the value where that is more
 * @throws OutOfDomain; NoConvergence
 * @coverage at all looks for Gaussian measurements; NOT for measurements skewed against the bound: with an exponential
 *   tail on the bad side 15 % of runs are missed at a tail of 5 %, still 10 % with `skewAgainstBound` asked at every look.
 *   Where such tails are expected use the evidence of a bounded measurement
 * @source own one-sided truncation of the t e-process of H. Wang, A. Ramdas, arXiv 2310.03722 (abstract read);
 *   the kernel by own derivation: (1 + t^2/n)^(n/2) P(T_n <= t) is an incomplete beta kernel
 */
export function logMeanEvidenceUnknownSigma(measurements: number, excess: number, squares: number, tuning: number): number {
  requireSums(measurements, squares, tuning);
  if (!Number.isFinite(excess)) throw new OutOfDomain('excess', excess, 'a finite number');
  const n = measurements;
  const within = (n + tuning) * squares + n * tuning * excess * excess;
  const square = squares > 0 ? (excess * excess * n * n * n) / within : 0;
  return base(n, tuning) + logStudentMixture(Math.sign(excess), square, n);
}

/**
 * Distance between the average of a run and the bound on its mean, at all looks, for Gaussian
 * measurements of unknown spread: lower bound = average - this, upper bound = average + this.
 *
 * @param measurements whole, 1 or more
 * @param squares sum of squared deviations from the average, 0 or more; with 0 (no spread seen) there is no bound
 * @param tail all of alpha in one tail, above 0, below 1
 * @param tuning in measurements, above 0
 * @returns in the unit of the measurements; Infinity while so few measurements bound nothing
 * @throws OutOfDomain; NoConvergence
 * @coverage as `logMeanEvidenceUnknownSigma`
 * @source inversion of `logMeanEvidenceUnknownSigma`
 */
export function allLooksMeanDistanceUnknownSigma(measurements: number, squares: number, tail: Tail, tuning: number): number {
  requireSums(measurements, squares, tuning);
  requireInside('tail', tail);
  const n = measurements;
  const enough = -Math.log(tail) - base(n, tuning);
  const most = (n * n) / tuning;
  if (squares === 0 || !(logStudentMixture(1, most, n) > enough)) return Infinity;
  const t = crossingPoint((u) => logStudentMixture(Math.sign(u), u * u, n) - enough, Math.sqrt(2 * Math.max(enough, 0)));
  return t * Math.sqrt(((n + tuning) * squares) / Math.max(0, n * n * n - n * tuning * t * t));
}

function base(n: number, tuning: number): number {
  return Math.LN2 - 0.5 * Math.log1p(n / tuning);
}

/** ln[(1 + t^2/n)^(n/2) P(T_n <= t)] from the square of t and its sign. */
function logStudentMixture(sign: number, square: number, n: number): number {
  if (!(square > 0)) return -Math.LN2;
  const p = n / (n + square);
  const q = square / (n + square);
  const scaledTail = logBetaBelow(n / 2, 0.5, p, q) + 0.5 * Math.log(q) - logBetaWithHalf(n / 2) - Math.LN2;
  if (sign < 0) return scaledTail;
  const grown = (n / 2) * Math.log1p(square / n);
  return grown + Math.log1p(-Math.exp(scaledTail - grown));
}

/** ln B(a, 1/2). */
function logBetaWithHalf(a: number): number {
  return -a * Math.log1p(0.5 / a) - 0.5 * Math.log1p(2 * a) - lnLogitPeak(a, 0.5);
}

function requireSums(measurements: number, squares: number, tuning: number): void {
  requireWhole('measurements', measurements, 1);
  requirePositive('tuning', tuning);
  if (!(squares >= 0 && squares < Infinity)) throw new OutOfDomain('squares', squares, 'a finite number, 0 or more');
}
