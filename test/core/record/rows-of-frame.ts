import type { Finding, Frame, Part } from '../../../core/record/part.ts';
import type { RowRecord } from '../../../core/record/row.ts';
import { timeAt } from '../../../core/record/time-column.ts';

/** Every record of a frame on its own, with its sequence: the slow reading that the tests compare with. */
export function rowsOfFrame(frame: Frame): RowRecord[] {
  let sequence = frame.first;
  return frame.parts.flatMap((part) => {
    const rows = rowsOfPart(part, sequence);
    sequence += part.records;
    return rows;
  });
}

function rowsOfPart(part: Part, sequence: number): RowRecord[] {
  if (!('origin' in part) || part.kind === 'correction') return [{ sequence, says: 'part', part }];
  return Array.from({ length: part.records }, (_, i) => ({
    sequence: sequence + i, says: 'finding', origin: part.origin, at: timeAt(part.time, i), finding: findingAt(part, i),
  }));
}

function findingAt(part: Exclude<Extract<Part, { origin: unknown }>, { kind: 'correction' }>, i: number): Finding {
  switch (part.kind) {
    case 'verdicts':
      return { kind: 'verdict', nonconforming: part.nonconforming.includes(i) };
    case 'tallies':
      return { kind: 'tally', inspected: part.inspected[i]!, nonconforming: part.nonconforming[i]! };
    case 'exposures':
      return { kind: 'exposure', count: part.count[i]!, exposure: part.exposure[i]! };
    case 'measurements':
      return { kind: 'measurement', value: part.value[i]! };
  }
}
