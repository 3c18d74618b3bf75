import { lookRules, type BoundMethod } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { confidenceText } from '../../core/describe/share-text.ts';
import type { DemonstrationPlan } from '../../core/plan/demonstration.ts';
import type { Tail } from '../../core/units.ts';
import { curvePicture } from './curve-picture.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** A demonstration of any quantity, as the answer is made from it. */
export interface Demonstration {
  /** 'nonconforming fraction of at most 200 ppm' */
  readonly promise: string;
  readonly tail: Tail;
  readonly plans: readonly DemonstrationPlan[];
  /** how many nonconforming ones the chosen plan allows */
  readonly allowed: number;
  /** 'units', 'm' */
  readonly sized: string;
  /** 'nonconforming units' or 'nonconformities' */
  readonly counted: string;
  /** chance of passing at a true figure */
  readonly chance: (plan: DemonstrationPlan, truth: number) => number;
  /** the true figures to show, each written as the plant says it */
  readonly truths: readonly number[];
  readonly written: (truth: number) => string;
  /** 'true nonconforming fraction' */
  readonly truth: string;
  readonly line: number;
  readonly from: number;
  readonly to: number;
  readonly method: BoundMethod;
  readonly notes: readonly (readonly [string, string])[];
}

export function demonstrationAnswer(asked: Demonstration): PlanAnswer {
  const { promise, tail, plans, allowed, sized, counted, chance, truths, written, truth, line, from, to, method } = asked;
  const chosen = plans.find((plan) => plan.allowed === allowed);
  const size = chosen === undefined ? 0 : chosen.size;
  return {
    sentences: [
      `To demonstrate a ${promise} at ${confidenceText(tail)} confidence: ${sizeText(size)} ${sized}; ${counted} with which it passes: ${allowed === 0 ? 'none' : `${allowed} or fewer`}.`,
      `Where the promise does not hold, it passes with a chance of ${writtenNumber(100 * tail, 4)} % at most.`,
    ],
    table: {
      head: [counted, sized, ...truths.map((figure) => `passes at ${written(figure)}`)],
      rows: plans.map((plan) => [`at most ${plan.allowed}`, sizeText(plan.size), ...truths.map((figure) => percent(chance(plan, figure)))]),
    },
    picture:
      chosen === undefined
        ? []
        : curvePicture({ chance: (x) => chance(chosen, x), from, to, line, label: truth, title: `Chance of passing with ${allowed === 0 ? 'no' : `at most ${allowed}`} ${counted}`, written }),
    notes: [...asked.notes, ['Method', method.name], ['Assumes', method.assumes.join(' ')], ['Looks', lookRules.one], ['Source', method.source]],
    json: {
      plan: 'demonstration',
      promise,
      line,
      tail,
      confidence: confidenceText(tail),
      allowed,
      size,
      plans: plans.map((plan) => ({ ...plan, passes: truths.map((figure) => ({ truth: figure, chance: chance(plan, figure) })) })),
      method: method.name,
      looks: lookRules.one,
      source: method.source,
    },
  };
}

/** Sizes are rounded up: a plan rounded down would not demonstrate. */
const sizeText = (size: number): string => (Number.isInteger(size) ? writtenNumber(size, 15) : writtenNumber(size, 6, 'up'));

/** A chance in per cent; never 0 or 100 where it is not. */
export function percent(chance: number): string {
  if (chance > 0 && chance < 0.0005) return '< 0.1 %';
  if (chance < 1 && chance > 0.9995) return '> 99.9 %';
  return `${(100 * chance).toFixed(1)} %`;
}
