import { gammaUpperTail } from '../numerics/gamma-tail.ts';
import { OutOfDomain, requireWhole } from './out-of-domain.ts';

/** Units judged under the same conditions, and how many of them were nonconforming. */
export interface Batch {
  readonly nonconforming: number;
  readonly inspected: number;
}

/** How much more the batches differ than chance would have it. */
export interface Dispersion {
  /** 1 when the batches differ as independent units would; above 1 when defects cluster in batches */
  readonly factor: number;
  /** chance of so large a factor if units were independent, 0 to 1 */
  readonly chance: number;
  /** how the chance was found: chi-square, or by dealing out the same defects anew where they are few */
  readonly by: 'chi-square' | 'dealing';
}

const deals = 199;

/**
 * The dispersion of nonconforming counts over batches, shown when its chance is below 0.01.
 * Where less than one nonconforming unit is expected in a batch the chi-square chance is off, and the
 * same number of defects is dealt out to the batches 199 times instead.
 *
 * @param batches two or more, each with 1 inspected or more
 * @param random a generator of numbers in [0, 1); seed it, so that the same window gives the same answer
 * @returns undefined when the batches hold no or only nonconforming units: nothing to compare
 * @throws OutOfDomain naming the argument
 * @source R. A. Fisher's index of dispersion (memory); conditional test: methods, section 8
 */
export function dispersionOf(batches: readonly Batch[], random: () => number): Dispersion | undefined {
  const pooled = pool(batches);
  if (pooled === undefined) return undefined;
  const { chiSquare, rate, total, units } = pooled;
  const factor = chiSquare / (batches.length - 1);
  if (units * rate >= batches.length) return { factor, chance: chiSquareChance(chiSquare, batches.length - 1), by: 'chi-square' };
  return { factor, chance: dealtChance(batches, total, units, random), by: 'dealing' };
}

/**
 * The same factor with the chi-square chance, whatever the counts.
 *
 * @returns undefined as of `dispersionOf`
 * @throws OutOfDomain naming the argument
 * @source as `dispersionOf`
 */
export function chiSquareDispersion(batches: readonly Batch[]): Dispersion | undefined {
  const pooled = pool(batches);
  if (pooled === undefined) return undefined;
  const freedom = batches.length - 1;
  return { factor: pooled.chiSquare / freedom, chance: chiSquareChance(pooled.chiSquare, freedom), by: 'chi-square' };
}

interface Pooled {
  readonly total: number;
  readonly units: number;
  readonly rate: number;
  readonly chiSquare: number;
}

function pool(batches: readonly Batch[]): Pooled | undefined {
  if (batches.length < 2) throw new OutOfDomain('batches', batches.length, 'two batches or more');
  let [total, units] = [0, 0];
  for (const { nonconforming, inspected } of batches) {
    requireWhole('inspected', inspected, 1);
    requireWhole('nonconforming', nonconforming, 0, inspected);
    total += nonconforming;
    units += inspected;
  }
  if (total === 0 || total === units) return undefined;
  const rate = total / units;
  const chiSquare = spreadOf(batches.map(({ nonconforming }) => nonconforming), batches, rate) / (1 - rate);
  return { total, units, rate, chiSquare };
}

/** Sum of (x - m p)^2/(m p) over the batches. */
function spreadOf(counts: ArrayLike<number>, batches: readonly Batch[], rate: number): number {
  return batches.reduce((sum, { inspected }, i) => {
    const expected = inspected * rate;
    return sum + ((counts[i] ?? 0) - expected) ** 2 / expected;
  }, 0);
}

function chiSquareChance(chiSquare: number, freedom: number): number {
  return gammaUpperTail(freedom / 2, chiSquare / 2);
}

function dealtChance(batches: readonly Batch[], total: number, units: number, random: () => number): number {
  const ends: number[] = [];
  let end = 0;
  for (const { inspected } of batches) ends.push((end += inspected));
  const rate = total / units;
  const seen = spreadOf(batches.map(({ nonconforming }) => nonconforming), batches, rate);
  let asLarge = 1;
  for (let deal = 0; deal < deals; deal++) {
    const counts = new Float64Array(batches.length);
    for (let event = 0; event < total; event++) {
      const batch = batchAt(ends, random() * units);
      counts[batch] = (counts[batch] ?? 0) + 1;
    }
    if (spreadOf(counts, batches, rate) >= seen * (1 - 1e-12)) asLarge += 1;
  }
  return asLarge / (deals + 1);
}

function batchAt(ends: readonly number[], place: number): number {
  let [low, high] = [0, ends.length - 1];
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((ends[middle] ?? 0) > place) high = middle;
    else low = middle + 1;
  }
  return low;
}
