import { lnBinomialUpper } from '../../../core/numerics/binomial-tail.ts';
import type { Uniform } from '../../../core/run-length/seeded-uniform.ts';

/** Paths simulated for each case. */
export const paths = 20_000;

/** Chance that one comparison with `mostMisses` fails although the method is sound; all of them together stay below 1e-6. */
const falseFailure = 1e-8;

/** The most misses among the paths that a chance of `tail` a path explains. */
export function mostMisses(tail: number, among: number = paths): number {
  let misses = Math.ceil(among * tail);
  while (lnBinomialUpper(misses + 1, among, tail) > Math.log(falseFailure)) misses += 1;
  return misses;
}

/** Conforming units before the next nonconforming one. */
export function gapAt(rate: number, uniform: Uniform): number {
  return Math.floor(Math.log(uniform()) / Math.log1p(-rate));
}

/** Exposure to the next nonconformity. */
export function exposureAt(rate: number, uniform: Uniform): number {
  return -Math.log(uniform()) / rate;
}

/** Simpson's rule with 2 * halves steps. */
export function integral(f: (x: number) => number, from: number, to: number, halves = 2000): number {
  const step = (to - from) / (2 * halves);
  let sum = f(from) + f(to);
  for (let i = 1; i < 2 * halves; i++) sum += f(from + i * step) * (i % 2 === 1 ? 4 : 2);
  return (sum * step) / 3;
}
