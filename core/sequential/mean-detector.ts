import { OutOfDomain, requireInside, requirePositive } from '../bound/out-of-domain.ts';
import { fault, ok, type Result } from '../result.ts';
import { type OutOfRange, unitCount } from '../units.ts';

/** Shifts of the mean the detector is on the watch for, in standard deviations; all weigh the same. */
export const usualShifts: readonly number[] = [0.25, 0.5, 1, 1.5, 2, 3];
/** Stakes on a bounded measurement, as shares of the largest stake that one value cannot ruin. */
export const usualStakes: readonly number[] = [0.05, 0.1, 0.2, 0.4, 0.75];

/** How a detector of a shifted mean is set. */
export interface MeanDetectorTuning {
  /** mean of the well line (or the guarantee line), in the unit of the measurement */
  readonly baseline: number;
  /** watches for a mean that has risen above the baseline or fallen below it */
  readonly watchesFor: 'risen' | 'fallen';
  readonly model:
    /** standard deviation known, or bounding the spread in the sub-Gaussian sense; shifts in standard deviations */
    | { readonly kind: 'known sigma'; readonly sigma: number; readonly shifts: readonly number[] }
    /** every measurement lies between two ends; shares of the largest stake */
    | { readonly kind: 'bounded'; readonly from: number; readonly to: number; readonly stakes: readonly number[] };
  /** measurements between false calls that are guaranteed, above 1 */
  readonly threshold: number;
}

/** What it remembers; plain data. */
export interface MeanDetectorState {
  readonly levels: readonly number[];
  readonly seen: number;
  readonly alarms: number;
  readonly alarmAt: number | undefined;
}

/**
 * A detector of a shifted mean that has seen nothing.
 *
 * @throws OutOfDomain naming the setting
 * @coverage run length: mean measurements to a false call at least `threshold`, while the mean given the past stays on
 *   the good side of the baseline
 * @source mixture Shiryaev-Roberts e-detector, J. Shin, A. Ramdas, A. Rinaldo (abstract read)
 */
export function newMeanDetector({ baseline, model, threshold }: MeanDetectorTuning): MeanDetectorState {
  if (!(threshold > 1 && threshold < Infinity)) throw new OutOfDomain('threshold', threshold, 'a finite number above 1');
  if (!Number.isFinite(baseline)) throw new OutOfDomain('baseline', baseline, 'a finite number');
  const sizes = sizesOf(model);
  if (sizes.length === 0) throw new OutOfDomain('shifts', sizes, 'one or more');
  for (const size of sizes) {
    if (model.kind === 'bounded') requireInside('stakes', size);
    else requirePositive('shifts', size);
  }
  if (model.kind === 'known sigma') requirePositive('sigma', model.sigma);
  else if (!(model.from < baseline && baseline < model.to)) throw new OutOfDomain('baseline', baseline, `above ${model.from} and below ${model.to}`);
  return { levels: sizes.map(() => 0), seen: 0, alarms: 0, alarmAt: undefined };
}

/**
 * The detector after one measurement.
 *
 * @param measurement finite; for a bounded one between its ends (checked where records come in)
 */
export function admitMean(state: MeanDetectorState, measurement: number, tuning: MeanDetectorTuning): MeanDetectorState {
  const { model } = tuning;
  const sizes = sizesOf(model);
  const off = offsetOf(measurement, tuning);
  const levels: number[] = [];
  let sum = 0;
  for (let k = 0; k < sizes.length; k++) {
    const size = sizes[k] as number;
    const factor = model.kind === 'bounded' ? 1 + size * off : Math.exp(size * (off - size / 2));
    const level = ((state.levels[k] as number) + 1) * factor;
    levels.push(level);
    sum += level;
  }
  const seen = state.seen + 1;
  if (sum / levels.length < tuning.threshold) return { levels, seen, alarms: state.alarms, alarmAt: state.alarmAt };
  return { levels: levels.map(() => 0), seen, alarms: state.alarms + 1, alarmAt: state.alarmAt ?? seen };
}

/** With its alarm taken down. */
export function clearMeanAlarm(state: MeanDetectorState): MeanDetectorState {
  return state.alarmAt === undefined ? state : { ...state, alarmAt: undefined };
}

/** How far it has gone on the way to its alarm, on a logarithmic scale, [0, 1). */
export function meanDetectorGauge(state: MeanDetectorState, tuning: MeanDetectorTuning): number {
  return Math.log1p(meanOf(state.levels)) / Math.log1p(tuning.threshold);
}

/** A stored detector, checked against its tuning. */
export function meanDetectorFrom(stored: Partial<MeanDetectorState>, tuning: MeanDetectorTuning): Result<MeanDetectorState, OutOfRange> {
  const { levels = [], alarmAt } = stored;
  const seen = unitCount(stored.seen ?? NaN, 'detector seen');
  if (!seen.ok) return seen;
  const alarms = unitCount(stored.alarms ?? NaN, 'detector alarms');
  if (!alarms.ok) return alarms;
  const wanted = sizesOf(tuning.model).length;
  const sound = levels.length === wanted && levels.every((level) => level >= 0 && level < Infinity);
  if (sound) return ok({ levels, seen: seen.value, alarms: alarms.value, alarmAt });
  return fault({ kind: 'out-of-range', what: 'detector levels', value: levels, expected: `${wanted} finite numbers, 0 or more` });
}

function sizesOf(model: MeanDetectorTuning['model']): readonly number[] {
  return model.kind === 'bounded' ? model.stakes : model.shifts;
}

/** How far a measurement lies on the watched side, in standard deviations, or in shares of the room on the other side. */
function offsetOf(measurement: number, { baseline, watchesFor, model }: MeanDetectorTuning): number {
  const risen = watchesFor === 'risen';
  const off = risen ? measurement - baseline : baseline - measurement;
  if (model.kind === 'known sigma') return off / model.sigma;
  return off / (risen ? baseline - model.from : model.to - baseline);
}

function meanOf(levels: readonly number[]): number {
  return levels.reduce((sum, level) => sum + level, 0) / levels.length;
}
