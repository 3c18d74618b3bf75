import type { Frame, Origin, Part } from '../record/part.ts';
import type { TimeColumn } from '../record/time-column.ts';

/** The text frame that says what this frame says. */
export function jsonOfFrame(frame: Frame): string {
  return JSON.stringify({ type: 'records', first: frame.first, parts: frame.parts.map(jsonOfPart) });
}

function jsonOfPart(part: Part): object {
  switch (part.kind) {
    case 'verdicts':
      return { ...head(part), time: jsonOfTime(part.time), units: part.records, nonconforming: [...part.nonconforming] };
    case 'tallies':
      return { ...head(part), time: jsonOfTime(part.time), inspected: [...part.inspected], nonconforming: [...part.nonconforming] };
    case 'exposures':
      return { ...head(part), time: jsonOfTime(part.time), count: [...part.count], exposure: [...part.exposure] };
    case 'measurements':
      return { ...head(part), time: jsonOfTime(part.time), value: [...part.value] };
    case 'correction':
      return { ...head(part), time: part.at, corrects: part.corrects, finding: part.finding, reason: part.reason };
    case 'lost': {
      const { at, ...said } = part;
      return { ...said, time: at };
    }
    default: {
      const { at, records: _, ...said } = part;
      return { ...said, time: at };
    }
  }
}

/** JSON.stringify leaves an undefined lot out. */
function head(part: { readonly kind: Part['kind']; readonly origin: Origin }): object {
  return { kind: part.kind, ...part.origin };
}

function jsonOfTime(time: TimeColumn): number | number[] | { start: number; step: number } {
  if (time.kind === 'each') return [...time.times];
  return time.step === 0 && Number.isInteger(time.start) ? time.start : { start: time.start, step: time.step };
}
