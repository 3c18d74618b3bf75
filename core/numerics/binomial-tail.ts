import { deviance, lnLogitPeak } from './beta-density.ts';
import { betaTailRatio } from './beta-tail.ts';
import { excessOf } from './exact-residual.ts';

/**
 * ln P(X <= x) for X binomial(n, p).
 *
 * @param x whole; below 0 the answer is -Infinity, from n up it is 0
 * @param n whole, 1 or more
 * @param p above 0, below 1
 * @returns 0 or less; error of the probability about 1e-13 relative, on either side of 1/2
 * @source DLMF 8.17.5: P(X >= a) = I_p(a, n - a + 1)
 */
export function lnBinomialLower(x: number, n: number, p: number): number {
  if (x < 0) return -Infinity;
  if (x >= n) return 0;
  return x + 1 > (n + 1) * p ? Math.log1p(-Math.exp(lnAtLeast(x + 1, n, p))) : lnAtMost(x, n, p);
}

/** ln P(X >= x); ranges and source as of `lnBinomialLower`. */
export function lnBinomialUpper(x: number, n: number, p: number): number {
  if (x <= 0) return 0;
  if (x > n) return -Infinity;
  return x < (n + 1) * p ? Math.log1p(-Math.exp(lnAtMost(x - 1, n, p))) : lnAtLeast(x, n, p);
}

function lnAtLeast(a: number, n: number, p: number): number {
  const b = n - a + 1;
  if (b === 1) return n * Math.log(p);
  const total = n + 1;
  const q = 1 - p;
  const density = lnLogitPeak(a, b) - deviance(total, p, q, excessOf(a, total, p));
  return density + Math.log(betaTailRatio(a, b, p, q));
}

function lnAtMost(x: number, n: number, p: number): number {
  if (x === 0) return n * Math.log1p(-p);
  const a = n - x;
  const b = x + 1;
  const total = n + 1;
  const q = 1 - p;
  const density = lnLogitPeak(a, b) - deviance(total, q, p, -excessOf(b, total, p));
  return density + Math.log(betaTailRatio(a, b, q, p));
}
