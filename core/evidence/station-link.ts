import type { Assessment } from './assessment.ts';
import type { CountRule } from './count-rule.ts';
import type { Moment } from './moment.ts';
import type { Weighing } from './weighing.ts';

/** Units of one station after which its chain is weighed at the latest. */
export const weighedEvery = 64;

const nothing: Assessment = { state: 'unknown', backFromCrossing: false, backFromViolation: false };

/** A station judges nothing by itself: it only says that its counts have changed. */
export const stationRule: CountRule = {
  per: 1,
  thresholds: { sizeToDemonstrate: () => 1, sizeViolated: () => 0 },
  judge: {
    assess: () => nothing,
    nextSize: () => Infinity,
  },
  upper: () => NaN,
  lower: () => NaN,
};

/** Hands a station's weighings on to the chain it belongs to. */
export class StationLink implements Weighing {
  readonly #weigh: (moment: Moment) => void;
  readonly #moveFirst: (at: number) => void;

  constructor(weigh: (moment: Moment) => void, moveFirst: (at: number) => void) {
    this.#weigh = weigh;
    this.#moveFirst = moveFirst;
  }

  /** The station is never asked for distances: the chain is. */
  get waiting(): boolean {
    return false;
  }

  weigh(_assessment: Assessment, _position: number, moment: Moment): void {
    this.#weigh(moment);
  }

  dueAt(position: number): number {
    return position - (position % weighedEvery) + weighedEvery;
  }

  moveFirst(at: number): void {
    this.#moveFirst(at);
  }

  beginAnew(): void {
    // The chain begins anew once for all its stations.
  }
}
