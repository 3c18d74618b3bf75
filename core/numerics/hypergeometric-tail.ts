import { deviance } from './beta-density.ts';
import { stirlingError } from './stirling.ts';

/** A sample without replacement: `marked` units of a lot of `size`, `drawn` taken, all whole. */
export interface Draw {
  readonly size: number;
  readonly marked: number;
  readonly drawn: number;
}

/**
 * ln P(X <= x) for the number X of marked units among those drawn.
 *
 * @param x whole, any
 * @param draw 0 <= marked <= size, 0 <= drawn <= size
 * @returns 0 or less, -Infinity below the possible; error of the probability about 1e-12 relative
 * @source sum of the hypergeometric chances; their logarithm from three binomial ones (C. Loader 2000, memory)
 */
export function lnHypergeometricLower(x: number, draw: Draw): number {
  const { size, marked, drawn } = draw;
  if (x < Math.max(0, drawn - (size - marked))) return -Infinity;
  if (x >= Math.min(marked, drawn)) return 0;
  if ((x + 0.5) * size < marked * drawn) return lnChance(x, draw) + Math.log(sumDownwards(x, draw));
  const above = Math.exp(lnChance(x + 1, draw)) * sumUpwards(x + 1, draw);
  return Math.log1p(-Math.min(above, 1));
}

/** P(X <= x)/P(X = x); x from the least to the most possible. */
export function sumDownwards(x: number, { size, marked, drawn }: Draw): number {
  const rest = size - marked - drawn;
  let term = 1;
  let sum = 1;
  for (let k = x; k > 0 && rest + k > 0; k -= 1) {
    term *= (k * (rest + k)) / ((marked - k + 1) * (drawn - k + 1));
    sum += term;
    if (term < 1e-17 * sum) break;
  }
  return sum;
}

function sumUpwards(x: number, { size, marked, drawn }: Draw): number {
  const rest = size - marked - drawn;
  const most = Math.min(marked, drawn);
  let term = 1;
  let sum = 1;
  for (let k = x; k < most; k += 1) {
    term *= ((marked - k) * (drawn - k)) / ((k + 1) * (rest + k + 1));
    sum += term;
    if (term < 1e-17 * sum) break;
  }
  return sum;
}

/** ln P(X = x); x from the least to the most possible. */
export function lnChance(x: number, { size, marked, drawn }: Draw): number {
  const other = size - marked;
  const excess = (x * size - marked * drawn) / size;
  const [p, q] = [drawn / size, (size - drawn) / size];
  return lnBinomial(x, marked, p, q, excess) + lnBinomial(drawn - x, other, p, q, -excess) - lnBinomial(drawn, size, p, q, 0);
}

/** ln of a binomial chance; excess = x - n p. */
function lnBinomial(x: number, n: number, p: number, q: number, excess: number): number {
  if (n === 0) return 0;
  if (x === 0) return n * (p < 0.5 ? Math.log1p(-p) : Math.log(q));
  if (x === n) return n * (p < 0.5 ? Math.log(p) : Math.log1p(-q));
  const spread = -0.5 * Math.log(2 * Math.PI * x * ((n - x) / n));
  return spread + stirlingError(n) - stirlingError(x) - stirlingError(n - x) - deviance(n, p, q, excess);
}
