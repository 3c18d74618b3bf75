import type { Assessment } from './assessment.ts';
import type { EvidenceState } from './evidence-state.ts';
import type { Judge } from './judge.ts';
import type { Thresholds } from './thresholds.ts';

/** The thresholds one guarantee on counts is judged by. */
export interface JudgeThresholds {
  /** Of the bound against the guarantee line. */
  readonly line: Thresholds;
  /** Of the opposite bound against the line, at the violation rule's level. */
  readonly opposite: Thresholds;
  /** Of the bound against the line moved in by the crossing rule's return distance. */
  readonly backFromCrossing: Thresholds;
  /** Of the opposite bound against the line moved in by the violation rule's return distance. */
  readonly backFromViolation: Thresholds;
  /**
   * Counts per size: an estimate at or above the first is never demonstrated, one at or below the second never
   * violated, so that a very bad line needs no threshold a count. Both are the line where the bound is not corrected; 0 where
   * this does not hold.
   */
  readonly neverDemonstrated: number;
  readonly neverViolated: number;
  /** Smallest size at which so few are a contradiction: the state is unknown. */
  readonly contradicted?: Thresholds | undefined;
}

const stateAlone = (state: EvidenceState): Assessment => ({ state, backFromCrossing: false, backFromViolation: false });
const plain: Readonly<Record<EvidenceState, Assessment>> = {
  gathering: stateAlone('gathering'),
  demonstrated: stateAlone('demonstrated'),
  undecided: stateAlone('undecided'),
  violated: stateAlone('violated'),
  unknown: stateAlone('unknown'),
};

/**
 * Judges 'count nonconforming in size inspected' against a guarantee line by comparing sizes, whole or not.
 */
export class CountJudge implements Judge {
  readonly #by: JudgeThresholds;
  #sureCount = 0;
  #sureSize = 0;

  constructor({ line, opposite, backFromCrossing, backFromViolation, neverDemonstrated, neverViolated, contradicted }: JudgeThresholds) {
    this.#by = { line, opposite, backFromCrossing, backFromViolation, neverDemonstrated, neverViolated, contradicted };
  }

  state(size: number, count: number, ripe: boolean): EvidenceState {
    if (!Number.isFinite(size) || !Number.isFinite(count)) return 'unknown';
    if (this.#by.contradicted !== undefined && size >= this.#by.contradicted.sizeToDemonstrate(count)) return 'unknown';
    if (size < this.#by.line.sizeToDemonstrate(0)) return 'gathering';
    if (this.#demonstrated(this.#by.line, size, count)) return 'demonstrated';
    return ripe && this.#violated(size, count) ? 'violated' : 'undecided';
  }

  assess(size: number, count: number, ripe: boolean, waiting: boolean): Assessment {
    const state = this.state(size, count, ripe);
    if (!waiting) return plain[state];
    return {
      state,
      backFromCrossing: state === 'demonstrated' && this.#demonstrated(this.#by.backFromCrossing, size, count),
      backFromViolation: state !== 'violated' && (count <= size * this.#by.neverViolated || size > this.#by.backFromViolation.sizeViolated(count)),
    };
  }

  nextSize(size: number, count: number): number {
    const { line, backFromCrossing, backFromViolation, neverDemonstrated, neverViolated, contradicted } = this.#by;
    let next = Infinity;
    const consider = (candidate: number): void => {
      if (candidate > size && candidate < next) next = candidate;
    };
    consider(line.sizeToDemonstrate(0));
    if (contradicted !== undefined) consider(contradicted.sizeToDemonstrate(count));
    const hopeless = neverDemonstrated > 0 && size < count / neverDemonstrated;
    if (hopeless) consider(Math.max(size + 1, Math.floor(count / neverDemonstrated)));
    else {
      consider(line.sizeToDemonstrate(count));
      consider(backFromCrossing.sizeToDemonstrate(count));
    }
    if (count > size * neverViolated) {
      const sure = count >= this.#sureCount && size <= this.#sureSize;
      consider((sure ? this.#sureSize : this.#by.opposite.sizeViolated(count)) + 1);
      if (!sure) consider(backFromViolation.sizeViolated(count) + 1);
    }
    return next;
  }

  #demonstrated(by: Thresholds, size: number, count: number): boolean {
    if (this.#by.neverDemonstrated > 0 && count >= size * this.#by.neverDemonstrated) return false;
    return size >= by.sizeToDemonstrate(count);
  }

  /** More nonconforming units in fewer inspected are no better: one known violation answers for all beyond it. */
  #violated(size: number, count: number): boolean {
    if (count <= size * this.#by.neverViolated) return false;
    if (count >= this.#sureCount && size <= this.#sureSize) return true;
    const largest = this.#by.opposite.sizeViolated(count);
    if (size > largest) return false;
    this.#sureCount = count;
    this.#sureSize = largest;
    return true;
  }
}
