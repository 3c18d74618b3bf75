import type { AlarmGrounds } from '../alarm/alarm.ts';
import { methodOf } from '../evidence/method.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import type { DeteriorationRule } from './change-watch-of.ts';
import { detectorMethodOf, runMethodOf } from './run-method.ts';

/** By which method an alarm rule calls, and how often it may be looked at. */
export interface RuleMethod {
  readonly name: string;
  readonly version: number;
  readonly lookRule: AlarmGrounds['lookRule'];
}

export function methodOfRule(guarantee: Guarantee, rule: AlarmRule['kind']): RuleMethod {
  switch (rule) {
    case 'crossing':
    case 'violation': {
      const byRun = isDecidedByRun(guarantee, rule) ? runMethodOf(guarantee) : undefined;
      const { name, version } = byRun ?? methodOf(guarantee);
      return { name, version, lookRule: byRun ? 'all looks' : 'one look' };
    }
    case 'deterioration': {
      const { name, version } = detectorMethodOf(guarantee.rules.find((one): one is DeteriorationRule => one.kind === rule));
      return { name, version, lookRule: 'all looks' };
    }
    case 'silence':
    case 'bad-data':
      return { name: rule, version: 1, lookRule: 'no bound' };
  }
}

/** Whether the run decides a rule, and not the window: the violation where both are used, else everything or nothing. */
export function isDecidedByRun({ looks }: Guarantee, rule: AlarmRule['kind']): boolean {
  if (rule !== 'crossing' && rule !== 'violation') return false;
  return looks === 'all looks' || (looks === 'both' && rule === 'violation');
}
