import { lotAllowance } from '../bound/finite-lot.ts';
import { levelsOf, movedIn } from '../evidence/rule-levels.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import { allLooksLotLower, allLooksLotUpper, logLotEvidenceAbove, logLotEvidenceBelow } from '../sequential/lot-evidence.ts';
import { type BetaPrior, betaPriorAt } from '../sequential/nonconforming-evidence.ts';
import type { Tail } from '../units.ts';
import { RisingClaim } from './rising-claim.ts';
import type { RunRule } from './run-rule.ts';

/**
 * The rule of a run on one lot, sampled without replacement: the run is the lot.
 *
 * @param line    largest nonconforming fraction that was promised; likewise the target, below it
 * @param lotSize units in the lot, whole, 1 or more
 * @coverage at all looks at the sample, as `logLotEvidenceBelow` and `logLotEvidenceAbove`
 */
export function lotRunRule(guarantee: Guarantee, line: number, target: number, lotSize: number): RunRule {
  const { tail } = guarantee;
  const { crossingDistance, violationDistance, violationTail } = levelsOf(guarantee);
  const lot: Lot = { size: lotSize, prior: betaPriorAt(line) };
  const allowed = lotAllowance(line, lotSize);
  const onLine = demonstratedAt(lot, allowed, tail);
  const sample = (inspected: number, nonconforming: number): Sample => ({ nonconforming, inspected, size: lotSize });
  const sizeToDemonstrate = (found: number): number => {
    if (found > allowed) return Infinity;
    const short = (inspected: number): boolean => !(lnBelow(lot, allowed, inspected, found) >= -Math.log(tail));
    return lastWhere(short, found, lotSize, lotSize / 2) + 1;
  };
  return {
    per: 1,
    most: lotSize,
    least: sizeToDemonstrate(0),
    demonstrated: onLine,
    notViolated: notViolatedAt(lot, allowed, violationTail),
    backFromCrossing: crossingDistance === 0 ? onLine : demonstratedAt(lot, lotAllowance(movedIn(line, target, crossingDistance), lotSize), tail),
    backFromViolation: notViolatedAt(lot, lotAllowance(movedIn(line, target, violationDistance), lotSize), violationTail),
    lnDemonstrated: (inspected, found) => lnBelow(lot, allowed, inspected, found),
    lnViolated: (inspected, found) => logLotEvidenceAbove(sample(inspected, found), allowed, lot.prior),
    upper: (inspected, found) => allLooksLotUpper(sample(inspected, found), tail, lot.prior) / lotSize,
    lower: (inspected, found) => allLooksLotLower(sample(inspected, found), violationTail, lot.prior) / lotSize,
    sizeToDemonstrate,
  };
}

interface Lot {
  readonly size: number;
  readonly prior: BetaPrior;
}
type Sample = Parameters<typeof logLotEvidenceBelow>[0];

/** ln of the evidence that the lot holds no more than it is allowed. */
function lnBelow({ size, prior }: Lot, allowed: number, inspected: number, nonconforming: number): number {
  return nonconforming > allowed ? -Infinity : logLotEvidenceBelow({ nonconforming, inspected, size }, allowed + 1, prior);
}

function demonstratedAt(lot: Lot, allowed: number, tail: Tail): RisingClaim {
  return new RisingClaim((inspected, found) => lnBelow(lot, allowed, inspected, found) >= -Math.log(tail), lot.size);
}

function notViolatedAt(lot: Lot, allowed: number, tail: Tail): RisingClaim {
  const holdsAt = (inspected: number, nonconforming: number): boolean =>
    !(logLotEvidenceAbove({ nonconforming, inspected, size: lot.size }, allowed, lot.prior) >= -Math.log(tail));
  return new RisingClaim(holdsAt, lot.size);
}
