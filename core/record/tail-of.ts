import { frameOf } from './frame-of.ts';
import { noPlaces } from './no-places.ts';
import type { Frame, Part } from './part.ts';
import { timeAt, type TimeColumn } from './time-column.ts';

/**
 * The frame without its first `skip` records, for a source that sent them before.
 * Columns are views on the frame's own; nothing is copied but what has to be renumbered.
 *
 * @param skip whole, 0 to frame.records; all of them leaves a frame without parts
 */
export function tailOf(frame: Frame, skip: number): Frame {
  if (skip === 0) return frame;
  const parts: Part[] = [];
  let before = skip;
  for (const part of frame.parts) {
    if (before === 0) parts.push(part);
    else if (before < part.records) {
      parts.push(tailOfPart(part, before));
      before = 0;
    } else before -= part.records;
  }
  return frameOf(frame.first + skip, parts);
}

function tailOfPart(part: Part, skip: number): Part {
  const records = part.records - skip;
  switch (part.kind) {
    case 'verdicts':
      return { ...part, records, time: tailOfTime(part.time, skip, records), nonconforming: placesFrom(part.nonconforming, skip) };
    case 'tallies':
      return {
        ...part, records, time: tailOfTime(part.time, skip, records),
        inspected: part.inspected.subarray(skip), nonconforming: part.nonconforming.subarray(skip),
      };
    case 'exposures':
      return {
        ...part, records, time: tailOfTime(part.time, skip, records),
        count: part.count.subarray(skip), exposure: part.exposure.subarray(skip),
      };
    case 'measurements':
      return { ...part, records, time: tailOfTime(part.time, skip, records), value: part.value.subarray(skip) };
    case 'lost':
      return { ...part, records };
    default:
      return part; // single records are never cut
  }
}

function placesFrom(places: Uint32Array, skip: number): Uint32Array {
  const begin = places.findIndex((place) => place >= skip);
  return begin < 0 ? noPlaces : places.subarray(begin).map((place) => place - skip);
}

/** Every record keeps its time to the millisecond: a broken step would round differently from a later start. */
function tailOfTime(time: TimeColumn, skip: number, records: number): TimeColumn {
  if (time.kind === 'each') return { kind: 'each', times: time.times.subarray(skip) };
  if (Number.isInteger(time.start) && Number.isInteger(time.step)) {
    return { kind: 'steady', start: time.start + skip * time.step, step: time.step };
  }
  return { kind: 'each', times: Float64Array.from({ length: records }, (_, i) => timeAt(time, skip + i)) };
}
