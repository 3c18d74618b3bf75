import { frameOf } from './frame-of.ts';
import type { Frame, Part } from './part.ts';
import type { TimeColumn } from './time-column.ts';

/**
 * The first `keep` records of a frame. Columns are views on the frame's own.
 *
 * @param keep whole, 0 to frame.records; none leaves a frame without parts
 */
export function headOf(frame: Frame, keep: number): Frame {
  if (keep === frame.records) return frame;
  const parts: Part[] = [];
  let left = keep;
  for (const part of frame.parts) {
    if (left === 0) break;
    parts.push(part.records <= left ? part : headOfPart(part, left));
    left -= Math.min(left, part.records);
  }
  return frameOf(frame.first, parts);
}

function headOfPart(part: Part, records: number): Part {
  switch (part.kind) {
    case 'verdicts': {
      const end = part.nonconforming.findIndex((place) => place >= records);
      return { ...part, records, time: headOfTime(part.time, records), nonconforming: end < 0 ? part.nonconforming : part.nonconforming.subarray(0, end) };
    }
    case 'tallies':
      return {
        ...part, records, time: headOfTime(part.time, records),
        inspected: part.inspected.subarray(0, records), nonconforming: part.nonconforming.subarray(0, records),
      };
    case 'exposures':
      return {
        ...part, records, time: headOfTime(part.time, records),
        count: part.count.subarray(0, records), exposure: part.exposure.subarray(0, records),
      };
    case 'measurements':
      return { ...part, records, time: headOfTime(part.time, records), value: part.value.subarray(0, records) };
    case 'lost':
      return { ...part, records };
    default:
      return part; // single records are never cut
  }
}

function headOfTime(time: TimeColumn, records: number): TimeColumn {
  return time.kind === 'each' ? { kind: 'each', times: time.times.subarray(0, records) } : time;
}
