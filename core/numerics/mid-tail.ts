import { deviance, lnLogitPeak } from './beta-density.ts';
import { leadingOdds, oddsStart } from './beta-quantile.ts';
import { betaTailRatio } from './beta-tail.ts';
import { gammaLowerStart, gammaUpperStart, leadingPower } from './gamma-start.ts';
import { gammaLowerRatio, gammaUpperRatio, lnGammaDensity } from './gamma-tail.ts';
import { rootOfTail, writePoint, type TailPoint } from './tail-root.ts';

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
  const lnTail = Math.log(tail);
  const leading = leadingOdds(miss, x + 1, lnTail + Math.LN2, peak);
  if (leading !== undefined) return leading;
  const curve = (odds: number, point: TailPoint): void => {
    const p = 1 / (1 + odds);
    const q = odds * p;
    const excess = q < p ? miss - (n + 1) * q : (n + 1) * p - (x + 1);
    const density = peak - deviance(n + 1, q, p, excess);
    const spread = (n + 1) * p * q;
    write(point, density, betaTailRatio(miss, x + 1, q, p), {
      half: 0.5 / (miss * p), share: (x * q) / (miss * p), d1: excess, apart: 1, d2: -spread, d3: -spread * (p - q), sign: 1,
    });
  };
  return rootOfTail(curve, lnTail, oddsStart(miss + 0.5, x + 0.5, lnTail));
}

/** Mean at which P(X < x) + P(X = x)/2 = tail for a Poisson count, 1 or more; the rest as above. */
export function midPoissonAbove(x: number, tail: number): number {
  const curve = (mean: number, point: TailPoint): void => {
    write(point, lnGammaDensity(x + 1, mean), gammaUpperRatio(x + 1, mean), {
      half: 0.5 / mean, share: x / mean, d1: x + 1 - mean, apart: -1, d2: -mean, d3: -mean, sign: -1,
    });
  };
  const lnTail = Math.log(tail);
  return rootOfTail(curve, lnTail, gammaUpperStart(x + 0.5, lnTail));
}

/** Mean at which P(X > x) + P(X = x)/2 = tail for a Poisson count, 1 or more; the rest as above. */
export function midPoissonBelow(x: number, tail: number): number {
  const lnTail = Math.log(tail);
  if (lnTail < -30 * x) {
    const leading = leadingPower(x, lnTail + Math.LN2);
    if (leading < 1e-17) return leading;
  }
  const curve = (mean: number, point: TailPoint): void => {
    write(point, lnGammaDensity(x, mean), gammaLowerRatio(x, mean), {
      half: 0.5 / x, share: mean / x, d1: x - mean, apart: 1, d2: -mean, d3: -mean, sign: 1,
    });
  };
  return rootOfTail(curve, lnTail, gammaLowerStart(x + 0.5, lnTail));
}

interface MidTerms {
  /** half the chance of x, over the density */
  readonly half: number;
  /** density of the neighbouring tail over the density of this one */
  readonly share: number;
  /** derivatives of ln(density) of this tail; the neighbour's first one is `apart` larger, the others are the same */
  readonly d1: number;
  readonly d2: number;
  readonly d3: number;
  readonly apart: 1 | -1;
  readonly sign: 1 | -1;
}

/** The mean of two densities, of which the neighbour has the weight share/(1 + share). */
function write(point: TailPoint, lnDensity: number, ratio: number, terms: MidTerms): void {
  const { half, share, d1, d2, d3, apart, sign } = terms;
  const tail = ratio - half;
  const weight = share / (1 + share);
  const mixed = weight * (1 - weight);
  const slope = (sign * 0.5 * (1 + share)) / tail;
  writePoint(point, lnDensity + Math.log(tail), slope, d1 + apart * weight, d2 + mixed, d3 + apart * mixed * (1 - 2 * weight));
}
