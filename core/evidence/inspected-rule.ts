import { demonstrationUnits, violationUnits } from '../bound/critical-count.ts';
import { fractionLower, fractionUpper } from '../bound/nonconforming-fraction.ts';
import { errorLines, type ErrorLines } from '../bound/station-error-lines.ts';
import type { Guarantee, StationError } from '../plant/guarantee.ts';
import type { Fraction, Tail } from '../units.ts';
import { CountJudge } from './count-judge.ts';
import { judgeThresholds, type CountRule } from './count-rule.ts';
import { levelsOf } from './rule-levels.ts';
import { RememberedThresholds, type Thresholds } from './thresholds.ts';

/**
 * Rejects so few that false rejects alone would seldom leave them are a contradiction: as seldom as this share of the
 * bound's own tail. Above it, a bound that falls below 0 is 0: chance alone does that once in 1 / tail looks at a
 * faultless line.
 */
const contradictionShare = 1e-3;

/**
 * The rule of a guarantee on a fraction of units behind a station that errs: the bound of `knownErrorUpper` or
 * `triedErrorUpper`, decided on rejects against a corrected line. Line and target as of `binomialRule`.
 */
export function inspectedRule(guarantee: Guarantee, error: StationError, line: Fraction, target: Fraction): CountRule {
  const { tail } = guarantee;
  const { violationTail } = levelsOf(guarantee);
  const [above, below] = [errorLines(error, tail), errorLines(error, violationTail)];
  const by = judgeThresholds(guarantee, line, target, (at, level) => rejectThresholds(errorLines(error, level), at));
  const contradicted = contradictionOf(above);
  return {
    per: 1,
    thresholds: by.line,
    judge: new CountJudge({ ...by, neverDemonstrated: above.toDemonstrate(line), neverViolated: below.toViolate(line), contradicted }),
    upper: (inspected, rejected) => share(above.upper(fractionUpper(rejected, inspected, above.tail))),
    lower: (inspected, rejected) => share(below.lower(fractionLower(rejected, inspected, below.tail))),
    estimate: (inspected, rejected) => share(above.estimate(rejected / inspected)),
    doubt: (inspected, rejected) => (contradicted === undefined || inspected < contradicted.sizeToDemonstrate(rejected) ? undefined : tooFew),
  };
}

const tooFew =
  'Fewer units are rejected than the station rejects by mistake alone, as declared: the figures contradict each other, so nothing is known. Try the station anew, or look for rejects that do not arrive.';

function rejectThresholds({ toDemonstrate, toViolate, tail }: ErrorLines, line: number): Thresholds {
  return {
    sizeToDemonstrate: (count) => demonstrationUnits(count, toDemonstrate(line), tail),
    sizeViolated: (count) => violationUnits(count, toViolate(line), tail),
  };
}

function contradictionOf({ leastRejects, tail }: ErrorLines): Thresholds | undefined {
  // Below this rate no window of the largest size could hold a contradiction.
  if (leastRejects < 1e-9) return undefined;
  const level = (tail * contradictionShare) as Tail;
  return new RememberedThresholds({ sizeToDemonstrate: (count) => demonstrationUnits(count, leastRejects, level), sizeViolated: () => 0 });
}

const share = (fraction: number): number => Math.min(Math.max(fraction, 0), 1);
