import { devianceTerm, stirlingError } from './stirling.ts';

/*
 * The beta density in ln(p/q), p^a q^b / B(a, b), as exp(peak - deviance): the peak depends on the
 * shape alone, the deviance is the distance of p from a/(a + b). No large numbers are subtracted.
 * Source: saddle-point form of C. Loader 2000 (memory), here for the beta density.
 */

/** ln of the density at p = a/(a + b), for a and b above 0. */
export function lnLogitPeak(a: number, b: number): number {
  const total = a + b;
  const spread = 0.5 * Math.log((a / (2 * Math.PI)) * (b / total));
  return spread + stirlingError(total) - stirlingError(a) - stirlingError(b);
}

/** How far ln density lies below its peak; excess = a - (a + b) p, given because only the caller can keep its digits. */
export function deviance(total: number, p: number, q: number, excess: number): number {
  const expected = total * p;
  const complement = total * q;
  return expected * devianceTerm(excess / expected) + complement * devianceTerm(-excess / complement);
}
