import type { Refusal } from '../../core/record/refusal.ts';
import { refusalTable } from '../../core/protocol/refusals.ts';
import type { RowForm } from './row-form.ts';

const newLine = 0x0a;
const quote = 0x22;

/** Whole rows of a text, as its pieces come; rows of a CSV may have line breaks inside of quotes. */
export class WholeRows {
  readonly #form: RowForm;
  readonly #rowBytes: number;
  #rest = Buffer.alloc(0);
  /** Bytes of the rest looked at already, and whether a quoted cell is open there. */
  #seen = 0;
  #quoted = false;

  constructor(form: RowForm, rowBytes: number) {
    this.#form = form;
    this.#rowBytes = rowBytes;
  }

  /** Takes a piece; @returns the whole rows there are now, each with its line end. Keeps the last, unfinished one. */
  take(piece: Uint8Array): readonly Buffer[] {
    const text = this.#rest.length === 0 ? Buffer.from(piece.buffer, piece.byteOffset, piece.byteLength) : Buffer.concat([this.#rest, piece]);
    const rows: Buffer[] = [];
    let from = 0;
    for (let end = this.#rowEnd(text, this.#seen); end >= 0; end = this.#rowEnd(text, end)) {
      rows.push(text.subarray(from, end));
      from = end;
    }
    this.#rest = Buffer.from(text.subarray(from));
    this.#seen = this.#rest.length;
    return rows;
  }

  /** The last row, where no line end follows it. */
  last(): readonly Buffer[] {
    return this.#rest.length === 0 ? [] : [this.#rest];
  }

  /** Why a row is not read; also asked of the unfinished one, so that it does not grow without end. */
  refusalOf(row: Uint8Array, line: number): Refusal | undefined {
    if (row.length <= this.#rowBytes) return undefined;
    const expected = `a row of at most ${this.#rowBytes} bytes`;
    return { code: 'frame-too-large', field: '', value: `${row.length} bytes`, expected, sentence: `${refusalTable['frame-too-large'].sentence} Expected ${expected}.`, line };
  }

  get unfinished(): Uint8Array {
    return this.#rest;
  }

  /** Where the row ends that `from` lies in, behind its line end; -1 if that is not there yet. */
  #rowEnd(text: Buffer, from: number): number {
    if (this.#form === 'ndjson') return text.indexOf(newLine, from) + 1 || -1;
    for (let at = from; at < text.length; at += 1) {
      const byte = text[at];
      if (byte === quote) this.#quoted = !this.#quoted;
      else if (byte === newLine && !this.#quoted) return at + 1;
    }
    return -1;
  }
}
