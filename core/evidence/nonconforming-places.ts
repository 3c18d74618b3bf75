import type { InspectionPart, Measurements, Tallies, Verdicts } from '../record/part.ts';

/** A measurement nonconforms when it lies beyond this; a value on the limit conforms. */
export interface Limit {
  readonly side: 'below' | 'above';
  readonly value: number;
}

const none = new Uint32Array(0);

/** Whether a value lies beyond the limit. A value that is not a number does: it proves nothing good. */
export function beyondLimit(value: number, limit: Limit): boolean {
  return limit.side === 'below' ? !(value >= limit.value) : !(value <= limit.value);
}

/** Whether the records of a part say of units whether they conform: measurements do where there is a limit. */
export function tellsUnits(part: InspectionPart, limit: Limit | undefined): part is Verdicts | Tallies | Measurements {
  return part.kind !== 'exposures' && (part.kind !== 'measurements' || limit !== undefined);
}

/**
 * The nonconforming records of a stretch of a part of single units (verdicts, or measurements judged by a limit).
 *
 * @returns places in the part, from `from` to `to` - 1, strictly rising; a view where the part lists them already
 */
export function nonconformingPlaces(part: InspectionPart, from: number, to: number, limit: Limit | undefined): Uint32Array {
  if (part.kind === 'verdicts') {
    const all = part.nonconforming;
    if (from === 0 && to === part.records) return all;
    return all.subarray(firstAtOrAfter(all, from), firstAtOrAfter(all, to));
  }
  if (part.kind !== 'measurements' || limit === undefined) return none;
  const beyond: number[] = [];
  for (let place = from; place < to; place += 1) {
    if (beyondLimit(part.value[place] as number, limit)) beyond.push(place);
  }
  return beyond.length === 0 ? none : Uint32Array.from(beyond);
}

/** Row of the first place at or after `place` in rising places; their number where there is none. */
export function firstAtOrAfter(places: Uint32Array, place: number): number {
  let low = 0;
  let high = places.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((places[middle] as number) < place) low = middle + 1;
    else high = middle;
  }
  return low;
}
