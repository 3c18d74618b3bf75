import type { Assessment } from '../evidence/assessment.ts';
import type { Bounds } from '../evidence/evidence.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Margin } from '../view/guarantee-view.ts';
import { runAssessment } from './run-assessment.ts';
import type { CountChange } from './run-evidence.ts';
import type { RunRule } from './run-rule.ts';

export interface CountRunSnapshot {
  readonly size: number;
  readonly count: number;
}

const noBounds: Bounds = { estimate: undefined, bound: undefined, opposite: undefined };

/** More nonconforming units in a row than any line makes. */
const mostMore = 2 ** 40;

/** 'Count in size' of a run, and what its rule says of it. */
export class CountRun {
  #rule: RunRule;
  #size = 0;
  #count = 0;
  #assessment: Assessment;

  constructor(rule: RunRule) {
    this.#rule = rule;
    this.#assessment = this.assessAt(0, 0);
  }

  get rule(): RunRule {
    return this.#rule;
  }

  get size(): number {
    return this.#size;
  }

  get count(): number {
    return this.#count;
  }

  get assessment(): Assessment {
    return this.#assessment;
  }

  /** Judges by another rule from now on: a lot of another size. */
  useRule(rule: RunRule): void {
    this.#rule = rule;
    this.#assessment = this.assessAt(this.#size, this.#count);
  }

  /** @returns whether the assessment changed */
  add(size: number, count: number): boolean {
    this.#size += size;
    this.#count += count;
    const before = this.#assessment;
    this.#assessment = this.assessAt(this.#size, this.#count);
    return this.#assessment !== before;
  }

  /**
   * Adds conforming units, up to the first at which the assessment changes.
   *
   * @returns how many were added, 1 to units
   */
  addConforming(units: number): number {
    const before = this.#assessment;
    const [from, count] = [this.#size, this.#count];
    if (!this.add(units, 0)) return units;
    // Every part of an assessment goes one way with the size, so the first change can be searched for.
    const step = units === 1 ? 1 : lastWhere((more) => this.assessAt(from + more, count) === before, 1, units - 1, units / 2) + 1;
    this.#size = from + step;
    this.#assessment = this.assessAt(this.#size, count);
    return step;
  }

  correct({ size, count }: CountChange): void {
    this.add(size, count);
  }

  clear(): void {
    [this.#size, this.#count] = [0, 0];
    this.#assessment = this.assessAt(0, 0);
  }

  /** A violation is proven whenever it is, also while a demonstration could not be yet. */
  assessAt(size: number, count: number): Assessment {
    const { least, demonstrated, notViolated, backFromCrossing, backFromViolation, most } = this.#rule;
    if (!Number.isFinite(size) || !Number.isFinite(count) || size > most || count < 0 || size < 0) return runAssessment('unknown', false, false);
    if (!notViolated.holds(size, count)) return runAssessment('violated', false, false);
    const back = backFromViolation.holds(size, count);
    if (demonstrated.holds(size, count)) return runAssessment('demonstrated', backFromCrossing.holds(size, count), back);
    return runAssessment(size < least ? 'gathering' : 'undecided', false, back);
  }

  lnDemonstrated(): number {
    return this.#sound() ? this.#rule.lnDemonstrated(this.#size, this.#count) : NaN;
  }

  lnViolated(): number {
    return this.#sound() ? this.#rule.lnViolated(this.#size, this.#count) : NaN;
  }

  bounds(asYield: boolean): Bounds {
    if (!this.#sound() || this.#size === 0) return noBounds;
    const { upper, lower, per } = this.#rule;
    const estimate = (this.#count / this.#size) * per;
    const [bound, opposite] = [upper(this.#size, this.#count), lower(this.#size, this.#count)];
    return asYield ? { estimate: 1 - estimate, bound: 1 - bound, opposite: 1 - opposite } : { estimate, bound, opposite };
  }

  /** @param each size a nonconforming unit, or a conforming one, brings with it: 1 unit, a record's exposure */
  margin(each: number): Margin {
    if (!this.#sound()) return {};
    const { least, demonstrated, sizeToDemonstrate, most } = this.#rule;
    const [size, count] = [this.#size, this.#count];
    if (size < least && notMore(least, most)) return inUnits('unitsToGather', (least - size) / each);
    if (!demonstrated.holds(size, count)) {
      const wanted = sizeToDemonstrate(count);
      return notMore(wanted, most) ? inUnits('conformingToDemonstrate', (wanted - size) / each) : {};
    }
    const stands = (more: number): boolean => size + more * each <= most && demonstrated.holds(size + more * each, count + more);
    return { canTake: Math.max(0, lastWhere(stands, 1, mostMore, 1)) };
  }

  snapshot(): CountRunSnapshot {
    return { size: this.#size, count: this.#count };
  }

  restore({ size, count }: CountRunSnapshot): void {
    [this.#size, this.#count] = [size, count];
    this.#assessment = this.assessAt(size, count);
  }

  #sound(): boolean {
    return this.#assessment.state !== 'unknown';
  }
}

const notMore = (size: number, most: number): boolean => Number.isFinite(size) && size <= most;

function inUnits(name: 'unitsToGather' | 'conformingToDemonstrate', units: number): Margin {
  return Number.isFinite(units) ? { [name]: Math.ceil(units) } : {};
}
