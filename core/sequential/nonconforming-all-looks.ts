import { requireInside } from '../bound/out-of-domain.ts';
import type { Fraction, Tail } from '../units.ts';
import { crossingPoint } from './crossing-point.ts';
import { type BetaPrior, logEvidenceAbove, logEvidenceBelow, requireCounts, requirePrior, type Split } from './nonconforming-evidence.ts';

/**
 * Upper bound on a line's nonconforming fraction that holds at every look of a run: the largest
 * fraction the run has not yet refuted.
 *
 * @param nonconforming whole, 0 to units
 * @param units units judged since the run began, whole, 0 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @param prior fixed before the run began; `betaPriorAt(line)` makes the bound tightest near the line
 * @returns in [nonconforming / units, 1]; exactly 1 while no conforming unit was seen
 * @throws OutOfDomain; NoConvergence
 * @coverage never below 1 - tail at all looks together, for any rate that stays the same through the run
 * @source inversion of `logEvidenceDemonstrated` in the tested fraction
 */
export function allLooksUpper(nonconforming: number, units: number, tail: Tail, prior: BetaPrior): Fraction {
  requireBound(nonconforming, units, tail, prior);
  if (nonconforming === units) return 1 as Fraction;
  const enough = -Math.log(tail);
  const start = logOdds(Math.max(nonconforming, 0.5), units);
  const at = crossingPoint((u) => logEvidenceBelow(nonconforming, units, splitAt(u), prior) - enough, start);
  return splitAt(at).p as Fraction;
}

/**
 * Lower bound on a line's nonconforming fraction that holds at every look of a run; arguments,
 * errors and coverage as of `allLooksUpper`.
 *
 * @returns in [0, nonconforming / units]; exactly 0 while no nonconforming unit was seen
 * @coverage never below 1 - tail at all looks together
 * @source inversion of `logEvidenceViolated` in the tested fraction
 */
export function allLooksLower(nonconforming: number, units: number, tail: Tail, prior: BetaPrior): Fraction {
  requireBound(nonconforming, units, tail, prior);
  if (nonconforming === 0) return 0 as Fraction;
  const enough = -Math.log(tail);
  const start = logOdds(nonconforming, Math.max(units, nonconforming + 0.5));
  const at = crossingPoint((u) => enough - logEvidenceAbove(nonconforming, units, splitAt(u), prior), start);
  return splitAt(at).p as Fraction;
}

function requireBound(nonconforming: number, units: number, tail: number, prior: BetaPrior): void {
  requireCounts(nonconforming, units);
  requireInside('tail', tail);
  requirePrior(prior);
}

function logOdds(nonconforming: number, units: number): number {
  return Math.log(nonconforming / (units - nonconforming));
}

function splitAt(logOdds: number): Split {
  return { p: 1 / (1 + Math.exp(-logOdds)), q: 1 / (1 + Math.exp(logOdds)) };
}
