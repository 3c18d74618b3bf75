import { dispersionOf, type Batch } from '../bound/dispersion.ts';
import { gapShares } from '../bound/gap-diagnostic.ts';
import { seededUniform } from '../run-length/seeded-uniform.ts';
import type { TimeWindow } from '../window/time-window.ts';
import type { UnitWindow } from '../window/unit-window.ts';

const beginning = 'Nonconforming units come in clusters';

/** Whether a warning is one of these. */
export const saysClusters = (warning: string): boolean => warning.startsWith(beginning);

/** Fewer nonconforming units tell nothing about how they follow each other; of more, the newest are looked at. */
const fewest = 5;
const most = 1000;
/** Chance below which the closeness is said. */
const speaks = 0.01;
/** Stretches of equal length that a window is cut into to see whether they differ. */
const stretches = 20;
const seed = 20_000;

const remedy = 'The bound takes them for independent and may stand too near. Remedy: find the common cause, or promise and count events (units within a stated gap are one) or whole lots.';

/**
 * Says where the nonconforming units of a window follow each other more closely, or differ more from stretch to stretch, than
 * independent ones would: the bound takes them for independent.
 *
 * @source `gapShares` (three reaches are looked at, so each speaks below a third of 0.01) and `dispersionOf`
 */
export function clusterWarnings(window: UnitWindow): readonly string[] {
  if (window.nonconforming < fewest) return [];
  const places = window.newestNonconforming(most).map(({ ago }) => -ago).reverse();
  const [oldest = 0] = places;
  // Where older ones are left out, the stretch begins after the newest of them, at the oldest that is looked at.
  const inspected = places.length < window.nonconforming ? 1 - oldest : window.inspected;
  const shares = gapShares(places, inspected);
  const [nearest] = shares.filter(({ chance }) => chance < speaks / shares.length).map(({ within }) => within);
  if (nearest !== undefined) {
    return [`${beginning}: the next one follows within ${nearest === 1 ? 'one unit' : `${nearest} units`} more often than chance would have it. ${remedy}`];
  }
  return unevenWarnings(batchesOf(places, inspected));
}

/** The same for a window of time, whose steps are compared. */
export function stepWarnings(window: TimeWindow): readonly string[] {
  return window.nonconforming < fewest ? [] : unevenWarnings(window.steps());
}

function unevenWarnings(batches: readonly Batch[]): readonly string[] {
  const full = batches.filter(({ inspected }) => inspected > 0);
  const found = full.length < 2 ? undefined : dispersionOf(full, seededUniform(seed));
  if (found === undefined || found.chance >= speaks || found.factor <= 1) return [];
  return [`${beginning}, or their rate changed within the window: ${full.length} stretches of it differ ${Number(found.factor.toPrecision(2))} times as much as chance would have it. ${remedy}`];
}

/** @param places of the nonconforming units, the newest unit at 0, rising */
function batchesOf(places: readonly number[], inspected: number): readonly Batch[] {
  const parts = Math.min(stretches, inspected);
  const first = 1 - inspected;
  const edge = (part: number): number => first + Math.floor((part * inspected) / parts);
  return Array.from({ length: parts }, (_, part) => {
    const [from, to] = [edge(part), edge(part + 1)];
    return { inspected: to - from, nonconforming: places.filter((place) => place >= from && place < to).length };
  });
}
