import { demonstrationUnits } from '../bound/critical-count.ts';
import { lnBinomialUpper } from '../numerics/binomial-tail.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Fraction, Tail } from '../units.ts';

/** Share of its time a well line may spend without being demonstrated in the proposed window. */
const mostUndemonstrated = 0.01;

/**
 * The smallest window in which a line at its normal rate is demonstrated 99 % of the time.
 * With c nonconforming units allowed the best window is the smallest that allows them; c is raised until it is enough.
 *
 * @param line       guaranteed nonconforming fraction, above 0, below 1
 * @param normalRate nonconforming fraction of the well line, 0 to below `line`
 * @param tail       of the bound that is compared with the line
 * @param mostUnits  largest window allowed
 * @returns units, or undefined where the normal rate is too near the line for any allowed window
 * @source own derivation from methods of the rolling exact bound: P(X > c | w, normal rate) <= 0.01
 */
export function windowProposal(line: Fraction, normalRate: Fraction, tail: Tail, mostUnits: number): number | undefined {
  const unitsFor = (count: number): number => demonstrationUnits(count, line, tail);
  if (normalRate === 0) return allowed(unitsFor(0), mostUnits);
  const tooMany = (count: number): boolean =>
    Math.exp(lnBinomialUpper(count + 1, unitsFor(count), normalRate)) > mostUndemonstrated;
  const mostCount = Math.ceil(line * mostUnits);
  const count = lastWhere(tooMany, 0, mostCount, 8) + 1;
  return count > mostCount ? undefined : allowed(unitsFor(count), mostUnits);
}

function allowed(units: number, most: number): number | undefined {
  return units <= most ? units : undefined;
}
