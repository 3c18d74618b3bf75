import type { Tail } from '../units.ts';
import { mostMeasurements, requireFinite } from './mean.ts';
import { OutOfDomain, requireInside, requireWhole } from './out-of-domain.ts';

/** What is known of measurements that cannot leave a range. */
export interface BoundedSample {
  /** whole, 2 to 1e12 */
  readonly n: number;
  /** average, in [from, to] */
  readonly mean: number;
  /** sample standard deviation (n - 1), 0 or more */
  readonly sd: number;
  /** smallest value the measurement can take, finite */
  readonly from: number;
  /** largest value it can take, finite, above from */
  readonly to: number;
}

/**
 * Lower bound on the mean of measurements that cannot leave [from, to], whatever their distribution.
 * Two bounds are computed at half the tail each, and the better one holds: that of Hoeffding, good when
 * the mean is near an end, and the empirical Bernstein bound, good when the spread is small against the range.
 *
 * @param tail above 0, below 1
 * @returns in [from, mean]
 * @throws OutOfDomain naming the argument
 * @coverage at least 1 - tail at one look fixed in advance, for independent measurements with one mean
 * @source W. Hoeffding, J. Amer. Statist. Assoc. 58 (1963), formula (2.1); A. Maurer, M. Pontil, COLT 2009,
 *   theorem 4 (both from memory); joined by the union bound
 */
export function boundedMeanLower(sample: BoundedSample, tail: Tail): number {
  requireBounded(sample, tail);
  const { share, wanted, bernstein } = partsOf(sample, tail);
  return sample.from + (sample.to - sample.from) * Math.max(hoeffdingLower(share, wanted), bernstein);
}

/**
 * Whether the lower bound of `boundedMeanLower` stands at or above a line, without searching for the bound: what a
 * record path asks. Arguments, errors, coverage and source as there.
 *
 * @param line any number: up to `from` it is always reached, from `to` on never
 */
export function boundedMeanReaches(sample: BoundedSample, line: number, tail: Tail): boolean {
  requireBounded(sample, tail);
  const { from, to } = sample;
  if (line <= from) return true;
  if (!(line < to)) return false;
  const { share, wanted, bernstein } = partsOf(sample, tail);
  const wantedShare = (line - from) / (to - from);
  return bernstein >= wantedShare || (share > wantedShare && divergence(share, wantedShare) >= wanted);
}

/** Both bounds on a range of width 1: that of Hoeffding as the divergence it asks for. */
function partsOf({ n, mean, sd, from, to }: BoundedSample, tail: number): { share: number; wanted: number; bernstein: number } {
  const width = to - from;
  const share = (mean - from) / width;
  const logPart = Math.log(2 / tail);
  const spread = sd / width;
  const bernstein = share - spread * Math.sqrt((2 * (logPart + Math.LN2)) / n) - (7 * (logPart + Math.LN2)) / (3 * (n - 1));
  return { share, wanted: logPart / n, bernstein };
}

/** Upper bound, the mirror image; arguments, errors, coverage and source as of `boundedMeanLower`. */
export function boundedMeanUpper(sample: BoundedSample, tail: Tail): number {
  const { n, mean, sd, from, to } = sample;
  return -boundedMeanLower({ n, mean: -mean, sd, from: -to, to: -from }, tail);
}

/** Relative entropy of the shares x against m, for x >= m. */
function divergence(x: number, m: number): number {
  const upper = x === 1 ? 0 : (1 - x) * Math.log((1 - x) / (1 - m));
  return x * Math.log(x / m) + upper;
}

/** The largest m below the share at which the divergence is still at least `wanted`; on the safe side of rounding. */
function hoeffdingLower(share: number, wanted: number): number {
  if (share === 0) return 0;
  let low = 0;
  let high = share;
  for (let middle = 0.5 * high; middle > low && middle < high; middle = 0.5 * (low + high)) {
    if (divergence(share, middle) >= wanted) low = middle;
    else high = middle;
    if (high - low < 1e-15 * share) break;
  }
  return low;
}

function requireBounded(sample: BoundedSample, tail: number): void {
  const { n, mean, sd, from, to } = sample;
  requireWhole('n', n, 2, mostMeasurements);
  requireFinite('from', from);
  if (!(to > from && to - from < Infinity)) throw new OutOfDomain('to', to, `a finite number above ${from}`);
  if (!(mean >= from && mean <= to)) throw new OutOfDomain('mean', mean, `a number from ${from} to ${to}`);
  if (!(sd >= 0 && sd <= to - from)) throw new OutOfDomain('sd', sd, `a number from 0 to ${to - from}`);
  requireInside('tail', tail);
}
