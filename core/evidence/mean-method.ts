import { boundedMeanLower, boundedMeanReaches, boundedMeanUpper } from '../bound/bounded-mean.ts';
import { meanLower, meanLowerKnownSigma, meanUpper, meanUpperKnownSigma } from '../bound/mean.ts';
import { normalQuantileOfTail } from '../numerics/normal.ts';
import { tQuantileOfTail } from '../numerics/student-t.ts';
import type { Tail } from '../units.ts';
import { CriticalValue } from './critical-value.ts';
import type { ValueRange } from './measured-sum.ts';

/** What a window says of its mean. */
export interface MeanSample {
  readonly n: number;
  readonly mean: number;
  readonly sd: number;
}

/** On which side of a line all that is believed of the mean stands: above by a lower bound, below by an upper one. */
export type Side = 'above' | 'below';

/** One way of bounding a mean. */
export interface MeanMethod {
  /** Whether even the best n values could not put the bound on the side of the line. */
  gathers(n: number, side: Side, line: number): boolean;
  /** The lower bound for 'above', the upper one for 'below'. */
  bound(side: Side, sample: MeanSample, tail: Tail): number;
  /** Whether that bound stands on that side of the line, or on it; what the record path asks. */
  stands(side: Side, sample: MeanSample, line: number, tail: Tail): boolean;
}

/**
 * Values of unknown spread that are gathered before the t bound is used. It is exact from two normal values on; but in
 * fewer than these neither a coarse scale nor skewness shows.
 */
const fewestOfUnknownSpread = 8;

/** @param fewest values gathered; a window that holds fewer is used from when it is full, with two values at least */
export function studentMean(windowValues: number | undefined): MeanMethod {
  const fewest = Math.max(2, Math.min(fewestOfUnknownSpread, windowValues ?? Infinity));
  const quantiles = byTail((tail) => (n) => tQuantileOfTail(tail, n - 1));
  return {
    gathers: (n) => n < fewest,
    bound: (side, { n, mean, sd }, tail) => (side === 'above' ? meanLower : meanUpper)(n, mean, sd, tail),
    stands: (side, { n, mean, sd }, line, tail) => quantiles(tail).reachedBy((roomOf(side, mean, line) * Math.sqrt(n)) / sd, n),
  };
}

export function knownSigmaMean(sigma: number): MeanMethod {
  const quantiles = byTail((tail) => () => normalQuantileOfTail(tail));
  return {
    gathers: (n) => n < 1,
    bound: (side, { n, mean }, tail) => (side === 'above' ? meanLowerKnownSigma : meanUpperKnownSigma)(n, mean, sigma, tail),
    stands: (side, { n, mean }, line, tail) => quantiles(tail).reachedBy((roomOf(side, mean, line) * Math.sqrt(n)) / sigma, n),
  };
}

/** @param tail of the guarantee's bound: it says how many values at the best end of the range are enough */
export function boundedMean({ from, to }: ValueRange, tail: Tail): MeanMethod {
  // Values at an end of the range may have a mean that rounding puts beyond it.
  const inside = (mean: number): number => Math.min(to, Math.max(from, mean));
  const bound = (side: Side, { n, mean, sd }: MeanSample, level: Tail): number =>
    (side === 'above' ? boundedMeanLower : boundedMeanUpper)({ n, mean: inside(mean), sd, from, to }, level);
  const stands = (side: Side, { n, mean, sd }: MeanSample, line: number, level: Tail): boolean =>
    side === 'above'
      ? boundedMeanReaches({ n, mean: inside(mean), sd, from, to }, line, level)
      : boundedMeanReaches({ n, mean: -inside(mean), sd, from: -to, to: -from }, -line, level);
  let enough = Infinity;
  return {
    bound,
    stands,
    gathers: (n, side, line) => {
      if (n >= enough) return false;
      if (n < 2 || !stands(side, { n, mean: side === 'above' ? to : from, sd: 0 }, line, tail)) return true;
      enough = n;
      return false;
    },
  };
}

function roomOf(side: Side, value: number, line: number): number {
  return side === 'above' ? value - line : line - value;
}

/** One critical value for each level that is asked for: the guarantee's and the violation rule's. */
function byTail(of: (tail: Tail) => (n: number) => number): (tail: Tail) => CriticalValue {
  const known = new Map<Tail, CriticalValue>();
  return (tail) => {
    const found = known.get(tail) ?? new CriticalValue(of(tail));
    known.set(tail, found);
    return found;
  };
}
