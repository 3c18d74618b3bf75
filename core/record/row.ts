import type { Result } from '../result.ts';
import { checkedFinding } from './checked-part.ts';
import { checkedId, checkedReason } from './checked-words.ts';
import type { Correction, Finding, LineMark, Lost, Origin } from './part.ts';
import { refuse, settled, type Refusal } from './refusal.ts';
import { isRowField, rowFields, type RowField } from './row-fields.ts';
import { momentOfCell, numberOfCell, sequenceOfCell, wholeOfCell } from './row-scalar.ts';

/** One row, checked: an inspection's finding, or a part of its own. */
export type RowRecord = {
  /** Undefined: the row follows the one before it. */
  readonly sequence: number | undefined;
} & (
  | { readonly says: 'finding'; readonly origin: Origin; readonly at: number; readonly finding: Finding }
  | { readonly says: 'part'; readonly part: Correction | LineMark | Lost }
);

type Cells = Readonly<Partial<Record<RowField, unknown>>>;

/**
 * The record a row states: an object of a line of NDJSON, or the cells of a CSV line by their column names.
 * A cell that is empty, null or missing says nothing.
 *
 * @param row  an object whose own fields are of rowFields; numbers may be numbers or their text
 * @param line 1-based line of the file or body, named in the refusal
 */
export function recordOfRow(row: unknown, line: number): Result<RowRecord, Refusal> {
  return settled(() => {
    if (typeof row !== 'object' || row === null || Array.isArray(row)) return refuse('wrong-type', '', row, 'an object with the fields of a row');
    return recordOf(cellsOf(row as Readonly<Record<string, unknown>>));
  }, line);
}

function cellsOf(row: Readonly<Record<string, unknown>>): Cells {
  const cells: Partial<Record<RowField, unknown>> = {};
  for (const [name, cell] of Object.entries(row)) {
    if (!isRowField(name)) return refuse('unknown-field', name.slice(0, 64), cell ?? null, `one of the fields ${rowFields.join(', ')}`);
    if (cell !== '' && cell !== null && cell !== undefined) cells[name] = cell;
  }
  return cells;
}

function recordOf(cells: Cells): RowRecord {
  const sequence = cells.sequence === undefined ? undefined : sequenceOfCell(cells.sequence, 'sequence');
  const at = momentOfCell(cells.time);
  if (cells.event !== undefined) return { sequence, says: 'part', part: eventOf(cells, at) };
  const finding = findingOf(cells);
  const origin = originOf(cells);
  if (cells.corrects === undefined) {
    expectOnly(cells, [...inspectionFields, ...findingFields[finding.kind]], 'no reason, line, size or records without an event or a correction');
    return { sequence, says: 'finding', origin, at, finding };
  }
  expectOnly(cells, [...inspectionFields, ...findingFields[finding.kind], 'corrects', 'reason'], 'no line, size or records in a correction');
  const corrects = sequenceOfCell(cells.corrects, 'corrects');
  return { sequence, says: 'part', part: { kind: 'correction', records: 1, origin, at, corrects, finding, reason: checkedReason(cells.reason) } };
}

const inspectionFields: readonly RowField[] = ['sequence', 'time', 'station', 'product', 'characteristic', 'lot'];
const findingFields: Readonly<Record<Finding['kind'], readonly RowField[]>> = {
  verdict: ['verdict'], tally: ['inspected', 'nonconforming'], exposure: ['count', 'exposure'], measurement: ['value'],
};

/** Refuses a cell that has no meaning beside the others: nothing a row says is passed over. */
function expectOnly(cells: Cells, fields: readonly RowField[], expected: string): void {
  for (const name of Object.keys(cells) as RowField[]) {
    if (!fields.includes(name)) refuse('bad-row', name, cells[name], expected);
  }
}

function originOf(cells: Cells): Origin {
  return {
    station: checkedId(cells.station, 'station'),
    product: checkedId(cells.product, 'product'),
    characteristic: checkedId(cells.characteristic, 'characteristic'),
    lot: cells.lot === undefined ? undefined : checkedId(cells.lot, 'lot'),
  };
}

function findingOf(cells: Cells): Finding {
  if (cells.verdict !== undefined) return { kind: 'verdict', nonconforming: verdictOf(cells.verdict) };
  if (cells.inspected !== undefined || cells.nonconforming !== undefined) {
    return checkedFinding({ kind: 'tally', inspected: wholeOfCell(cells.inspected, 'inspected', 1), nonconforming: wholeOfCell(cells.nonconforming, 'nonconforming', 0) });
  }
  if (cells.count !== undefined || cells.exposure !== undefined) {
    return checkedFinding({ kind: 'exposure', count: wholeOfCell(cells.count, 'count', 0), exposure: numberOfCell(cells.exposure, 'exposure') });
  }
  if (cells.value !== undefined) return checkedFinding({ kind: 'measurement', value: numberOfCell(cells.value, 'value') });
  return refuse('bad-row', '', null, 'a verdict, inspected and nonconforming, count and exposure, a value or an event');
}

function verdictOf(cell: unknown): boolean {
  if (cell === 'conforming') return false;
  return cell === 'nonconforming' ? true : refuse('out-of-range', 'verdict', cell, 'conforming or nonconforming');
}

function eventOf(cells: Cells, at: number): LineMark | Lost {
  const line = (): string => checkedId(cells.line, 'line');
  const { event } = cells;
  if (!isEvent(event)) return refuse('unknown-kind', 'event', event, `one of ${Object.keys(eventFields).join(', ')}`);
  const fields = eventFields[event];
  expectOnly(cells, ['sequence', 'time', 'event', ...fields], `nothing but ${fields.join(', ')} beside this event`);
  switch (event) {
    case 'changeover':
      return { kind: 'changeover', records: 1, at, line: line(), product: checkedId(cells.product, 'product') };
    case 'lot-start':
      return {
        kind: 'lot-start', records: 1, at, line: line(), product: checkedId(cells.product, 'product'), lot: checkedId(cells.lot, 'lot'),
        size: cells.size === undefined ? undefined : wholeOfCell(cells.size, 'size', 1),
      };
    case 'lot-end':
      return { kind: 'lot-end', records: 1, at, line: line(), lot: checkedId(cells.lot, 'lot') };
    case 'line-stopped':
      return { kind: 'line-stopped', records: 1, at, line: line(), reason: checkedReason(cells.reason) };
    case 'line-running':
      return { kind: 'line-running', records: 1, at, line: line() };
    case 'lost':
      return {
        kind: 'lost', records: wholeOfCell(cells.records, 'records', 1), at,
        station: checkedId(cells.station, 'station'), reason: checkedReason(cells.reason),
      };
  }
}

function isEvent(event: unknown): event is keyof typeof eventFields {
  return typeof event === 'string' && Object.hasOwn(eventFields, event);
}

const eventFields = {
  changeover: ['line', 'product'],
  'lot-start': ['line', 'product', 'lot', 'size'],
  'lot-end': ['line', 'lot'],
  'line-stopped': ['line', 'reason'],
  'line-running': ['line'],
  lost: ['station', 'records', 'reason'],
} as const satisfies Readonly<Record<(LineMark | Lost)['kind'], readonly RowField[]>>;
