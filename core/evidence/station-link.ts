import type { Assessment } from './assessment.ts';
import type { CountRule } from './count-rule.ts';
import type { Moment } from './moment.ts';
import type { Weighing } from './weighing.ts';

/** Units of one station after which its chain is weighed at the latest while its window grows or an alarm waits. */
export const weighedEvery = 64;

const nothing: Assessment = { state: 'unknown', backFromCrossing: false, backFromViolation: false };

/** A station judges nothing by itself: it only says when its counts are worth weighing. */
export const stationRule: CountRule = {
  per: 1,
  thresholds: { sizeToDemonstrate: () => 1, sizeViolated: () => 0 },
  judge: {
    assess: () => nothing,
    nextSize: (size) => size - (size % weighedEvery) + weighedEvery,
  },
  upper: () => NaN,
  lower: () => NaN,
};

/** Hands a station's weighings on to the chain it belongs to. */
export class StationLink implements Weighing {
  readonly #weigh: (moment: Moment) => void;
  readonly #waits: () => boolean;
  #position = 0;

  constructor(weigh: (moment: Moment) => void, waits: () => boolean) {
    this.#weigh = weigh;
    this.#waits = waits;
  }

  /** The station is never asked for distances: the chain is. */
  get waiting(): boolean {
    return false;
  }

  weigh(_assessment: Assessment, position: number, moment: Moment): void {
    this.#position = position;
    this.#weigh(moment);
  }

  dueAt(): number {
    return this.#waits() ? this.#position - (this.#position % weighedEvery) + weighedEvery : Infinity;
  }

  beginAnew(): void {
    // The chain begins anew once for all its stations.
  }
}
