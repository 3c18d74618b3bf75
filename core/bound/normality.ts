import { logNormalCdf } from '../numerics/normal.ts';
import { OutOfDomain, requireInside } from './out-of-domain.ts';

/** What the measurements say about the normal model. 'fits' means: no evidence against it, at this many values. */
export type NormalFit =
  | { readonly kind: 'fits'; readonly statistic: number; readonly pValue: number; readonly n: number }
  | { readonly kind: 'does not fit'; readonly statistic: number; readonly pValue: number; readonly n: number }
  | { readonly kind: 'too few values'; readonly n: number; readonly needed: number };

const fewest = 8;

/**
 * Anderson-Darling test of the normal model, mean and variance estimated from the same values.
 * Values recorded on a coarse scale or all alike do not fit: the model has no ties.
 *
 * @param values finite, in any order; not changed
 * @param level  chance of calling a normal sample unfit, above 0, below 1; 0.05 is common practice
 * @throws OutOfDomain when a value is not finite or the level is out of range
 * @source M. A. Stephens in R. B. D'Agostino, M. A. Stephens (eds), Goodness-of-Fit Techniques (1986), section 4.8.5,
 *   table 4.9: A*^2 = A^2 (1 + 0.75/n + 2.25/n^2) and its p-value curves (from memory; size checked by simulation)
 */
export function normalFit(values: readonly number[], level: number): NormalFit {
  requireInside('level', level);
  const n = values.length;
  const sorted = Float64Array.from(values).sort();
  for (const end of [sorted[0], sorted[n - 1]]) {
    if (end !== undefined && !Number.isFinite(end)) throw new OutOfDomain('values', end, 'finite numbers');
  }
  if (n < fewest) return { kind: 'too few values', n, needed: fewest };
  const statistic = andersonDarling(sorted);
  const pValue = pValueOf(statistic * (1 + 0.75 / n + 2.25 / (n * n)));
  return { kind: pValue > level ? 'fits' : 'does not fit', statistic, pValue, n };
}

/** A^2 of sorted values; Infinity when they are all alike. */
function andersonDarling(sorted: Float64Array): number {
  const n = sorted.length;
  const mean = sorted.reduce((sum, value) => sum + value / n, 0);
  const sd = Math.sqrt(sorted.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1));
  if (!(sd > 0)) return Infinity;
  let sum = 0;
  for (let i = 0; i < n; i++) {
    const low = ((sorted[i] ?? NaN) - mean) / sd;
    const high = ((sorted[n - 1 - i] ?? NaN) - mean) / sd;
    sum += (2 * i + 1) * (logNormalCdf(low) + logNormalCdf(-high));
  }
  return -n - sum / n;
}

function pValueOf(a: number): number {
  if (a > 10) return 0;
  if (a >= 0.6) return Math.exp(1.2937 - 5.709 * a + 0.0186 * a * a);
  if (a >= 0.34) return Math.exp(0.9177 - 4.279 * a - 1.38 * a * a);
  if (a >= 0.2) return 1 - Math.exp(-8.318 + 42.796 * a - 59.938 * a * a);
  return 1 - Math.exp(-13.436 + 101.14 * a - 223.73 * a * a);
}
