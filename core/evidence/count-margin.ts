import type { Margin } from '../view/guarantee-view.ts';
import type { Thresholds } from './thresholds.ts';

/**
 * What a person can count off a window of units or of exposure.
 *
 * @param needed conforming units in a row until demonstrated, asked for only while it is not; Infinity where no row would do
 */
export function countMargin(thresholds: Thresholds, size: number, count: number, needed: () => number): Margin {
  const least = thresholds.sizeToDemonstrate(0);
  if (size < least) return { unitsToGather: Math.ceil(least - size) };
  if (size >= thresholds.sizeToDemonstrate(count)) {
    let more = 0;
    while (size >= thresholds.sizeToDemonstrate(count + more + 1)) more += 1;
    return { canTake: more };
  }
  const row = Math.ceil(needed());
  return Number.isFinite(row) ? { conformingToDemonstrate: row } : {};
}
