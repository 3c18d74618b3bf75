import { falseCallsAtMost, spreadBudget, type BudgetSharing, type BudgetStream } from '../../core/budget/false-call-budget.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { barPicture } from './bar-picture.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** A detector of the plant by the name it goes by in the table. */
export interface NamedStream extends BudgetStream {
  readonly name: string;
}

const mostBars = 12;

/** One number for the whole plant, spread over its detectors. @throws OutOfDomain */
export function budgetPlan(falseCalls: number, streams: readonly NamedStream[], sharing: BudgetSharing): PlanAnswer {
  const thresholds = spreadBudget(falseCalls, streams, sharing);
  const total = falseCallsAtMost(thresholds, streams);
  const parts = streams.map(({ name, perShift, weight }, at) => {
    const threshold = thresholds[at] ?? NaN;
    return { name, perShift, weight, threshold, falseCallsPerShift: perShift / threshold };
  });
  return {
    sentences: [`${writtenNumber(falseCalls, 6)} false calls a shift over ${parts.length} guarantees, shared ${sharing}: together at most ${writtenNumber(total, 6)} a shift, whatever ties them together.`],
    table: {
      head: ['guarantee', 'units a shift', 'weight', 'units between false calls', 'false calls a shift'],
      rows: parts.map((part) => [part.name, writtenNumber(part.perShift, 6), writtenNumber(part.weight, 4), writtenNumber(Math.ceil(part.threshold), 15), writtenNumber(part.falseCallsPerShift, 3)]),
    },
    picture: barPicture(
      parts.length > mostBars ? `Units between false calls, the first ${mostBars}` : 'Units between false calls',
      parts.slice(0, mostBars).map(({ name, threshold }) => ({ name, value: threshold, written: writtenNumber(Math.ceil(threshold), 15) })),
    ),
    notes: [
      ['Use', 'Set the deterioration rule of each guarantee to its units between false calls (vouchline plan alarm --rule detector --between …).'],
      ['Source', 'own derivation: a detector calls falsely at most units a shift / threshold times a shift, and these add up'],
    ],
    json: { plan: 'budget', falseCalls, sharing, falseCallsAtMost: total, streams: parts },
  };
}
