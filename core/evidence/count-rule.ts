import { fractionLower, fractionUpper } from '../bound/nonconforming-fraction.ts';
import { demonstrationUnits, violationUnits } from '../bound/critical-count.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction, Tail } from '../units.ts';
import { CountJudge } from './count-judge.ts';
import { RememberedThresholds, type Thresholds } from './thresholds.ts';

/** Everything that turns 'x nonconforming of n' into a judgement and into bounds, for one guarantee. */
export interface CountRule {
  readonly judge: CountJudge;
  readonly thresholds: Thresholds;
  /** Upper and lower bound on the nonconforming fraction: at the guarantee's level, and at the violation rule's. */
  upper(inspected: number, nonconforming: number): number;
  lower(inspected: number, nonconforming: number): number;
  /** The line as a nonconforming fraction. */
  readonly line: Fraction;
}

/** Return distances and the level of the opposite bound, as the rules of a guarantee set them. */
export interface RuleLevels {
  readonly crossingDistance: number;
  readonly violationDistance: number;
  readonly violationTail: Tail;
}

/** Without a violation rule the opposite bound is still shown, at the guarantee's own level. */
export function levelsOf(guarantee: Guarantee): RuleLevels {
  let levels: RuleLevels = { crossingDistance: 0, violationDistance: 0, violationTail: guarantee.tail };
  for (const rule of guarantee.rules) {
    if (rule.kind === 'crossing') levels = { ...levels, crossingDistance: rule.return.distance };
    if (rule.kind === 'violation') levels = { ...levels, violationDistance: rule.return.distance, violationTail: rule.tail };
  }
  return levels;
}

/**
 * The rule of a guarantee on a fraction of units, by the exact binomial bound.
 *
 * @param line   largest nonconforming fraction that was promised
 * @param target fraction at which allowance used is 0 %, below the line
 */
export function binomialRule(guarantee: Guarantee, line: Fraction, target: Fraction): CountRule {
  const { tail } = guarantee;
  const levels = levelsOf(guarantee);
  const movedIn = (distance: number): Fraction => (line - distance * (line - target)) as Fraction;
  const thresholds = (at: Fraction, level: Tail): Thresholds =>
    new RememberedThresholds({
      sizeToDemonstrate: (count) => demonstrationUnits(count, at, level),
      sizeViolated: (count) => violationUnits(count, at, level),
    });
  const onLine = thresholds(line, tail);
  const opposite = levels.violationTail === tail ? onLine : thresholds(line, levels.violationTail);
  return {
    line,
    thresholds: onLine,
    judge: new CountJudge({
      line: onLine,
      opposite,
      backFromCrossing: levels.crossingDistance === 0 ? onLine : thresholds(movedIn(levels.crossingDistance), tail),
      backFromViolation: levels.violationDistance === 0 ? opposite : thresholds(movedIn(levels.violationDistance), levels.violationTail),
      rate: line,
    }),
    upper: (inspected, nonconforming) => fractionUpper(nonconforming, inspected, tail),
    lower: (inspected, nonconforming) => fractionLower(nonconforming, inspected, levels.violationTail),
  };
}
