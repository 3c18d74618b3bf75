import { deviance, lnLogitPeak } from '../numerics/beta-density.ts';
import { excessOf } from '../numerics/exact-residual.ts';

/** Chances of 0, 1, … `top` nonconforming units, and of at most so many; index is the count. */
export interface BinomialChances {
  readonly exactly: Float64Array;
  readonly atMost: Float64Array;
}

/**
 * @param units whole, 0 or more
 * @param p above 0, below 1
 * @param top whole, 0 or more; counts above `units` have chance 0
 * @source ratio recurrence from the count nearest the mean, which is had by saddle point
 */
export function binomialChances(units: number, p: number, top: number): BinomialChances {
  const exactly = new Float64Array(top + 1);
  const atMost = new Float64Array(top + 1);
  const odds = p / (1 - p);
  const last = Math.min(top, units);
  const anchor = Math.min(last, Math.floor(units * p));
  exactly[anchor] = binomialChance(anchor, units, p);
  for (let k = anchor; k < last; k++) exactly[k + 1] = ((exactly[k] as number) * (units - k) * odds) / (k + 1);
  for (let k = anchor; k > 0; k--) exactly[k - 1] = ((exactly[k] as number) * k) / ((units - k + 1) * odds);
  let sum = 0;
  for (let k = 0; k <= top; k++) atMost[k] = sum += exactly[k] as number;
  return { exactly, atMost };
}

/** Chance of exactly `count` nonconforming among `units`; relative error about 1e-14. */
export function binomialChance(count: number, units: number, p: number): number {
  if (count < 0 || count > units) return 0;
  if (count === 0) return Math.exp(units * Math.log1p(-p));
  const a = count;
  const b = units - count + 1;
  const q = 1 - p;
  return Math.exp(lnLogitPeak(a, b) - deviance(units + 1, p, q, excessOf(a, units + 1, p))) / (a * q);
}
