import type { AlarmGrounds } from '../alarm/alarm.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import { methodOf } from './method.ts';

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
      const { name, version } = methodOf(guarantee);
      return { name, version, lookRule: 'one look' };
    }
    case 'deterioration':
      return { name: 'mixture Shiryaev-Roberts detector', version: 1, lookRule: 'all looks' };
    case 'silence':
    case 'bad-data':
      return { name: rule, version: 1, lookRule: 'no bound' };
  }
}
