import { checkedId } from '../record/checked-words.ts';
import type { Origin } from '../record/part.ts';
import { refuse } from '../record/refusal.ts';
import { headBytes, noName, originBytes, tableStart } from './binary-layout.ts';
import type { ByteCursor } from './byte-cursor.ts';
import { OriginMemo } from './origin-memo.ts';

/** Names and origins the parts of a frame refer to. */
export interface Table {
  readonly names: readonly string[];
  readonly origins: readonly Origin[];
}

/** Names one table may hold: four a part, the most a part can use. */
const namesAPart = 4;

interface Known {
  readonly bytes: Uint8Array;
  readonly table: Table;
}

/** Bytes of tables remembered of one connection; beyond, all are forgotten and learnt anew. */
const rememberedBytes = 65_536;

/**
 * The tables of one connection's latest frames. A frame that repeats the bytes of one is given the same table, so
 * that a source's unchanging words are checked and made once, also where the frames of many streams take turns.
 */
export class TableMemo {
  readonly #known = new Map<number, Known>();
  #bytes = 0;
  readonly #origins = new OriginMemo();

  /** @param cursor behind the frame's head; it is left behind the table */
  read(cursor: ByteCursor, mostParts: number): Table {
    const size = cursor.u32(20);
    cursor.take(size, 'table');
    const mark = markOf(cursor);
    const known = this.#known.get(mark);
    if (known !== undefined && repeats(cursor, known.bytes)) return known.table;
    const table = tableOf(cursor, size, mostParts, this.#origins);
    this.#remember(mark, { bytes: cursor.bytes.slice(tableStart, cursor.at), table });
    return table;
  }

  #remember(mark: number, known: Known): void {
    if (this.#bytes > rememberedBytes) {
      this.#known.clear();
      this.#bytes = 0;
    }
    this.#bytes += known.bytes.length;
    this.#known.set(mark, known);
  }
}

/** The table's words mixed into one; tables that come to the same mark are only made again. */
function markOf(cursor: ByteCursor): number {
  let mixed = 0;
  for (let at = tableStart; at + 4 <= cursor.at; at += 4) {
    mixed = Math.imul(mixed ^ cursor.u32(at), 0x9e3779b1);
    mixed ^= mixed >>> 15;
  }
  return mixed;
}

function repeats({ bytes, at }: ByteCursor, known: Uint8Array): boolean {
  if (known.length !== at - tableStart) return false;
  for (let i = 0; i < known.length; i += 1) if (known[i] !== bytes[tableStart + i]) return false;
  return true;
}

function tableOf(cursor: ByteCursor, size: number, mostParts: number, known: OriginMemo): Table {
  const nameCount = cursor.u16(16);
  const originCount = cursor.u16(18);
  if (nameCount > namesAPart * mostParts) refuse('out-of-range', 'names', nameCount, `at most ${namesAPart} a part`);
  if (originCount > mostParts) refuse('out-of-range', 'origins', originCount, 'at most one a part');
  if (size % 8 !== 0 || size < originCount * originBytes + nameCount) {
    refuse('out-of-range', 'table', size, 'its bytes, a multiple of 8 that holds its origins and names');
  }
  const names = namesOf(cursor, headBytes + originCount * originBytes, headBytes + size, nameCount);
  const origins = Array.from({ length: originCount }, (_, i) => originOf(cursor, headBytes + i * originBytes, names, i, known));
  return { names, origins };
}

function namesOf(cursor: ByteCursor, from: number, end: number, count: number): readonly string[] {
  const names: string[] = [];
  let at = from;
  for (let i = 0; i < count; i += 1) {
    const begin = at + 1;
    at = begin + (at < end ? cursor.u8(at) : 0);
    if (begin > end || at > end) refuse('truncated', `names[${i}]`, end - from, 'a name inside the table');
    // Bytes beyond ASCII become characters no id holds.
    names.push(checkedId(String.fromCharCode(...cursor.bytes.subarray(begin, at)), `names[${i}]`));
  }
  if (end - at >= 8 || cursor.bytes.subarray(at, end).some((byte) => byte !== 0)) {
    refuse('reserved-not-zero', 'table', end - at, 'fewer than 8 zero bytes behind the last name');
  }
  return names;
}

function originOf(cursor: ByteCursor, at: number, names: readonly string[], index: number, known: OriginMemo): Origin {
  const field = `origins[${index}]`;
  const lot = cursor.u16(at + 6);
  return known.of(
    nameAt(names, cursor.u16(at), `${field}.station`),
    nameAt(names, cursor.u16(at + 2), `${field}.product`),
    nameAt(names, cursor.u16(at + 4), `${field}.characteristic`),
    lot === noName ? undefined : nameAt(names, lot, `${field}.lot`),
  );
}

export function nameAt(names: readonly string[], place: number, field: string): string {
  return names[place] ?? refuse('unknown-name', field, place, `a place in the list of ${names.length} names`);
}
