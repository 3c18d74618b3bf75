import { stirlingError } from './stirling.ts';

/**
 * How far the relative spread w = s/sigma stands from 1, as an exponent: (w^2 - 1)/2 - ln w.
 * The density of u = ln w is exp(logSpreadDensity(df) - df * spreadExponent(u, w)).
 *
 * @param u ln w
 * @param w exp(u), which the caller has already
 * @returns 0 or more; relative error below 1e-15, also around 0 where the plain form loses its digits
 * @source own derivation: sum over j >= 2 of 2^(j-1) u^j / j!
 */
export function spreadExponent(u: number, w: number): number {
  if (u > 0.3 || u < -0.3) return 0.5 * (w - 1) * (w + 1) - u;
  const x = 2 * u;
  const far = 1 + (x / 9) * (1 + (x / 10) * (1 + (x / 11) * (1 + (x / 12) * (1 + (x / 13) * (1 + x / 14)))));
  const near = (x / 5) * (1 + (x / 6) * (1 + (x / 7) * (1 + (x / 8) * far)));
  return u * u * (1 + (x / 3) * (1 + (x / 4) * (1 + near)));
}

/**
 * ln of the density of u = ln(s/sigma) at u = 0, where it is highest.
 *
 * @param df degrees of freedom, above 0
 * @source density of chi-square/df in logarithmic scale; Stirling's formula with its error kept
 */
export function logSpreadDensity(df: number): number {
  const a = df / 2;
  return Math.LN2 + 0.5 * Math.log(a / (2 * Math.PI)) - stirlingError(a);
}
