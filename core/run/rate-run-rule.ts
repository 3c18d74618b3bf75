import { levelsOf, movedIn } from '../evidence/rule-levels.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import { allLooksRateLower, allLooksRateUpper } from '../sequential/rate-all-looks.ts';
import { smallestExposureDemonstrated } from '../sequential/rate-critical.ts';
import { gammaPriorAt, logRateEvidenceAbove, logRateEvidenceBelow } from '../sequential/rate-evidence.ts';
import type { Tail } from '../units.ts';
import { RisingClaim } from './rising-claim.ts';
import type { RunRule } from './run-rule.ts';

/**
 * The rule of a run on a rate of nonconformities: a gamma mixture whose prior mean is the line.
 *
 * @param promised most nonconformities promised in `per` of exposure; likewise the target, below the line
 * @coverage at all looks, as `logRateEvidenceDemonstrated` and `logRateEvidenceViolated`
 */
export function rateRunRule(guarantee: Guarantee, { line: lineOfPer, target: targetOfPer, per }: { line: number; target: number; per: number }): RunRule {
  const { tail } = guarantee;
  const { crossingDistance, violationDistance, violationTail } = levelsOf(guarantee);
  const [line, target] = [lineOfPer / per, targetOfPer / per];
  const prior = gammaPriorAt(line);
  const onLine = demonstratedAt(line, tail);
  const notOnLine = notViolatedAt(line, violationTail);
  return {
    per,
    most: Infinity,
    least: smallestExposureDemonstrated(0, line, tail, prior),
    demonstrated: onLine,
    notViolated: notOnLine,
    backFromCrossing: crossingDistance === 0 ? onLine : demonstratedAt(movedIn(line, target, crossingDistance), tail),
    backFromViolation: violationDistance === 0 ? notOnLine : notViolatedAt(movedIn(line, target, violationDistance), violationTail),
    lnDemonstrated: (exposure, count) => logRateEvidenceBelow(count, exposure, line, prior),
    lnViolated: (exposure, count) => logRateEvidenceAbove(count, exposure, line, prior),
    upper: (exposure, count) => allLooksRateUpper(count, exposure, tail, prior) * per,
    lower: (exposure, count) => allLooksRateLower(count, exposure, violationTail, prior) * per,
    sizeToDemonstrate: (count) => smallestExposureDemonstrated(count, line, tail, prior),
  };
}

function demonstratedAt(line: number, tail: Tail): RisingClaim {
  const prior = gammaPriorAt(line);
  return new RisingClaim((exposure, count) => logRateEvidenceBelow(count, exposure, line, prior) >= -Math.log(tail));
}

function notViolatedAt(line: number, tail: Tail): RisingClaim {
  const prior = gammaPriorAt(line);
  return new RisingClaim((exposure, count) => !(logRateEvidenceAbove(count, exposure, line, prior) >= -Math.log(tail)));
}
