import { demonstrationUnits, violationUnits } from '../bound/critical-count.ts';
import { designedLower, designedUpper } from '../bound/clustered-defects.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction, Tail } from '../units.ts';
import { CountJudge } from './count-judge.ts';
import { judgeThresholds, type CountRule } from './count-rule.ts';
import { levelsOf } from './rule-levels.ts';
import type { Thresholds } from './thresholds.ts';

/**
 * The rule of a guarantee on a fraction of units that nonconform in clusters, with a planned design effect: the exact
 * bound of a sample 1 / designEffect the size. Line and target as of `binomialRule`.
 */
export function designedRule(guarantee: Guarantee, designEffect: number, line: Fraction, target: Fraction): CountRule {
  const { tail } = guarantee;
  const { violationTail } = levelsOf(guarantee);
  const by = judgeThresholds(guarantee, line, target, (at, level) => designedThresholds(designEffect, at, level));
  return {
    per: 1,
    thresholds: by.line,
    judge: new CountJudge({ ...by, neverDemonstrated: line, neverViolated: line }),
    upper: (inspected, nonconforming) => designedUpper(nonconforming, inspected, designEffect, tail),
    lower: (inspected, nonconforming) => designedLower(nonconforming, inspected, designEffect, violationTail),
  };
}

/** Asked of the bounds themselves, from a guess by whole effective units. */
function designedThresholds(designEffect: number, line: number, level: Tail): Thresholds {
  const effective = (count: number): number => Math.round(count / designEffect);
  return {
    sizeToDemonstrate: (count) => {
      const guess = designEffect * demonstrationUnits(effective(count), line, level);
      const tooFew = (units: number): boolean => units < count || units === 0 || designedUpper(count, units, designEffect, level) > line;
      return lastWhere(tooFew, count, Number.MAX_SAFE_INTEGER, guess) + 1;
    },
    sizeViolated: (count) => {
      if (count === 0) return 0;
      const guess = designEffect * violationUnits(Math.max(1, effective(count)), line, level);
      const last = lastWhere((units) => designedLower(count, units, designEffect, level) > line, count, Number.MAX_SAFE_INTEGER, guess);
      return last < count ? 0 : last;
    },
  };
}
