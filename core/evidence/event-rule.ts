import { demonstrationUnits, violationUnits } from '../bound/critical-count.ts';
import { eventLine } from '../bound/clustered-defects.ts';
import { fractionLower, fractionUpper } from '../bound/nonconforming-fraction.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction } from '../units.ts';
import { CountJudge } from './count-judge.ts';
import { judgeThresholds, type CountRule } from './count-rule.ts';
import { levelsOf } from './rule-levels.ts';

/**
 * The rule of a guarantee on a fraction of units whose nonconforming ones are counted as events: the exact bound on the
 * rate of events against the line that belongs to it, shown times the declared units of an event. Line and target as of
 * `binomialRule`, in units.
 */
export function eventRule(guarantee: Guarantee, clusterSize: number, line: Fraction, target: Fraction): CountRule {
  const { tail } = guarantee;
  const { violationTail } = levelsOf(guarantee);
  const by = judgeThresholds(guarantee, line, target, (at, level) => ({
    sizeToDemonstrate: (events) => demonstrationUnits(events, eventLine(at, clusterSize), level),
    sizeViolated: (events) => violationUnits(events, eventLine(at, clusterSize), level),
  }));
  const inUnits = (rate: number): number => Math.min(1, rate * clusterSize);
  const rate = eventLine(line, clusterSize);
  return {
    per: 1,
    thresholds: by.line,
    judge: new CountJudge({ ...by, neverDemonstrated: rate, neverViolated: rate }),
    upper: (inspected, events) => inUnits(fractionUpper(events, inspected, tail)),
    lower: (inspected, events) => inUnits(fractionLower(events, inspected, violationTail)),
    estimate: (inspected, events) => inUnits(events / inspected),
  };
}
