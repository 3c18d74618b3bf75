import { nonconformingPlaces } from '../evidence/nonconforming-places.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { InspectionPart } from '../record/part.ts';
import type { MinuteTally } from './minute-tally.ts';

/** Adds some records of one minute to a guarantee's counts by minute: units and nonconforming ones, or exposure and nonconformities. */
export function noteMinutes(minutes: MinuteTally, guarantee: Guarantee, part: InspectionPart, from: number, to: number, minute: number): void {
  switch (part.kind) {
    case 'verdicts':
      minutes.note(minute, to - from, nonconformingPlaces(part, from, to, undefined).length);
      return;
    case 'measurements': {
      const limit = guarantee.promise.quantity === 'fraction-beyond-limit' ? guarantee.promise.limit : undefined;
      minutes.note(minute, to - from, nonconformingPlaces(part, from, to, limit).length);
      return;
    }
    case 'tallies':
      minutes.note(minute, sum(part.inspected, from, to), sum(part.nonconforming, from, to));
      return;
    case 'exposures':
      minutes.note(minute, sum(part.exposure, from, to), sum(part.count, from, to));
      return;
  }
}

function sum(column: Uint32Array | Float64Array, from: number, to: number): number {
  let total = 0;
  for (let place = from; place < to; place += 1) total += column[place] as number;
  return total;
}
