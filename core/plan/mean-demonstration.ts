import { requireFinite, mostMeasurements } from '../bound/mean.ts';
import { OutOfDomain, requireInside, requirePositive, requireWhole } from '../bound/out-of-domain.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import { noncentralTUpper } from '../numerics/noncentral-t.ts';
import { normalQuantileOfTail, normalTail } from '../numerics/normal.ts';
import { tQuantileOfTail } from '../numerics/student-t.ts';
import type { Fraction, Tail } from '../units.ts';
import type { MeanPromise } from './mean-margin.ts';

/** How a process really runs, as far as one supposes it in a plan. */
export interface SupposedProcess {
  readonly mean: number;
  /** standard deviation of one measurement, above 0 */
  readonly sigma: number;
  /** whether the bound will use this sigma (z) or the spread of the sample (t) */
  readonly sigmaKnown: boolean;
}

/**
 * The chance that n measurements demonstrate a promise about a mean: that the bound is on the good side.
 *
 * @param n    measurements, whole, 2 to 1e12 (1 with a known sigma)
 * @param tail of the bound, above 0, below 1
 * @returns 0 to 1; `tail` when the mean is on the line
 * @throws OutOfDomain naming the argument
 * @source power of the one-sided t test: upper tail of the noncentral t; with sigma known, of the normal distribution
 */
export function chanceOfMeanDemonstration(n: number, promise: MeanPromise, process: SupposedProcess, tail: Tail): Fraction {
  requireWhole('n', n, process.sigmaKnown ? 1 : 2, mostMeasurements);
  requireInside('tail', tail);
  const shift = effectOf(promise, process) * Math.sqrt(n);
  if (process.sigmaKnown) return normalTail(normalQuantileOfTail(tail) - shift) as Fraction;
  return Math.min(1, Math.exp(noncentralTUpper(tQuantileOfTail(tail, n - 1), n - 1, shift).logTail)) as Fraction;
}

/**
 * The fewest measurements that demonstrate a promise about a mean with at least this chance.
 *
 * @param chance wanted, above 0, below 1, e.g. 0.9
 * @returns whole; undefined when 1e12 measurements are not enough
 * @throws OutOfDomain naming the argument; also when the supposed mean is not on the good side of the line
 * @source as `chanceOfMeanDemonstration`, which rises with n
 */
export function meanDemonstrationUnits(promise: MeanPromise, process: SupposedProcess, tail: Tail, chance: number): number | undefined {
  requireInside('chance', chance);
  requireInside('tail', tail);
  const effect = effectOf(promise, process);
  if (effect <= 0) throw new OutOfDomain('mean', process.mean, `a mean on the good side of ${promise.line}`);
  const least = process.sigmaKnown ? 1 : 2;
  const guess = ((normalQuantileOfTail(tail) - normalQuantileOfTail(chance)) / effect) ** 2;
  const tooFew = (n: number): boolean => chanceOfMeanDemonstration(n, promise, process, tail) < chance;
  const last = lastWhere(tooFew, least, mostMeasurements, guess);
  return last === mostMeasurements ? undefined : last + 1;
}

/** Distance of the supposed mean from the line in standard deviations, positive on the good side. */
function effectOf(promise: MeanPromise, process: SupposedProcess): number {
  requireFinite('line', promise.line);
  requireFinite('mean', process.mean);
  requirePositive('sigma', process.sigma);
  return ((promise.side === 'at-least' ? 1 : -1) * (process.mean - promise.line)) / process.sigma;
}
