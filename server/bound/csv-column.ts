import { createReadStream } from 'node:fs';
import { CsvError, parse } from 'csv-parse';
import { finiteOf } from '../../core/figure/amount.ts';

/** A column that cannot be read: file, line, what stood there, what was expected. */
export class BadColumn extends Error {}

/** More values than this are not held in memory at once. */
export const mostValues = 20_000_000;

/**
 * The measurements in one column of a CSV file, in the order of the file. Every row counts: an empty cell or a word is
 * an error that names its line, never a value left out.
 *
 * @param path CSV with a header line, UTF-8, commas between cells, points in decimals
 * @throws BadColumn; errors of the file system as they come
 */
export async function columnOf(path: string, column: string): Promise<readonly number[]> {
  const values: number[] = [];
  const rows = parse({ bom: true, columns: (header: string[]) => checkedHeader(path, header, column), info: true, skip_empty_lines: true, max_record_size: 1_048_576 });
  const file = createReadStream(path);
  file.on('error', (cause) => rows.destroy(cause)).pipe(rows);
  try {
    for await (const { record, info } of rows as AsyncIterable<Row>) values.push(valueOf(path, record[column], info.lines));
  } catch (cause) {
    if (cause instanceof CsvError) throw new BadColumn(`${path}: ${cause.message}`);
    throw cause;
  } finally {
    file.destroy();
  }
  if (values.length === 0) throw new BadColumn(`${path}: no values; expected a header line with ${JSON.stringify(column)} and rows below it`);
  return values;

  function valueOf(file: string, cell: string | undefined, line: number): number {
    const value = finiteOf((cell ?? '').trim());
    if (value === undefined) throw new BadColumn(`${file}, line ${line}, column ${column}: ${JSON.stringify(cell ?? '')}; expected a number, with a point for decimals`);
    if (values.length === mostValues) throw new BadColumn(`${file}, line ${line}: more than ${mostValues} values`);
    return value;
  }
}

interface Row {
  readonly record: Readonly<Record<string, string>>;
  readonly info: { readonly lines: number };
}

function checkedHeader(path: string, header: readonly string[], column: string): string[] {
  const names = header.map((name) => name.trim());
  const found = names.filter((name) => name === column).length;
  if (found === 1) return names;
  throw new BadColumn(`${path}: ${found === 0 ? 'no' : 'more than one'} column ${JSON.stringify(column)}; the header line has ${names.map((name) => JSON.stringify(name)).join(', ')}`);
}
