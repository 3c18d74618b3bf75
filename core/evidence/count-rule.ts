import { demonstrationUnits, violationUnits } from '../bound/critical-count.ts';
import { demonstrationExposure, violationExposure } from '../bound/critical-exposure.ts';
import { fractionLower, fractionUpper } from '../bound/nonconforming-fraction.ts';
import { rateLower, rateUpper } from '../bound/rate.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction, Tail } from '../units.ts';
import { CountJudge, type JudgeThresholds } from './count-judge.ts';
import type { Judge } from './judge.ts';
import { levelsOf, movedIn } from './rule-levels.ts';
import { RememberedThresholds, type Thresholds } from './thresholds.ts';

/** Everything that turns 'count in size' into a judgement and into bounds, for one guarantee. */
export interface CountRule {
  readonly judge: Judge;
  readonly thresholds: Thresholds;
  /** Upper bound at the guarantee's level and lower bound at the violation rule's, in the quantity's unit. */
  upper(size: number, count: number): number;
  lower(size: number, count: number): number;
  /** Size that the quantity is told for: 1 unit for a fraction, the promised exposure for a rate. */
  readonly per: number;
  /** Estimate from the same; count / size times `per` where it is absent. */
  estimate?(size: number, count: number): number;
  /** Why the figures contradict each other, if they do. */
  doubt?(size: number, count: number): string | undefined;
}

/**
 * The rule of a guarantee on a fraction of units, by the exact binomial bound.
 *
 * @param line   largest nonconforming fraction that was promised
 * @param target fraction at which allowance used is 0 %, below the line
 */
export function binomialRule(guarantee: Guarantee, line: Fraction, target: Fraction): CountRule {
  const { tail } = guarantee;
  const { violationTail } = levelsOf(guarantee);
  const by = judgeThresholds(guarantee, line, target, (at, level) => ({
    sizeToDemonstrate: (count) => demonstrationUnits(count, at, level),
    sizeViolated: (count) => violationUnits(count, at, level),
  }));
  return {
    per: 1,
    thresholds: by.line,
    judge: new CountJudge({ ...by, neverDemonstrated: line, neverViolated: line }),
    upper: (inspected, nonconforming) => fractionUpper(nonconforming, inspected, tail),
    lower: (inspected, nonconforming) => fractionLower(nonconforming, inspected, violationTail),
  };
}

/**
 * The rule of a guarantee on a rate, by the exact Poisson bound; sizes are exposures.
 *
 * @param line   most nonconformities promised in `per` of exposure; likewise the target, below the line
 */
export function poissonRule(guarantee: Guarantee, { line, target, per }: { line: number; target: number; per: number }): CountRule {
  const { tail } = guarantee;
  const { violationTail } = levelsOf(guarantee);
  const by = judgeThresholds(guarantee, line / per, target / per, (at, level) => ({
    sizeToDemonstrate: (count) => demonstrationExposure(count, at, level),
    sizeViolated: (count) => violationExposure(count, at, level),
  }));
  return {
    per,
    thresholds: by.line,
    judge: new CountJudge({ ...by, neverDemonstrated: line / per, neverViolated: line / per }),
    upper: (exposure, count) => rateUpper(count, exposure, tail) * per,
    lower: (exposure, count) => rateLower(count, exposure, violationTail) * per,
  };
}

/** The thresholds that the alarm rules of a guarantee ask for, each remembered and made once. */
export function judgeThresholds(guarantee: Guarantee, line: number, target: number, at: (line: number, level: Tail) => Thresholds): Pick<JudgeThresholds, 'line' | 'opposite' | 'backFromCrossing' | 'backFromViolation'> {
  const { tail } = guarantee;
  const { crossingDistance, violationDistance, violationTail } = levelsOf(guarantee);
  const remembered = (distance: number, level: Tail): Thresholds => new RememberedThresholds(at(movedIn(line, target, distance), level));
  const onLine = remembered(0, tail);
  const opposite = violationTail === tail ? onLine : remembered(0, violationTail);
  return {
    line: onLine,
    opposite,
    backFromCrossing: crossingDistance === 0 ? onLine : remembered(crossingDistance, tail),
    backFromViolation: violationDistance === 0 ? opposite : remembered(violationDistance, violationTail),
  };
}
