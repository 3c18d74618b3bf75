import { OutOfDomain, requireInside, requirePositive } from '../bound/out-of-domain.ts';
import { fault, ok, type Result } from '../result.ts';
import { type OutOfRange, unitCount } from '../units.ts';

/** How a cumulative sum is set: what each unit takes off, what each nonconforming unit adds, where it alarms. */
export interface CusumTuning {
  /** taken off for each unit (or unit of exposure), above 0 */
  readonly down: number;
  /** added for each nonconforming unit (or nonconformity), above `down` for units */
  readonly up: number;
  readonly threshold: number;
}

/**
 * A cumulative sum of log likelihood ratios that watches for one size of change of a fraction.
 *
 * @param baseline above 0, below 1
 * @param ratio size of change it is tuned to, above 1, with ratio * baseline below 1
 * @param threshold above 0; see `cusumThreshold` for the one that gives a wanted run length
 * @throws OutOfDomain
 * @source E. S. Page 1954 (memory)
 */
export function fractionCusum(baseline: number, ratio: number, threshold: number): CusumTuning {
  requireInside('baseline', baseline);
  requirePositive('threshold', threshold);
  if (!(ratio > 1 && ratio * baseline < 1)) throw new OutOfDomain('ratio', ratio, `a number above 1 and below ${1 / baseline}`);
  const down = Math.log1p(-baseline) - Math.log1p(-ratio * baseline);
  return { down, up: Math.log(ratio) + down, threshold };
}

/** The same for a rate of nonconformities per unit of exposure, baseline above 0. */
export function rateCusum(baseline: number, ratio: number, threshold: number): CusumTuning {
  requirePositive('baseline', baseline);
  requirePositive('threshold', threshold);
  if (!(ratio > 1 && ratio < Infinity)) throw new OutOfDomain('ratio', ratio, 'a finite number above 1');
  return { down: (ratio - 1) * baseline, up: Math.log(ratio), threshold };
}

/** What a cumulative sum remembers; plain data, moved only where something was found, as `DetectorState`. */
export interface CusumState {
  /** as it stood after the last trial with something in it */
  readonly sum: number;
  readonly quietTrials: number;
  readonly quietWeight: number;
  readonly seen: number;
  readonly alarms: number;
  readonly alarmAt: number | undefined;
}

/** A cumulative sum that has seen nothing. */
export const newCusum: CusumState = { sum: 0, quietTrials: 0, quietWeight: 1, seen: 0, alarms: 0, alarmAt: undefined };

/** After trials in which nothing was found, in one step; arguments as of `admitQuiet` of the detector. */
export function admitQuietCusum(state: CusumState, trials: number, tuning: CusumTuning, weight = 1): CusumState {
  if (trials === 0) return state;
  const seen = state.seen + trials * weight;
  if (weight === state.quietWeight) return { ...state, quietTrials: state.quietTrials + trials, seen };
  return { ...state, sum: cusumNow(state, tuning), quietTrials: trials, quietWeight: weight, seen };
}

/** After one trial with something found; arguments as of `admitFound` of the detector. An alarm takes the sum to 0. */
export function admitFoundCusum(state: CusumState, found: number, tuning: CusumTuning, weight = 1): CusumState {
  const sum = Math.max(0, cusumNow(state, tuning) + found * tuning.up - weight * tuning.down);
  const seen = state.seen + weight;
  const next = { ...state, sum, quietTrials: 0, quietWeight: weight, seen };
  if (sum < tuning.threshold) return next;
  return { ...next, sum: 0, alarms: state.alarms + 1, alarmAt: state.alarmAt ?? seen };
}

/** With its alarm taken down. */
export function clearCusumAlarm(state: CusumState): CusumState {
  return state.alarmAt === undefined ? state : { ...state, alarmAt: undefined };
}

/** The sum as it stands now. */
export function cusumNow(state: CusumState, tuning: CusumTuning): number {
  return Math.max(0, state.sum - state.quietTrials * state.quietWeight * tuning.down);
}

/** Share of the way to the alarm, [0, 1). */
export function cusumGauge(state: CusumState, tuning: CusumTuning): number {
  return cusumNow(state, tuning) / tuning.threshold;
}

/** Nonconforming units in a row that would raise the alarm from here; whole, 1 or more. */
export function nonconformingToCusumAlarm(state: CusumState, tuning: CusumTuning): number {
  return Math.max(1, Math.ceil((tuning.threshold - cusumNow(state, tuning)) / (tuning.up - tuning.down)));
}

/** Conforming units in a row until the gauge is back at half way; whole, 0 when it is there already. */
export function conformingToCusumHalfWay(state: CusumState, tuning: CusumTuning): number {
  return Math.max(0, Math.ceil((cusumNow(state, tuning) - tuning.threshold / 2) / tuning.down));
}

/** A stored cumulative sum, checked. */
export function cusumFrom(stored: Partial<CusumState>): Result<CusumState, OutOfRange> {
  const { sum = NaN, quietWeight = NaN, seen = NaN, alarmAt } = stored;
  const trials = unitCount(stored.quietTrials ?? NaN, 'cumulative sum quiet trials');
  if (!trials.ok) return trials;
  const alarms = unitCount(stored.alarms ?? NaN, 'cumulative sum alarms');
  if (!alarms.ok) return alarms;
  if (sum >= 0 && sum < Infinity && quietWeight > 0 && seen >= (alarmAt ?? 0) && seen < Infinity) {
    return ok({ sum, quietTrials: trials.value, quietWeight, seen, alarms: alarms.value, alarmAt });
  }
  return fault({ kind: 'out-of-range', what: 'cumulative sum', value: sum, expected: 'a finite number, 0 or more, with what was seen' });
}
