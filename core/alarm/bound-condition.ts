import type { Assessment } from '../evidence/assessment.ts';
import type { ReturnRule } from '../plant/guarantee.ts';

/** What a restart keeps of a condition; plain data. `goodSince` is -1 while not good. */
export interface BoundConditionSnapshot {
  readonly active: boolean;
  readonly armed: boolean;
  readonly goodSince: number;
}

export type ConditionChange = 'begins' | 'ends' | undefined;

/**
 * The condition behind a crossing or violation alarm, with hysteresis (rules A6 to A9): it begins at once, and
 * ends only when the bound has been back by the stated distance for the stated number of units in a row.
 * Positions are counts of units admitted since the watch began; they only rise.
 */
export class BoundCondition {
  readonly #kind: 'crossing' | 'violation';
  readonly #units: number;
  #active = false;
  #armed = false;
  #goodSince = -1;

  constructor(kind: 'crossing' | 'violation', rule: ReturnRule) {
    this.#kind = kind;
    this.#units = rule.units;
  }

  get active(): boolean {
    return this.#active;
  }

  /** Weighs an assessment made after the unit at `position`. */
  weigh(now: Assessment, position: number): ConditionChange {
    if (now.state === 'unknown') return this.#unknown();
    if (!this.#active) return this.#whileQuiet(now);
    const good = this.#kind === 'crossing' ? now.state === 'demonstrated' && now.backFromCrossing : now.state !== 'violated' && now.backFromViolation;
    if (!good) {
      this.#goodSince = -1;
      return undefined;
    }
    if (this.#goodSince < 0) this.#goodSince = position;
    return position - this.#goodSince >= this.#units ? this.#end() : undefined;
  }

  /** The evidence was restarted on purpose: what was demonstrated before is not lost by it, so nothing crosses. */
  disarm(): void {
    this.#armed = false;
    this.#goodSince = -1;
  }

  /** Position at which waiting alone would end the condition; Infinity where nothing waits. */
  dueAt(): number {
    return this.#active && this.#goodSince >= 0 ? this.#goodSince + this.#units : Infinity;
  }

  snapshot(): BoundConditionSnapshot {
    return { active: this.#active, armed: this.#armed, goodSince: this.#goodSince };
  }

  restore(from: BoundConditionSnapshot): void {
    this.#active = from.active;
    this.#armed = from.armed;
    this.#goodSince = from.goodSince;
  }

  /** Missing or contradictory data clear nothing and raise nothing; units in a row begin anew. */
  #unknown(): undefined {
    this.#goodSince = -1;
    return undefined;
  }

  #whileQuiet(now: Assessment): ConditionChange {
    if (this.#kind === 'violation') return now.state === 'violated' ? this.#begin() : undefined;
    switch (now.state) {
      case 'demonstrated':
        this.#armed = true;
        return undefined;
      case 'undecided':
      case 'violated':
        return this.#armed ? this.#begin() : undefined;
      case 'gathering':
      case 'unknown':
        return undefined;
    }
  }

  #begin(): 'begins' {
    this.#active = true;
    this.#armed = false;
    this.#goodSince = -1;
    return 'begins';
  }

  #end(): 'ends' {
    this.#active = false;
    this.#armed = this.#kind === 'crossing';
    this.#goodSince = -1;
    return 'ends';
  }
}
