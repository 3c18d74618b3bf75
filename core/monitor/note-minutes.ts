import type { Batch } from '../evidence/evidence.ts';
import type { MinuteTally } from './minute-tally.ts';

/** Adds some records of one minute to a guarantee's counts by minute: units and nonconforming ones, or exposure and nonconformities. */
export function noteMinutes(minutes: MinuteTally, { part, from, to, places }: Batch, minute: number): void {
  switch (part.kind) {
    case 'verdicts':
    case 'measurements':
      minutes.note(minute, to - from, places.length);
      return;
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
