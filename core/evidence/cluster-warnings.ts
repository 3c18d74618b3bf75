import { gapShares } from '../bound/gap-diagnostic.ts';
import type { UnitWindow } from '../window/unit-window.ts';

/** Fewer nonconforming units tell nothing about how they follow each other; of more, the newest are looked at. */
const fewest = 5;
const most = 1000;
const beginning = 'Nonconforming units come in clusters';

/** Whether a warning is one of these. */
export const saysClusters = (warning: string): boolean => warning.startsWith(beginning);

/** Chance below which the closeness is said. */
const speaks = 0.01;

/**
 * Says where the nonconforming units of a window follow each other more closely than independent ones would: the bound
 * takes them for independent.
 *
 * @source `gapShares`; three reaches are looked at, so each speaks below a third of 0.01
 */
export function clusterWarnings(window: UnitWindow): readonly string[] {
  if (window.nonconforming < fewest) return [];
  const places = window.newestNonconforming(most).map(({ ago }) => -ago).reverse();
  const [oldest = 0] = places;
  // Where older ones are left out, the stretch begins after the newest of them, at the oldest that is looked at.
  const inspected = places.length < window.nonconforming ? 1 - oldest : window.inspected;
  const shares = gapShares(places, inspected);
  const reaches = shares.filter(({ chance }) => chance < speaks / shares.length).map(({ within }) => within);
  const [nearest] = reaches;
  if (nearest === undefined) return [];
  return [
    `${beginning}: the next one follows within ${nearest === 1 ? 'one unit' : `${nearest} units`} more often than chance would have it. ` +
      'The bound takes them for independent and may stand too near. Remedy: find the common cause, or promise and count events (units within a stated gap are one) or whole lots.',
  ];
}
