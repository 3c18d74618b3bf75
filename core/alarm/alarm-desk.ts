import type { Happening } from '../monitor/happening.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import type { EpochMs } from '../units.ts';
import type { Alarm, AlarmGrounds } from './alarm.ts';
import { nextAlarm, type AlarmEvent } from './next-alarm.ts';

/** What a desk keeps over a restart; plain data. */
export interface AlarmDeskSnapshot {
  readonly nextId: number;
  readonly standing: readonly Alarm[];
}

/**
 * Keeps every alarm that has not ended, one occurrence per guarantee and rule at a time, and says what happened
 * to `tell`. An ended alarm leaves the desk: the store has it.
 */
export class AlarmDesk {
  readonly #tell: (happening: Happening) => void;
  readonly #standing = new Map<number, Alarm>();
  readonly #byRule = new Map<string, number>();
  #nextId = 1;

  constructor(tell: (happening: Happening) => void) {
    this.#tell = tell;
  }

  /** Alarms that have not ended, oldest first. */
  standing(): Alarm[] {
    return [...this.#standing.values()];
  }

  standingOf(guarantee: string): Alarm[] {
    return this.standing().filter((alarm) => alarm.guarantee === guarantee);
  }

  /** The condition of a rule holds (again): raises an alarm, or wakes the occurrence that has not ended. */
  raise(guarantee: Guarantee, rule: AlarmRule, at: EpochMs, grounds: () => AlarmGrounds): void {
    const known = this.#standing.get(this.#byRule.get(ruleKey(guarantee.id, rule.kind)) ?? 0);
    if (known) {
      this.#apply(known, { kind: 'condition-back', at }, 'again', at);
      return;
    }
    const alarm: Alarm = {
      id: this.#nextId,
      guarantee: guarantee.id,
      rule: rule.kind,
      priority: rule.priority,
      safetyRelevant: guarantee.safetyRelevant,
      raisedAt: at,
      times: 1,
      state: { kind: 'raised' },
      response: rule.response,
      grounds: grounds(),
    };
    this.#nextId += 1;
    this.#keep(alarm);
    this.#tell({ kind: 'alarm', at, change: 'raised', alarm });
  }

  /** The condition of a rule no longer holds. */
  returned(guarantee: string, rule: AlarmRule['kind'], at: EpochMs): void {
    const known = this.#standing.get(this.#byRule.get(ruleKey(guarantee, rule)) ?? 0);
    if (known) this.#apply(known, { kind: 'condition-gone', at }, 'returned', at);
  }

  /** @returns whether there was such an alarm to acknowledge */
  acknowledge(id: number, by: string, note: string, at: EpochMs): boolean {
    const known = this.#standing.get(id);
    if (!known || known.state.kind === 'acknowledged') return false;
    this.#apply(known, { kind: 'acknowledge', acknowledgement: { by, at, note } }, 'acknowledged', at);
    return true;
  }

  /** Gives alarms other ids, for decisions that were put into another order than they were made in. */
  renumber(ids: ReadonlyMap<number, number>): void {
    const standing = this.standing().map((alarm) => ({ ...alarm, id: ids.get(alarm.id) ?? alarm.id }));
    this.restore({ nextId: this.#nextId, standing: standing.sort((a, b) => a.id - b.id) });
  }

  snapshot(): AlarmDeskSnapshot {
    return { nextId: this.#nextId, standing: this.standing() };
  }

  restore(from: AlarmDeskSnapshot): void {
    this.#standing.clear();
    this.#byRule.clear();
    this.#nextId = from.nextId;
    for (const alarm of from.standing) this.#keep(alarm);
  }

  #apply(known: Alarm, event: AlarmEvent, change: 'again' | 'acknowledged' | 'returned', at: EpochMs): void {
    const state = nextAlarm(known.state, event);
    if (state === known.state) return;
    const alarm: Alarm = { ...known, state, times: known.times + (change === 'again' ? 1 : 0) };
    this.#keep(alarm);
    this.#tell({ kind: 'alarm', at, change: state.kind === 'ended' ? 'ended' : change, alarm });
  }

  #keep(alarm: Alarm): void {
    const key = ruleKey(alarm.guarantee, alarm.rule);
    if (alarm.state.kind === 'ended') {
      this.#standing.delete(alarm.id);
      this.#byRule.delete(key);
    } else {
      this.#standing.set(alarm.id, alarm);
      this.#byRule.set(key, alarm.id);
    }
  }
}

const ruleKey = (guarantee: string, rule: string): string => `${rule}\n${guarantee}`;
