import { chainLower, chainUpper, type StationCount } from '../bound/chained-yield.ts';
import { demonstrationUnits } from '../bound/critical-count.ts';
import { lineOfYield } from '../bound/yield.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Tail } from '../units.ts';
import type { Assessment } from './assessment.ts';
import type { EvidenceState } from './evidence-state.ts';
import { levelsOf, movedIn } from './rule-levels.ts';

const none = { backFromCrossing: false, backFromViolation: false };

/** Judges a chain's yield by its bounds: there is no threshold in whole counts for several stations together. */
export class ChainRule {
  /** Units every station must have seen before even faultless ones could demonstrate the line. */
  readonly least: number;
  readonly #line: number;
  readonly #tail: Tail;
  readonly #opposite: Tail;
  readonly #backFromCrossing: number;
  readonly #backFromViolation: number;

  constructor(guarantee: Guarantee, line: number, target: number) {
    const { crossingDistance, violationDistance, violationTail } = levelsOf(guarantee);
    this.#line = line;
    this.#tail = guarantee.tail;
    this.#opposite = violationTail;
    this.#backFromCrossing = movedIn(line, target, crossingDistance);
    this.#backFromViolation = movedIn(line, target, violationDistance);
    this.least = demonstrationUnits(0, lineOfYield(line), guarantee.tail);
  }

  lower(stations: readonly StationCount[]): number {
    return chainLower(stations, this.#tail);
  }

  upper(stations: readonly StationCount[]): number {
    return chainUpper(stations, this.#opposite);
  }

  assess(stations: readonly StationCount[], ripe: boolean, waiting: boolean): Assessment {
    if (stations.some(({ inspected }) => inspected < this.least)) return { state: 'gathering', ...none };
    const lower = this.lower(stations);
    if (waiting || lower < this.#line) {
      const upper = this.upper(stations);
      const state = this.#state(lower, upper, ripe);
      return {
        state,
        backFromCrossing: state === 'demonstrated' && lower >= this.#backFromCrossing,
        backFromViolation: state !== 'violated' && upper >= this.#backFromViolation,
      };
    }
    return { state: this.#state(lower, 1, ripe), ...none };
  }

  #state(lower: number, upper: number, ripe: boolean): EvidenceState {
    if (!Number.isFinite(lower) || !Number.isFinite(upper)) return 'unknown';
    if (lower >= this.#line) return 'demonstrated';
    return ripe && upper < this.#line ? 'violated' : 'undecided';
  }
}
