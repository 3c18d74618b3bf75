import { type DetectorState, settled } from './change-detector.ts';
import { settle, strike } from './detector-levels.ts';
import type { DetectorTuning } from './detector-tuning.ts';

/**
 * How far the detector has gone on the way to its alarm, on a logarithmic scale.
 *
 * @returns [0, 1); 0 with nothing seen, 1 would be the alarm; NaN for a state that is not a number
 * @source own derivation: ln(1 + level / rest) over its value at the threshold
 */
export function detectorGauge(state: DetectorState, tuning: DetectorTuning): number {
  return Math.log1p(meanOf(settled(state, tuning)) / tuning.rest) / Math.log1p(tuning.threshold / tuning.rest);
}

/** More in a row than any detector needs that can alarm at all. */
const mostInRow = 100_000;

/**
 * Nonconforming units in a row that would raise the alarm from here.
 *
 * @param weight of the trial each is found in: 1 for units, the exposure of a record for a rate; above 0
 * @returns whole, 1 or more; Infinity where one nonconformity in each such exposure is no worse than the baseline
 * @source own derivation: each takes a level R to (R + weight) times its factor
 */
export function nonconformingToAlarm(state: DetectorState, tuning: DetectorTuning, weight = 1): number {
  const levels = settled(state, tuning);
  for (let inRow = 1; inRow < mostInRow; inRow++) {
    if (!(strike(levels, tuning, 1, weight) < tuning.threshold)) return inRow;
  }
  return Infinity;
}

/**
 * Conforming units in a row until the gauge is back at half way.
 *
 * @returns whole; 0 when it is there already; Infinity where the rest level itself lies beyond half way; NaN for a
 *   state that is not a number
 * @source own derivation: a level moves towards its rest as a power of its factor
 */
export function conformingToHalfWay(state: DetectorState, tuning: DetectorTuning): number {
  const half = tuning.rest * (Math.sqrt(1 + tuning.threshold / tuning.rest) - 1);
  const from = settled(state, tuning);
  const after = (units: number): number => {
    const levels = [...from];
    settle(levels, tuning, units, 1);
    return meanOf(levels);
  };
  if (meanOf(from) <= half) return 0;
  if (!(tuning.rest < half)) return Infinity;
  let high = 1;
  while (after(high) > half) high *= 2;
  if (!(after(high) <= half)) return NaN;
  let low = Math.floor(high / 2);
  while (low + 1 < high) {
    const middle = low + Math.floor((high - low) / 2);
    if (after(middle) <= half) high = middle;
    else low = middle;
  }
  return high;
}

function meanOf(levels: readonly number[]): number {
  return levels.reduce((sum, level) => sum + level, 0) / levels.length;
}
