import type { ConditionChange } from '../alarm/bound-condition.ts';
import type { AlarmRule } from '../plant/guarantee.ts';
import type { BadDataLog } from './bad-data-log.ts';

export type BadDataRule = Extract<AlarmRule, { kind: 'bad-data' }>;

/** Watches the bad records at the stations of one guarantee (rule S3): begins above the number, ends at half of it. */
export class BadDataWatch {
  readonly rule: BadDataRule;
  readonly #logs: readonly BadDataLog[];
  active = false;

  constructor(rule: BadDataRule, logs: readonly BadDataLog[]) {
    this.rule = rule;
    this.#logs = logs;
  }

  weigh(at: number): ConditionChange {
    const records = this.#logs.reduce((sum, log) => sum + log.within(at, this.rule.withinMs), 0);
    if (!this.active && records > this.rule.moreThan) {
      this.active = true;
      return 'begins';
    }
    if (this.active && records <= this.rule.moreThan / 2) {
      this.active = false;
      return 'ends';
    }
    return undefined;
  }

  /** When, after `now`, the oldest record that still counts falls out of the rule's span; Infinity while nothing waits for it. */
  due(now: number): number {
    if (!this.active) return Infinity;
    return this.#logs.reduce((due, log) => Math.min(due, log.nextFall(now, this.rule.withinMs)), Infinity);
  }
}
