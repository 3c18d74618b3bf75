import { deviance, lnLogitPeak } from './beta-density.ts';
import { leadingOdds, oddsStart } from './beta-quantile.ts';
import { betaTailRatio } from './beta-tail.ts';
import { gammaLowerStart, gammaUpperStart, leadingPower } from './gamma-start.ts';
import { gammaLowerRatio, gammaUpperRatio, lnGammaDensity } from './gamma-tail.ts';
import { rootOfTail, type TailPoint } from './tail-root.ts';

/*
 * The mid tail counts the observed value half: P(X < x) + P(X = x)/2. With g the density that belongs
 * to P(X <= x) it is g (ratio - half), and its slope is the mean of the slopes of P(X <= x) and P(X < x).
 */

/**
 * Odds (1 - p)/p at which P(X < x) + P(X = x)/2 = tail for X binomial(n, p).
 *
 * @param x whole, 1 to n - 1
 * @param tail above 0, at most 1/2
 * @throws NoConvergence
 * @source own derivation
 */
export function midBinomialOdds(x: number, n: number, tail: number): number {
  const miss = n - x;
  const peak = lnLogitPeak(miss, x + 1);
  const leading = leadingOdds(miss, x + 1, Math.log(tail) + Math.LN2, peak);
  if (leading !== undefined) return leading;
  const curve = (odds: number, point: TailPoint): void => {
    const p = 1 / (1 + odds);
    const q = odds * p;
    const excess = q < p ? miss - (n + 1) * q : (n + 1) * p - (x + 1);
    const density = peak - deviance(n + 1, q, p, excess);
    write(point, density, betaTailRatio(miss, x + 1, q, p), {
      half: 0.5 / (miss * p), share: (x * q) / (miss * p), first: excess, second: excess + 1, sign: 1,
    });
  };
  return rootOfTail(curve, Math.log(tail), oddsStart(miss + 0.5, x + 0.5, tail));
}

/** Mean at which P(X < x) + P(X = x)/2 = tail for a Poisson count, 1 or more; the rest as above. */
export function midPoissonAbove(x: number, tail: number): number {
  const curve = (mean: number, point: TailPoint): void => {
    write(point, lnGammaDensity(x + 1, mean), gammaUpperRatio(x + 1, mean), {
      half: 0.5 / mean, share: x / mean, first: x + 1 - mean, second: x - mean, sign: -1,
    });
  };
  return rootOfTail(curve, Math.log(tail), gammaUpperStart(x + 0.5, tail));
}

/** Mean at which P(X > x) + P(X = x)/2 = tail for a Poisson count, 1 or more; the rest as above. */
export function midPoissonBelow(x: number, tail: number): number {
  if (Math.log(tail) < -30 * x) {
    const leading = leadingPower(x, 2 * tail);
    if (leading < 1e-17) return leading;
  }
  const curve = (mean: number, point: TailPoint): void => {
    write(point, lnGammaDensity(x, mean), gammaLowerRatio(x, mean), {
      half: 0.5 / x, share: mean / x, first: x - mean, second: x + 1 - mean, sign: 1,
    });
  };
  return rootOfTail(curve, Math.log(tail), gammaLowerStart(x + 0.5, tail));
}

interface MidTerms {
  /** half the chance of x, over the density */
  readonly half: number;
  /** slope of the neighbouring tail over the slope of this one */
  readonly share: number;
  /** d ln(slope) of this tail and of its neighbour */
  readonly first: number;
  readonly second: number;
  readonly sign: 1 | -1;
}

function write(point: TailPoint, lnDensity: number, ratio: number, terms: MidTerms): void {
  const { half, share, first, second, sign } = terms;
  const tail = ratio - half;
  point.lnTail = lnDensity + Math.log(tail);
  point.slope = (sign * 0.5 * (1 + share)) / tail;
  point.bend = (sign * 0.5 * (first + share * second)) / tail - point.slope * point.slope;
}
