import type { CusumTuning } from '../sequential/cusum.ts';
import { settle, strike } from '../sequential/detector-levels.ts';
import type { DetectorTuning } from '../sequential/detector-tuning.ts';
import type { WindowCall } from './window-run-length.ts';

/** A rule under simulation: moved in place, one step for each nonconforming unit. */
export interface Watch {
  /** Conforming units, then a nonconforming one; true when that one raises the alarm. */
  readonly strike: (conforming: number) => boolean;
  /** As if nothing had been seen. */
  readonly reset: () => void;
  /** Remembers where it stands. */
  readonly mark: () => void;
  /** Back to where `mark` was. */
  readonly back: () => void;
}

/** The mixture detector, through the same arithmetic as on the record path. */
export function detectorWatch(tuning: DetectorTuning): Watch {
  const levels = tuning.down.map(() => 0);
  const marked = [...levels];
  return {
    strike: (conforming) => {
      if (conforming > 0) settle(levels, tuning, conforming, 1);
      return !(strike(levels, tuning, 1, 1) < tuning.threshold);
    },
    reset: () => void levels.fill(0),
    mark: () => copyInto(marked, levels),
    back: () => copyInto(levels, marked),
  };
}

/** The cumulative sum. */
export function cusumWatch({ down, up, threshold }: CusumTuning): Watch {
  let sum = 0;
  let marked = 0;
  return {
    strike: (conforming) => {
      sum = Math.max(0, sum - conforming * down) + up - down;
      return !(sum < threshold);
    },
    reset: () => void (sum = 0),
    mark: () => void (marked = sum),
    back: () => void (sum = marked),
  };
}

/** The rule that calls when the last `units` units hold `count` nonconforming ones, looked at after every unit. */
export function windowWatch({ units, count }: WindowCall): Watch {
  const places = new Array<number>(count).fill(-Infinity);
  const marked = [...places];
  let now = 0;
  let oldest = 0;
  let markedNow = 0;
  let markedOldest = 0;
  return {
    strike: (conforming) => {
      now += conforming + 1;
      places[oldest] = now;
      oldest = (oldest + 1) % count;
      return now - (places[oldest] as number) < units;
    },
    reset: () => void places.fill(-Infinity),
    mark: () => {
      copyInto(marked, places);
      markedNow = now;
      markedOldest = oldest;
    },
    back: () => {
      copyInto(places, marked);
      now = markedNow;
      oldest = markedOldest;
    },
  };
}

function copyInto(to: number[], from: readonly number[]): void {
  for (let k = 0; k < from.length; k++) to[k] = from[k] as number;
}
