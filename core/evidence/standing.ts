import type { AlarmGrounds } from '../alarm/alarm.ts';
import type { AlarmDesk } from '../alarm/alarm-desk.ts';
import { BoundCondition, type BoundConditionSnapshot } from '../alarm/bound-condition.ts';
import type { Happening } from '../monitor/happening.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import { decided } from '../run/decided.ts';
import type { Assessment } from './assessment.ts';
import type { EvidenceState } from './evidence-state.ts';
import type { Moment } from './moment.ts';

/** What a standing needs from its surroundings; the same for all guarantees of a monitor. */
export interface Surroundings {
  readonly tell: (happening: Happening) => void;
  readonly desk: AlarmDesk;
}

/** Figures and records behind the present assessment, asked for only when something is told. */
export interface Grounding {
  figures(): Readonly<Record<string, number>>;
  grounds(rule: AlarmRule['kind'], moment: Moment): AlarmGrounds;
}

export interface StandingSnapshot {
  readonly state: EvidenceState;
  readonly since: number;
  readonly blocked: readonly (readonly [string, string])[];
  readonly conditions: readonly BoundConditionSnapshot[];
}

type BoundRule = Extract<AlarmRule, { kind: 'crossing' | 'violation' }>;
interface WatchedRule {
  readonly rule: BoundRule;
  readonly condition: BoundCondition;
}

const nothing: Assessment = { state: 'unknown', backFromCrossing: false, backFromViolation: false };

/** Where the evidence of one guarantee stands, and the alarms that follow from it. */
export class Standing {
  readonly #guarantee: Guarantee;
  readonly #around: Surroundings;
  readonly #grounding: Grounding;
  readonly #watched: readonly WatchedRule[];
  /** Why the state is unknown although the figures could be judged, by cause. */
  readonly #blocked = new Map<string, string>();
  #run: Assessment | undefined;
  #state: EvidenceState = 'gathering';
  #since = 0;

  constructor(guarantee: Guarantee, around: Surroundings, grounding: Grounding) {
    this.#guarantee = guarantee;
    this.#around = around;
    this.#grounding = grounding;
    this.#watched = guarantee.rules
      .filter((rule): rule is BoundRule => rule.kind === 'crossing' || rule.kind === 'violation')
      .map((rule) => ({ rule, condition: new BoundCondition(rule.kind, rule.return) }));
  }

  get state(): EvidenceState {
    return this.#state;
  }

  /** Since when the state is what it is, ms; 0 before the first record. */
  get since(): number {
    return this.#since;
  }

  /** Why it is unknown, if something blocks it. */
  get remark(): string | undefined {
    return this.#blocked.values().next().value;
  }

  /** What the evidence of the run says from now on, where it takes part in the decision. Weigh again afterwards. */
  runSays(assessment: Assessment | undefined): void {
    this.#run = assessment;
  }

  /** Weighs what the figures say after the unit at `position`; tells every change. */
  weigh(figures: Assessment, position: number, moment: Moment): void {
    const now = this.#blocked.size > 0 ? nothing : decided(this.#guarantee.looks, figures, this.#run);
    if (now.state !== this.#state) this.#change(now.state, moment);
    for (const { rule, condition } of this.#watched) {
      const change = condition.weigh(now, position);
      if (change === 'begins') this.#around.desk.raise(this.#guarantee, rule, moment.at, () => this.#grounding.grounds(rule.kind, moment));
      if (change === 'ends') this.#around.desk.returned(this.#guarantee.id, rule.kind, moment.at);
    }
  }

  /** Whether a raised condition waits for its return, so that an assessment must tell the distances too. */
  get waiting(): boolean {
    return this.#watched.some(({ condition }) => condition.active);
  }

  /** Position at which an alarm's units in a row are complete, if nothing else happens; Infinity if none waits. */
  dueAt(): number {
    let due = Infinity;
    for (const { condition } of this.#watched) due = Math.min(due, condition.dueAt());
    return due;
  }

  /** From now on the state is unknown for this cause, until it is lifted. Weigh again afterwards. */
  block(cause: string, why: string): void {
    this.#blocked.set(cause, why);
  }

  lift(cause: string): void {
    this.#blocked.delete(cause);
  }

  isBlockedBy(cause: string): boolean {
    return this.#blocked.has(cause);
  }

  /** Evidence begins anew at a declared event: that no demonstration stands any more is no crossing. */
  beginAnew(): void {
    for (const { condition } of this.#watched) condition.disarm();
  }

  snapshot(): StandingSnapshot {
    return {
      state: this.#state,
      since: this.#since,
      blocked: [...this.#blocked],
      conditions: this.#watched.map(({ condition }) => condition.snapshot()),
    };
  }

  restore(from: StandingSnapshot): void {
    this.#state = from.state;
    this.#since = from.since;
    this.#blocked.clear();
    for (const [cause, why] of from.blocked) this.#blocked.set(cause, why);
    from.conditions.forEach((kept, index) => this.#watched[index]?.condition.restore(kept));
  }

  #change(to: EvidenceState, moment: Moment): void {
    const from = this.#state;
    this.#state = to;
    this.#since = moment.at;
    this.#around.tell({
      kind: 'evidence',
      at: moment.at,
      guarantee: this.#guarantee.id,
      from,
      to,
      source: moment.source,
      sequence: moment.sequence,
      figures: this.#grounding.figures(),
    });
  }
}
