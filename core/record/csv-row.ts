import { fault, type Result } from '../result.ts';
import { refuse, settled, type Refusal } from './refusal.ts';
import { isRowField, rowFields, type RowField } from './row-fields.ts';
import { recordOfRow, type RowRecord } from './row.ts';

/** The columns a CSV's first line names: fields of a row in any order, each at most once. */
export function columnsOfHeader(header: readonly string[]): Result<readonly RowField[], Refusal> {
  return settled(() => header.map((name, i) => {
    if (!isRowField(name)) return refuse('unknown-field', `column ${i + 1}`, name, `one of the fields ${rowFields.join(', ')}`);
    return header.indexOf(name) === i ? name : refuse('unknown-field', `column ${i + 1}`, name, 'each column once');
  }), 1);
}

/** The record one line of a CSV states. @param line 1-based, the header being line 1 */
export function recordOfCsv(columns: readonly RowField[], cells: readonly string[], line: number): Result<RowRecord, Refusal> {
  const same = settled(() => (cells.length === columns.length || refuse('wrong-length', '', cells, `${columns.length} cells, as many as columns`)), line);
  if (!same.ok) return fault(same.fault);
  return recordOfRow(Object.fromEntries(columns.map((column, i) => [column, cells[i]])), line);
}
