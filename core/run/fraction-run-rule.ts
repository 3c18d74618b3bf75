import { levelsOf, movedIn } from '../evidence/rule-levels.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import { allLooksLower, allLooksUpper } from '../sequential/nonconforming-all-looks.ts';
import { smallestUnitsDemonstrated } from '../sequential/nonconforming-critical.ts';
import { betaPriorAt, logEvidenceAbove, logEvidenceBelow } from '../sequential/nonconforming-evidence.ts';
import type { Tail } from '../units.ts';
import { RisingClaim } from './rising-claim.ts';
import type { RunRule } from './run-rule.ts';

/**
 * The rule of a run on a fraction of units: a beta mixture whose prior mean is the line.
 *
 * @param line   largest nonconforming fraction that was promised
 * @param target fraction at which allowance used is 0 %, below the line
 * @coverage at all looks, as `logEvidenceDemonstrated` and `logEvidenceViolated`
 */
export function fractionRunRule(guarantee: Guarantee, line: number, target: number): RunRule {
  const { tail } = guarantee;
  const { crossingDistance, violationDistance, violationTail } = levelsOf(guarantee);
  const prior = betaPriorAt(line);
  const onLine = demonstratedAt(line, tail);
  const notOnLine = notViolatedAt(line, violationTail);
  const split = { p: line, q: 1 - line };
  return {
    per: 1,
    most: Infinity,
    least: smallestUnitsDemonstrated(0, line, tail, prior),
    demonstrated: onLine,
    notViolated: notOnLine,
    backFromCrossing: crossingDistance === 0 ? onLine : demonstratedAt(movedIn(line, target, crossingDistance), tail),
    backFromViolation: violationDistance === 0 ? notOnLine : notViolatedAt(movedIn(line, target, violationDistance), violationTail),
    lnDemonstrated: (units, found) => logEvidenceBelow(found, units, split, prior),
    lnViolated: (units, found) => logEvidenceAbove(found, units, split, prior),
    upper: (units, found) => allLooksUpper(found, units, tail, prior),
    lower: (units, found) => allLooksLower(found, units, violationTail, prior),
    sizeToDemonstrate: (found) => smallestUnitsDemonstrated(found, line, tail, prior),
  };
}

function demonstratedAt(line: number, tail: Tail): RisingClaim {
  const prior = betaPriorAt(line);
  const split = { p: line, q: 1 - line };
  return new RisingClaim((units, found) => logEvidenceBelow(found, units, split, prior) >= -Math.log(tail));
}

function notViolatedAt(line: number, tail: Tail): RisingClaim {
  const prior = betaPriorAt(line);
  const split = { p: line, q: 1 - line };
  return new RisingClaim((units, found) => !(logEvidenceAbove(found, units, split, prior) >= -Math.log(tail)));
}
