import { lotAllowance } from '../../core/bound/finite-lot.ts';
import { lineOfYield } from '../../core/bound/yield.ts';
import { boundMethods } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { briefShare } from '../../core/describe/share-text.ts';
import type { Amount } from '../../core/figure/amount.ts';
import { decimalComplement } from '../../core/figure/decimal-complement.ts';
import { chanceOfLotPassing, chanceOfPassing, fractionPlan, lotPlan, ratePlan, ruleOfThree, yieldPlan, type DemonstrationPlan } from '../../core/plan/demonstration.ts';
import type { Tail } from '../../core/units.ts';
import { demonstrationAnswer } from './demonstration-answer.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** What is asked of every demonstration. */
export interface AskedDemonstration {
  readonly tail: Tail;
  /** nonconforming units (or nonconformities) the chosen plan allows, whole, 0 or more */
  readonly allowed: number;
  /** true figures at which the chance of passing is wanted; none: some below the line, and the line */
  readonly truths: readonly number[];
}

/** The table shows so many plans at least, from none allowed. */
const fewestPlans = 4;

function plansOf(allowed: number, plan: (allowed: number) => DemonstrationPlan): readonly DemonstrationPlan[] {
  const first = Array.from({ length: fewestPlans }, (_, count) => count);
  return (allowed < fewestPlans ? first : [...first, allowed]).map(plan);
}

const usual = [0.1, 0.25, 0.5, 1];
const truthsOf = ({ truths }: AskedDemonstration, line: number): readonly number[] => (truths.length > 0 ? truths : usual.map((share) => Number((share * line).toPrecision(12))));

export function fractionDemonstration(line: number, asked: AskedDemonstration): PlanAnswer {
  const plans = plansOf(asked.allowed, (allowed) => fractionPlan(line, allowed, asked.tail));
  return demonstrationAnswer({
    promise: `nonconforming fraction of at most ${briefShare(line)}`,
    ...asked,
    plans,
    sized: 'units',
    counted: 'nonconforming units',
    chance: chanceOfPassing,
    truths: truthsOf(asked, line),
    written: briefShare,
    truth: 'true nonconforming fraction',
    line,
    from: 0,
    to: Math.min(1, 1.5 * line),
    method: boundMethods.binomial,
    notes: threes(plans, asked.tail),
  });
}

export function yieldDemonstration(line: number, asked: AskedDemonstration): PlanAnswer {
  const loss = lineOfYield(line);
  const plans = plansOf(asked.allowed, (allowed) => yieldPlan(line, allowed, asked.tail));
  return demonstrationAnswer({
    promise: `yield of at least ${briefShare(line)}`,
    ...asked,
    plans,
    sized: 'units',
    counted: 'nonconforming units',
    chance: (plan, truth) => chanceOfPassing(plan, decimalComplement(truth)),
    truths: asked.truths.length > 0 ? asked.truths : truthsOf(asked, loss).map(decimalComplement),
    written: briefShare,
    truth: 'true yield',
    line,
    from: Math.max(0, 1 - 1.5 * loss),
    to: 1,
    method: boundMethods.yield,
    notes: threes(plans, asked.tail),
  });
}

/** @param amount guaranteed nonconformities over exposure; the truths are per unit of exposure */
export function rateDemonstration(amount: Amount, asked: AskedDemonstration): PlanAnswer {
  const line = amount.value / amount.per;
  const written = (rate: number): string => `${writtenNumber(rate * amount.per, 4)} per ${amount.per === 1 ? '' : `${amount.per} `}${amount.unit}`;
  return demonstrationAnswer({
    promise: `rate of at most ${written(line)}`,
    ...asked,
    plans: plansOf(asked.allowed, (allowed) => ratePlan(line, allowed, asked.tail)),
    sized: amount.unit,
    counted: 'nonconformities',
    chance: chanceOfPassing,
    truths: truthsOf(asked, line),
    written,
    truth: 'true rate',
    line,
    from: 0,
    to: 1.5 * line,
    method: boundMethods.poisson,
    notes: [],
  });
}

/** @param line guaranteed fraction of the lot; the truths are whole nonconforming units in it */
export function lotDemonstration(lotSize: number, line: number, asked: AskedDemonstration): PlanAnswer {
  const promise = { lotSize, allowed: lotAllowance(line, lotSize) };
  const counts = Array.from({ length: fewestPlans }, (_, count) => count).filter((count) => count <= promise.allowed && count !== asked.allowed);
  const plans = [...counts, asked.allowed].sort((a, b) => a - b).map((allowed) => lotPlan(promise, allowed, asked.tail));
  const usualTruths = [...new Set([0, Math.round(promise.allowed / 4), Math.round(promise.allowed / 2), promise.allowed, promise.allowed + 1])];
  const to = Math.min(lotSize, Math.max(4, Math.ceil(1.5 * (promise.allowed + 1))));
  return demonstrationAnswer({
    promise: `fraction of at most ${briefShare(line)}, which is ${promise.allowed} of the lot's ${writtenNumber(lotSize, 15)} units,`,
    ...asked,
    plans,
    sized: 'sampled units',
    counted: 'nonconforming units',
    chance: (plan, truth) => chanceOfLotPassing(plan, Math.round(truth), lotSize),
    truths: asked.truths.length > 0 ? asked.truths : usualTruths,
    written: (truth) => `${writtenNumber(Math.round(truth), 15)} in the lot`,
    truth: 'true nonconforming units in the lot',
    line: promise.allowed,
    from: 0,
    to,
    method: boundMethods.lot,
    notes: [],
  });
}

/** The rule of three as the check it is. */
function threes(plans: readonly DemonstrationPlan[], tail: Tail): readonly (readonly [string, string])[] {
  const faultless = plans.find(({ allowed }) => allowed === 0);
  if (faultless === undefined) return [];
  if (tail !== 0.05) return [['Check', 'The rule of three (3/n for n faultless units) belongs to 95 % confidence and says nothing here.']];
  const { says, exact } = ruleOfThree(faultless.size);
  return [['Check', `Rule of three for ${writtenNumber(faultless.size, 15)} faultless units: 3/n = ${briefShare(says)}; exact ${briefShare(exact, 'up')}.`]];
}
