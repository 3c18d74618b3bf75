import type { Lane } from './lane.ts';

/** Difference in allowance used below which two lanes keep their places, so that noise does not make them swap. */
const keepWithin = 0.02;

const ranks = { violated: 0, undecided: 1, unknown: 2, demonstrated: 3, gathering: 4 } as const;

/** Where the bound stands; a lane without one stands behind those with. */
const usedBy = (lane: Lane): number => lane.view.allowance.bound ?? Number.NEGATIVE_INFINITY;
const rankOf = (lane: Lane): number => Math.min(ranks[lane.view.state], lane.tone === 'harm' ? 0 : lane.tone === 'care' ? 1 : 9);

/** Whether `lower`, now below, belongs above `upper`. */
function mustRise(upper: Lane, lower: Lane, slack: number): boolean {
  const rank = rankOf(lower) - rankOf(upper);
  if (rank !== 0) return rank < 0;
  return usedBy(lower) > usedBy(upper) + slack;
}

/**
 * Ids from most to least troubled: by what the evidence says, then by allowance used. Lanes already placed keep their
 * order while they differ by less than two per cent of the allowance.
 *
 * @param previous  ids as they stand now; empty at first
 */
export function nextOrder(previous: readonly string[], lanes: readonly Lane[]): readonly string[] {
  const place = new Map(previous.map((id, index) => [id, index]));
  const placed = [...lanes].sort(
    (a, b) => (place.get(a.card.id) ?? Infinity) - (place.get(b.card.id) ?? Infinity) || 0,
  );
  const known = previous.length > 0;
  for (let end = 1; end < placed.length; end += 1) {
    for (let at = end; at > 0; at -= 1) {
      const upper = placed[at - 1];
      const lower = placed[at];
      if (upper === undefined || lower === undefined) break;
      if (!mustRise(upper, lower, known && place.has(lower.card.id) ? keepWithin : 0)) break;
      placed[at - 1] = lower;
      placed[at] = upper;
    }
  }
  const order = placed.map((lane) => lane.card.id);
  return order.length === previous.length && order.every((id, index) => id === previous[index]) ? previous : order;
}

export function orderedLanes(order: readonly string[], lanes: readonly Lane[]): readonly Lane[] {
  const byId = new Map(lanes.map((lane) => [lane.card.id, lane]));
  return order.flatMap((id) => byId.get(id) ?? []);
}

/** Lanes of one production line; `line` is its name, empty where the board is not grouped. */
export interface LaneGroup {
  readonly line: string;
  readonly lanes: readonly Lane[];
}

/** The same order, the lanes of one production line together; the line with the worst lane first. */
export function groupedByLine(lanes: readonly Lane[]): readonly LaneGroup[] {
  const groups = new Map<string, Lane[]>();
  for (const lane of lanes) {
    const group = groups.get(lane.card.lineName);
    if (group === undefined) groups.set(lane.card.lineName, [lane]);
    else group.push(lane);
  }
  return [...groups].map(([line, of]) => ({ line, lanes: of }));
}
