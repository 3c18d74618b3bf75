import { fault, ok, type Result } from '../result.ts';
import { type OutOfRange, unitCount } from '../units.ts';
import { settle, strike } from './detector-levels.ts';
import type { DetectorTuning } from './detector-tuning.ts';

/**
 * What a detector of a risen rate remembers. Plain data. Trials in which nothing was found are only
 * counted; the levels move when something is found. So the state depends on the stream alone, to the
 * last bit, and not on how it was cut into batches.
 */
export interface DetectorState {
  /** one per ratio, as they stood after the last trial with something in it */
  readonly levels: readonly number[];
  /** trials since then in which nothing was found, each of weight `quietWeight` */
  readonly quietTrials: number;
  readonly quietWeight: number;
  /** units (or exposure) seen in all */
  readonly seen: number;
  readonly alarms: number;
  /** where (in units or exposure seen) the alarm that still stands was raised; undefined while none stands */
  readonly alarmAt: number | undefined;
}

/** A detector that has seen nothing. */
export function newDetector(tuning: DetectorTuning): DetectorState {
  return { levels: tuning.down.map(() => 0), quietTrials: 0, quietWeight: 1, seen: 0, alarms: 0, alarmAt: undefined };
}

/**
 * The detector after trials in which nothing was found: conforming units one by one (weight 1), or
 * batches or exposures of one weight each. One step, however many; it cannot alarm here.
 *
 * @param trials whole, 0 or more
 * @param weight units or exposure of each, above 0
 */
export function admitQuiet(state: DetectorState, trials: number, tuning: DetectorTuning, weight = 1): DetectorState {
  if (trials === 0) return state;
  const { alarms, alarmAt } = state;
  const seen = state.seen + trials * weight;
  const going = weight === state.quietWeight;
  const levels = going ? state.levels : settled(state, tuning);
  return { levels, quietTrials: going ? state.quietTrials + trials : trials, quietWeight: weight, seen, alarms, alarmAt };
}

/**
 * The detector after one trial with something found: one nonconforming unit (found 1, weight 1), a
 * batch with its count, or an exposure with its nonconformities. When the threshold is reached the
 * alarm is counted, stands until `clearAlarm`, and the levels begin anew.
 *
 * @param found whole, 1 or more
 * @param weight units or exposure of the trial, above 0; it must not depend on what was found in it
 */
export function admitFound(state: DetectorState, found: number, tuning: DetectorTuning, weight = 1): DetectorState {
  const levels = settled(state, tuning);
  const level = strike(levels, tuning, found, weight);
  const seen = state.seen + weight;
  const { alarms, alarmAt } = state;
  if (level < tuning.threshold) return { levels, quietTrials: 0, quietWeight: weight, seen, alarms, alarmAt };
  levels.fill(0);
  return { levels, quietTrials: 0, quietWeight: weight, seen, alarms: alarms + 1, alarmAt: alarmAt ?? seen };
}

/** The detector after conforming units and then a nonconforming one. */
export function admitRun(state: DetectorState, conforming: number, tuning: DetectorTuning): DetectorState {
  return admitFound(admitQuiet(state, conforming, tuning), 1, tuning);
}

/** The detector with its alarm taken down, by a person or by the rule that returns it to normal. */
export function clearAlarm(state: DetectorState): DetectorState {
  return state.alarmAt === undefined ? state : { ...state, alarmAt: undefined };
}

/** The levels as they stand now, one per ratio, in a new array. */
export function settled(state: DetectorState, tuning: DetectorTuning): number[] {
  const levels = state.levels.slice();
  if (state.quietTrials > 0) settle(levels, tuning, state.quietTrials, state.quietWeight);
  return levels;
}

/** A stored detector, checked against its tuning. */
export function detectorFrom(stored: Partial<DetectorState>, tuning: DetectorTuning): Result<DetectorState, OutOfRange> {
  const { levels = [], quietWeight = NaN, seen = NaN, alarmAt } = stored;
  const trials = unitCount(stored.quietTrials ?? NaN, 'detector quiet trials');
  if (!trials.ok) return trials;
  const alarms = unitCount(stored.alarms ?? NaN, 'detector alarms');
  if (!alarms.ok) return alarms;
  const wanted = tuning.down.length;
  const sound = levels.length === wanted && levels.every((level) => level >= 0 && level < Infinity);
  if (!sound) return fault({ kind: 'out-of-range', what: 'detector levels', value: levels, expected: `${wanted} finite numbers, 0 or more` });
  if (quietWeight > 0 && seen >= (alarmAt ?? 0) && seen < Infinity) {
    return ok({ levels, quietTrials: trials.value, quietWeight, seen, alarms: alarms.value, alarmAt });
  }
  return fault({ kind: 'out-of-range', what: 'detector seen', value: seen, expected: 'a finite number, 0 or more, with a weight above 0' });
}
