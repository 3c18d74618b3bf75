import { admitFound, admitQuiet, clearAlarm, newDetector, settled, type DetectorState } from '../sequential/change-detector.ts';
import {
  admitFoundCusum, admitQuietCusum, clearCusumAlarm, conformingToCusumHalfWay, cusumGauge, cusumNow, newCusum, nonconformingToCusumAlarm,
  type CusumState, type CusumTuning,
} from '../sequential/cusum.ts';
import { conformingToHalfWay, detectorGauge, nonconformingToAlarm } from '../sequential/detector-reading.ts';
import type { DetectorTuning } from '../sequential/detector-tuning.ts';

/** What every detector on counts remembers beside its levels. */
interface Counting {
  readonly quietTrials: number;
  readonly alarms: number;
  readonly alarmAt: number | undefined;
}

/** One kind of detector on counts: pure steps on plain state. */
export interface DetectorArithmetic<S extends Counting> {
  readonly fresh: S;
  readonly quiet: (state: S, trials: number, weight: number) => S;
  /** Begins anew at an alarm. */
  readonly found: (state: S, found: number, weight: number) => S;
  /** Goes on through an alarm, and stands at the threshold at most. */
  readonly held: (state: S, found: number, weight: number) => S;
  readonly cleared: (state: S) => S;
  readonly gauge: (state: S) => number;
  readonly inARow: (state: S, weight: number) => number;
  readonly toHalfWay: (state: S) => number;
}

/** The mixture Shiryaev–Roberts detector. */
export function mixtureArithmetic(tuning: DetectorTuning): DetectorArithmetic<DetectorState> {
  const endless: DetectorTuning = { ...tuning, threshold: Infinity };
  return {
    fresh: newDetector(tuning),
    quiet: (state, trials, weight) => admitQuiet(state, trials, tuning, weight),
    found: (state, found, weight) => admitFound(state, found, tuning, weight),
    held: (state, found, weight) => {
      const next = admitFound(state, found, endless, weight);
      const level = meanOf(settled(next, tuning));
      if (level <= tuning.threshold) return next;
      return { ...next, levels: next.levels.map((one) => one * (tuning.threshold / level)) };
    },
    cleared: clearAlarm,
    gauge: (state) => detectorGauge(state, tuning),
    inARow: (state, weight) => nonconformingToAlarm(state, tuning, weight),
    toHalfWay: (state) => conformingToHalfWay(state, tuning),
  };
}

/** The cumulative sum. */
export function cusumArithmetic(tuning: CusumTuning): DetectorArithmetic<CusumState> {
  const endless: CusumTuning = { ...tuning, threshold: Infinity };
  return {
    fresh: newCusum,
    quiet: (state, trials, weight) => admitQuietCusum(state, trials, tuning, weight),
    found: (state, found, weight) => admitFoundCusum(state, found, tuning, weight),
    held: (state, found, weight) => {
      const next = admitFoundCusum(state, found, endless, weight);
      return cusumNow(next, tuning) <= tuning.threshold ? next : { ...next, sum: tuning.threshold };
    },
    cleared: clearCusumAlarm,
    gauge: (state) => cusumGauge(state, tuning),
    inARow: (state) => nonconformingToCusumAlarm(state, tuning),
    toHalfWay: (state) => conformingToCusumHalfWay(state, tuning),
  };
}

function meanOf(levels: readonly number[]): number {
  return levels.reduce((sum, level) => sum + level, 0) / levels.length;
}
