import { spreadBudget } from '../budget/false-call-budget.ts';
import type { Complain } from './complain.ts';
import type { GuaranteeFile } from './guarantee-schema.ts';

interface Known {
  readonly at: number;
  readonly entry: GuaranteeFile;
}

/**
 * The plant's budget of false calls, shared out over the detectors that set no units between false calls of their own:
 * by size where all count units, else every guarantee the same part times its weight.
 *
 * @returns units between false calls by place in the list of guarantees
 */
export function sharesOfBudget(falseCalls: number, known: readonly Known[], complain: Complain): ReadonlyMap<number, number> {
  const sharing = known.filter(({ entry }) => takesPart(entry));
  for (const { at, entry } of sharing) {
    if (entry['units-per-shift'] !== undefined) continue;
    complain(['guarantees', at, 'units-per-shift'], "units per shift, so that the plant's false-calls-per-shift can be shared out; or units-between-false-calls in its deterioration rule");
  }
  const told = sharing.flatMap(({ at, entry }) => {
    const perShift = entry['units-per-shift'];
    return perShift === undefined ? [] : [{ at, quantity: entry.quantity, stream: { perShift, weight: entry.weight ?? 1 } }];
  });
  if (told.length === 0) return new Map();
  const inUnits = told.every(({ quantity }) => quantity !== 'rate');
  const shares = spreadBudget(falseCalls, told.map(({ stream }) => stream), inUnits ? 'by size' : 'by stream');
  return new Map(told.map(({ at }, place) => [at, Math.ceil(shares[place] as number)]));
}

function takesPart(entry: GuaranteeFile): boolean {
  if (entry.quantity === 'chained-yield' || entry.quantity === 'lot-fraction') return false;
  if (entry.quantity === 'mean' && !entry.sigma && !entry.range) return false;
  if ('clusters' in entry && entry.clusters !== undefined && !('merge-within' in entry.clusters)) return false;
  const rule = entry.alarms?.deterioration;
  return rule === undefined || (rule !== 'off' && rule['units-between-false-calls'] === undefined);
}
