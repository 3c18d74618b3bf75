import { requireInside, requireWhole } from '../bound/out-of-domain.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Tail } from '../units.ts';
import { type BetaPrior, logEvidenceAbove, logEvidenceBelow, requirePrior } from './nonconforming-evidence.ts';

const mostUnits = Number.MAX_SAFE_INTEGER;

/**
 * The record path needs no evidence per unit: with this many nonconforming units, the guarantee is
 * demonstrated at all looks from this many units on. Kept by the caller, one whole number per count.
 *
 * @param nonconforming nonconforming units of the run so far, whole, 0 or more
 * @param line guaranteed fraction, above 0, below 1
 * @param tail all of alpha in one tail, above 0, below 1
 * @param prior fixed before the run began
 * @returns whole, above nonconforming; Infinity where it would pass 2^53 - 1
 * @throws OutOfDomain; NoConvergence
 * @coverage at all looks, as `logEvidenceDemonstrated`
 * @source own derivation: at a fixed count the evidence rises with every conforming unit
 */
export function smallestUnitsDemonstrated(nonconforming: number, line: number, tail: Tail, prior: BetaPrior): number {
  requireCritical(nonconforming, line, tail, prior);
  const split = { p: line, q: 1 - line };
  const short = (units: number): boolean => !(logEvidenceBelow(nonconforming, units, split, prior) >= -Math.log(tail));
  const last = lastWhere(short, nonconforming, mostUnits, (nonconforming + 2 * Math.sqrt(nonconforming) - Math.log(tail)) / line);
  return last === mostUnits ? Infinity : last + 1;
}

/**
 * The mirror: with this many nonconforming units the guarantee is violated at all looks up to this
 * many units. Arguments, errors and coverage as of `smallestUnitsDemonstrated`.
 *
 * @returns whole, nonconforming or more; 0 where no number of units would do
 * @coverage at all looks, as `logEvidenceViolated`
 * @source own derivation: at a fixed count the evidence falls with every conforming unit
 */
export function largestUnitsViolated(nonconforming: number, line: number, tail: Tail, prior: BetaPrior): number {
  requireCritical(nonconforming, line, tail, prior);
  const split = { p: line, q: 1 - line };
  const enough = (units: number): boolean => logEvidenceAbove(nonconforming, units, split, prior) >= -Math.log(tail);
  const last = lastWhere(enough, nonconforming, mostUnits, (nonconforming - 2 * Math.sqrt(nonconforming)) / line);
  return last < nonconforming ? 0 : last;
}

function requireCritical(nonconforming: number, line: number, tail: number, prior: BetaPrior): void {
  requireWhole('nonconforming', nonconforming, 0);
  requireInside('line', line);
  requireInside('tail', tail);
  requirePrior(prior);
}
