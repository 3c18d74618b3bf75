import { devianceTerm, stirlingError } from './stirling.ts';

/*
 * The beta density in ln(p/q), p^a q^b / B(a, b), as exp(peak - deviance): the peak depends on the
 * shape alone, the deviance is the distance of p from a/(a + b). No large numbers are subtracted.
 * Source: saddle-point form of C. Loader 2000 (memory), here for the beta density.
 */

/** ln of the density at p = a/(a + b), for a and b above 0. */
export function lnLogitPeak(a: number, b: number): number {
  return Math.log(gaussianPeak(a, b)) + stirlingGap(a, b);
}

/** The density there as if it were Gaussian: sqrt(a b/(2 pi (a + b))). */
export function gaussianPeak(a: number, b: number): number {
  return Math.sqrt((a / (2 * Math.PI)) * (b / (a + b)));
}

/** ln of what the Gaussian peak is wrong by. */
export function stirlingGap(a: number, b: number): number {
  return stirlingError(a + b) - stirlingError(a) - stirlingError(b);
}

/** How far ln density lies below its peak; excess = a - (a + b) p, given because only the caller can keep its digits. */
export function deviance(total: number, p: number, q: number, excess: number): number {
  const expected = total * p;
  const complement = total * q;
  return expected * devianceTerm(excess / expected) + complement * devianceTerm(-excess / complement);
}
