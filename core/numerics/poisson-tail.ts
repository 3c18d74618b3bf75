import { gammaLowerRatio, gammaUpperRatio, lnGammaDensity } from './gamma-tail.ts';

/**
 * ln P(X <= x) for a Poisson count.
 *
 * @param x whole; below 0 the answer is -Infinity
 * @param mean above 0
 * @source DLMF 8.4.10: P(X < a) = Gamma(a, mean)/Gamma(a)
 */
export function lnPoissonLower(x: number, mean: number): number {
  if (x < 0) return -Infinity;
  if (x === 0) return -mean;
  return mean < x + 1 ? Math.log1p(-Math.exp(lnAtLeast(x + 1, mean))) : lnBelow(x + 1, mean);
}

/** ln P(X >= x); from 0 down the answer is 0. Source as of `lnPoissonLower`. */
export function lnPoissonUpper(x: number, mean: number): number {
  if (x <= 0) return 0;
  return mean > x ? Math.log1p(-Math.exp(lnBelow(x, mean))) : lnAtLeast(x, mean);
}

function lnBelow(a: number, mean: number): number {
  return lnGammaDensity(a, mean) + Math.log(gammaUpperRatio(a, mean));
}

function lnAtLeast(a: number, mean: number): number {
  return lnGammaDensity(a, mean) + Math.log(gammaLowerRatio(a, mean));
}
