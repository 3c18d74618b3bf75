import { demonstrationUnits } from '../bound/critical-count.ts';
import { demonstrationExposure } from '../bound/critical-exposure.ts';
import { lotDemonstrationUnits, type LotPromise } from '../bound/critical-lot.ts';
import { fractionUpper } from '../bound/nonconforming-fraction.ts';
import { OutOfDomain, requireWhole } from '../bound/out-of-domain.ts';
import { lineOfYield } from '../bound/yield.ts';
import { lnBinomialLower } from '../numerics/binomial-tail.ts';
import { lnHypergeometricLower } from '../numerics/hypergeometric-tail.ts';
import { lnPoissonLower } from '../numerics/poisson-tail.ts';
import type { Fraction, Tail } from '../units.ts';

/** A demonstration agreed in advance: inspect so much, pass with at most so many nonconforming. */
export interface DemonstrationPlan {
  /** what is counted */
  readonly of: 'units' | 'exposure' | 'lot';
  /** units to inspect, or exposure in the plant's unit */
  readonly size: number;
  /** nonconforming units, or nonconformities, with which it still passes */
  readonly allowed: number;
}

/**
 * The smallest demonstration that a fraction is at most `line`: with `allowed` nonconforming units the
 * exact upper bound stands at or below the line.
 *
 * @param line guaranteed fraction, above 0, below 1
 * @param allowed whole, 0 or more
 * @throws OutOfDomain naming the argument
 * @coverage a line that does not hold passes with chance `tail` at most; one look, at the end
 * @source `demonstrationUnits`
 */
export function fractionPlan(line: number, allowed: number, tail: Tail): DemonstrationPlan {
  return { of: 'units', size: demonstrationUnits(allowed, line, tail), allowed };
}

/** The same for a yield of at least `line`. @coverage, arguments, errors and source as of `fractionPlan` */
export function yieldPlan(line: number, allowed: number, tail: Tail): DemonstrationPlan {
  return fractionPlan(lineOfYield(line), allowed, tail);
}

/** The same for a rate of at most `line` per unit of exposure. @coverage and errors as of `fractionPlan` */
export function ratePlan(line: number, allowed: number, tail: Tail): DemonstrationPlan {
  return { of: 'exposure', size: demonstrationExposure(allowed, line, tail), allowed };
}

/** The same for a finite lot. @coverage and errors as of `fractionPlan`; @source `lotDemonstrationUnits` */
export function lotPlan(promise: LotPromise, allowed: number, tail: Tail): DemonstrationPlan {
  return { of: 'lot', size: lotDemonstrationUnits(allowed, promise, tail), allowed };
}

/**
 * The chance that a demonstration passes.
 *
 * @param plan of units or exposure
 * @param rate true fraction, 0 to 1, or true rate per unit of exposure, 0 or more
 * @returns 0 to 1, falling with the rate
 * @throws OutOfDomain naming the argument
 * @source operating characteristic: binomial, Poisson
 */
export function chanceOfPassing(plan: DemonstrationPlan, rate: number): Fraction {
  if (plan.of === 'lot') throw new OutOfDomain('plan', plan.of, "a plan of 'units' or 'exposure'; a lot holds whole units");
  const most = plan.of === 'units' ? 1 : Number.MAX_VALUE;
  if (!(rate >= 0 && rate <= most)) throw new OutOfDomain('rate', rate, plan.of === 'units' ? 'a number from 0 to 1' : 'a finite number, 0 or more');
  if (rate === 0) return 1 as Fraction;
  if (plan.of === 'exposure') return Math.exp(lnPoissonLower(plan.allowed, plan.size * rate)) as Fraction;
  return (rate === 1 ? Number(plan.allowed >= plan.size) : Math.exp(lnBinomialLower(plan.allowed, plan.size, rate))) as Fraction;
}

/**
 * The chance that a lot passes.
 *
 * @param plan of a lot
 * @param marked nonconforming units that the lot truly holds; whole, 0 to lotSize
 * @param lotSize units in the lot; whole, the sample's size or more
 * @throws OutOfDomain naming the argument
 * @source operating characteristic: hypergeometric
 */
export function chanceOfLotPassing(plan: DemonstrationPlan, marked: number, lotSize: number): Fraction {
  requireWhole('lotSize', lotSize, plan.size);
  requireWhole('marked', marked, 0, lotSize);
  return Math.exp(lnHypergeometricLower(plan.allowed, { size: lotSize, marked, drawn: plan.size })) as Fraction;
}

/** The old rule beside the exact figure: what 3/n says of n faultless units, and what is so. */
export interface RuleOfThree {
  readonly says: number;
  readonly exact: Fraction;
}

/**
 * The rule of three as the check it is: 3/n against the exact 95 % bound at no nonconforming unit.
 * It is never below the exact bound.
 *
 * @param inspected whole, 1 or more
 * @throws OutOfDomain naming the argument
 * @source common practice; -ln(0.05) = 2.9957
 */
export function ruleOfThree(inspected: number): RuleOfThree {
  requireWhole('inspected', inspected, 1);
  return { says: 3 / inspected, exact: fractionUpper(0, inspected, 0.05 as Tail) };
}
