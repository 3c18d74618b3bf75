import { deviance, lnLogitPeak } from '../numerics/beta-density.ts';
import { betaTailRatio } from '../numerics/beta-tail.ts';
import { excessOf } from '../numerics/exact-residual.ts';

/**
 * ln of the integral of t^(a-1) (1-t)^(b-1) from 0 to p, over p^a q^b. The powers and gamma
 * functions of an evidence ratio cancel in this form, so nothing is lost at a billion units.
 *
 * @param a above 0
 * @param b above 0
 * @param p above 0, below 1
 * @param q its complement 1 - p, given because neither can be had from the other when small
 * @returns any real number; absolute error about 1e-14, or 1e-16 of the value where that is more
 * @throws NoConvergence
 * @source own derivation; DLMF 8.17.7
 */
export function logBetaBelow(a: number, b: number, p: number, q: number): number {
  if (p * b < q * a) return Math.log(betaTailRatio(a, b, p, q));
  const whole = logBetaWhole(a, b, p, q);
  return whole + Math.log1p(-Math.exp(Math.log(betaTailRatio(b, a, q, p)) - whole));
}

/** The same from p to 1: the mirror of `logBetaBelow`. */
export function logBetaAbove(a: number, b: number, p: number, q: number): number {
  return logBetaBelow(b, a, q, p);
}

/** The same from 0 to 1: one over the density in ln(p/q). */
function logBetaWhole(a: number, b: number, p: number, q: number): number {
  const total = a + b;
  const excess = p < q ? excessOf(a, total, p) : -excessOf(b, total, q);
  return deviance(total, p, q, excess) - lnLogitPeak(a, b);
}
