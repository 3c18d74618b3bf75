import { CsvError, parse } from 'csv-parse/sync';
import { columnsOfHeader, recordOfCsv } from '../../core/record/csv-row.ts';
import { recordOfNdjson } from '../../core/record/ndjson-row.ts';
import { refuse, settled, type Refusal } from '../../core/record/refusal.ts';
import type { RowField } from '../../core/record/row-fields.ts';
import type { RowRecord } from '../../core/record/row.ts';
import { fault, ok, type Result } from '../../core/result.ts';
import { formOf, type RowForm } from './row-form.ts';
import { WholeRows } from './whole-rows.ts';

/** A row, read and checked, with the line it begins on (1-based). */
export interface RowOnLine {
  readonly line: number;
  readonly row: RowRecord;
}

/** What a piece of the text brought: rows, then perhaps the refusal of the row behind them. */
export interface RowsRead {
  readonly rows: readonly RowOnLine[];
  readonly refusal: Refusal | undefined;
}

const noBytes = new Uint8Array(0);
const decoder = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true });
const byteOrderMark = '\uFEFF';

/** Reads rows (NDJSON or CSV) from a text that comes in pieces; holds one unfinished row at most. */
export class RowReader {
  readonly #rowBytes: number;
  #form: RowForm | undefined;
  #whole: WholeRows | undefined;
  /** What came before the first character that tells the form. */
  #lead: Uint8Array = noBytes;
  #columns: readonly RowField[] | undefined;
  #line = 1;

  /** @param form undefined: told by the text's first character */
  constructor(form: RowForm | undefined, rowBytes: number) {
    this.#form = form;
    this.#rowBytes = rowBytes;
  }

  /** Reads on; after a refusal nothing more is to be read. */
  read(piece: Uint8Array): RowsRead {
    const whole = this.#wholeRows(piece);
    if (whole === undefined) return { rows: [], refusal: undefined };
    const read = this.#rowsOf(whole.take(this.#lead.length === 0 ? piece : Buffer.concat([this.#lead, piece])));
    this.#lead = noBytes;
    return { rows: read.rows, refusal: read.refusal ?? whole.refusalOf(whole.unfinished, this.#line) };
  }

  /** @returns undefined while nothing but white space came: that is kept for later */
  #wholeRows(piece: Uint8Array): WholeRows | undefined {
    this.#form ??= formOf(piece);
    if (this.#form === undefined && this.#lead.length + piece.length <= this.#rowBytes) {
      this.#lead = Buffer.concat([this.#lead, piece]);
      return undefined;
    }
    return (this.#whole ??= new WholeRows(this.#form ?? 'csv', this.#rowBytes));
  }

  /** The text ended: its last row may lack its line end. */
  end(): RowsRead {
    return this.#rowsOf(this.#whole?.last() ?? []);
  }

  #rowsOf(texts: readonly Uint8Array[]): RowsRead {
    const rows: RowOnLine[] = [];
    for (const bytes of texts) {
      const line = this.#line;
      const read = this.#rowOf(bytes, line);
      if (!read.ok) return { rows, refusal: read.fault };
      if (read.value !== undefined) rows.push({ line, row: read.value });
    }
    return { rows, refusal: undefined };
  }

  /** @returns undefined for an empty line and for the header of a CSV */
  #rowOf(bytes: Uint8Array, line: number): Result<RowRecord | undefined, Refusal> {
    const tooLong = this.#whole?.refusalOf(bytes, line);
    if (tooLong !== undefined) return fault(tooLong);
    const decoded = textOf(bytes, line);
    if (!decoded.ok) return decoded;
    const text = line === 1 && decoded.value.startsWith(byteOrderMark) ? decoded.value.slice(1) : decoded.value;
    this.#line += text.split('\n').length - (text.endsWith('\n') ? 1 : 0);
    if (text.trim() === '') return ok(undefined);
    return this.#form === 'ndjson' ? recordOfNdjson(text, line) : this.#csvRow(text, line);
  }

  #csvRow(text: string, line: number): Result<RowRecord | undefined, Refusal> {
    const cells = cellsOf(text, line);
    if (!cells.ok) return cells;
    if (this.#columns !== undefined) return recordOfCsv(this.#columns, cells.value, line);
    const columns = columnsOfHeader(cells.value);
    if (!columns.ok) return columns;
    this.#columns = columns.value;
    return ok(undefined);
  }
}

function textOf(bytes: Uint8Array, line: number): Result<string, Refusal> {
  return settled(() => {
    try {
      return decoder.decode(bytes);
    } catch {
      return refuse('bad-text', 'the line', 'bytes', 'text in UTF-8');
    }
  }, line);
}

function cellsOf(text: string, line: number): Result<readonly string[], Refusal> {
  // Without quotes a comma is a comma: most rows need no more than that.
  if (!text.includes('"')) return ok(text.replace(/\r?\n$/, '').split(','));
  return settled(() => {
    try {
      return parse(text, { relax_column_count: true })[0] ?? [];
    } catch (cause) {
      if (!(cause instanceof CsvError)) throw cause;
      return refuse('bad-row', `cell ${Number(cause['column'] ?? 0) + 1}`, text, 'quotes around a whole cell, doubled inside of it');
    }
  }, line);
}
