import { betaOdds } from '../numerics/beta-quantile.ts';
import type { Fraction, Tail } from '../units.ts';
import { requireInside, requireWhole } from './out-of-domain.ts';

/**
 * Exact upper bound on a line's nonconforming fraction: the largest rate at which seeing this few
 * nonconforming units would still happen with probability `tail`.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 1 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in [nonconforming / inspected, 1] for tails up to 1/2; exactly 1 if every unit is nonconforming
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage never below 1 - tail, at one look fixed in advance; not at every look of a running line
 * @source C. J. Clopper, E. S. Pearson, Biometrika 26 (1934) 404-413 (memory)
 */
export function fractionUpper(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  if (nonconforming === inspected) return 1 as Fraction;
  return (1 / (1 + betaOdds(inspected - nonconforming, nonconforming + 1, tail))) as Fraction;
}

/**
 * Exact lower bound on a line's nonconforming fraction: the smallest rate at which seeing this many
 * would still happen with probability `tail`. Arguments, errors and coverage as of `fractionUpper`.
 *
 * @returns in [0, nonconforming / inspected] for tails up to 1/2; exactly 0 if no unit is nonconforming
 * @coverage never below 1 - tail, at one look fixed in advance
 * @source C. J. Clopper, E. S. Pearson, Biometrika 26 (1934) 404-413 (memory)
 */
export function fractionLower(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  if (nonconforming === 0) return 0 as Fraction;
  return fractionOfOdds(betaOdds(nonconforming, inspected - nonconforming + 1, tail));
}

/** @throws OutOfDomain unless 0 <= nonconforming <= inspected, 1 <= inspected and 0 < tail < 1 */
export function requireSample(nonconforming: number, inspected: number, tail: number): void {
  requireWhole('inspected', inspected, 1);
  requireWhole('nonconforming', nonconforming, 0, inspected);
  requireInside('tail', tail);
}

/** p of the odds p/(1 - p), without the division of two infinities. */
export function fractionOfOdds(odds: number): Fraction {
  return (odds < 1 ? odds / (1 + odds) : 1 / (1 + 1 / odds)) as Fraction;
}
