import { checkedSequence } from '../record/checked-words.ts';
import type { Frame, Part } from '../record/part.ts';
import { refuse, settled, under, type Refusal } from '../record/refusal.ts';
import type { Result } from '../result.ts';
import { headBytes, layoutVersion, magic0, magic1 } from './binary-layout.ts';
import { partOfBytes } from './binary-part.ts';
import { TableMemo, type Table } from './binary-table.ts';
import { ByteCursor } from './byte-cursor.ts';
import type { SourceLimits } from './limits.ts';

/** Reads the binary frames of one connection or of the store: it remembers the last table of names. */
export class BinaryFrameReader {
  readonly #limits: SourceLimits;
  readonly #tables = new TableMemo();

  constructor(limits: SourceLimits) {
    this.#limits = limits;
  }

  /** The frame these bytes hold, or why they hold none; never throws. The frame shares no memory with the bytes. */
  read(bytes: Uint8Array): Result<Frame, Refusal> {
    return settled(() => this.#frame(bytes));
  }

  #frame(bytes: Uint8Array): Frame {
    if (bytes.length > this.#limits.frameBytes) refuse('frame-too-large', '', bytes.length, `at most ${this.#limits.frameBytes} bytes`);
    const cursor = new ByteCursor(bytes);
    const count = partCountOf(cursor, this.#limits.parts);
    const first = checkedSequence(cursor.u64(8), 'first');
    const table = this.#tables.read(cursor, this.#limits.parts);
    const parts: Part[] = [];
    let next = first;
    let most = this.#limits.records;
    for (let i = 0; i < count; i += 1) {
      const part = partAt(cursor, table, i, next, most);
      next += part.records;
      if (part.kind !== 'lost') most -= part.records;
      parts.push(part);
    }
    if (cursor.left > 0) refuse('trailing-bytes', '', cursor.left, 'no bytes behind the last part');
    checkedSequence(next, 'first');
    return { first, records: next - first, parts };
  }
}

function partCountOf(cursor: ByteCursor, most: number): number {
  cursor.take(headBytes, '');
  if (cursor.u8(0) !== magic0 || cursor.u8(1) !== magic1) refuse('not-a-frame', '', cursor.u16(0), "the bytes 'V' 'F' at the beginning");
  if (cursor.u8(2) !== layoutVersion) refuse('unknown-version', '', cursor.u8(2), `layout version ${layoutVersion}`);
  if (cursor.u8(3) !== 0 || cursor.u16(6) !== 0) refuse('reserved-not-zero', '', cursor.u8(3), 'zero in bytes 3, 6 and 7');
  const count = cursor.u16(4);
  if (count === 0) refuse('empty-frame', 'parts', count, 'at least one part');
  if (count > most) refuse('too-many-parts', 'parts', count, `at most ${most} parts`);
  return count;
}

function partAt(cursor: ByteCursor, table: Table, index: number, sequence: number, most: number): Part {
  try {
    return partOfBytes(cursor, table, sequence, most);
  } catch (cause) {
    throw under(`parts[${index}]`, cause);
  }
}
