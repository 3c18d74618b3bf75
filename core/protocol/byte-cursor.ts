import { newColumn } from '../record/room.ts';
import { noPlaces } from '../record/no-places.ts';
import { refuse } from '../record/refusal.ts';

/** Typed arrays take the machine's byte order; where that is not the wire's, columns are read number by number. */
const sameOrder = new Uint8Array(Uint16Array.of(1).buffer)[0] === 1;
/** Below this many entries a loop is faster than making a view of the bytes. */
const fewEntries = 16;
const twoTo32 = 4_294_967_296;

/** Walks over the bytes of one frame; what lies beyond their end is refused, never read. */
export class ByteCursor {
  readonly bytes: Uint8Array;
  readonly #view: DataView;
  /** Next byte to be read. */
  at = 0;

  constructor(bytes: Uint8Array) {
    this.bytes = bytes;
    this.#view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  }

  get left(): number {
    return this.bytes.byteLength - this.at;
  }

  /** Place of the next `count` bytes, stepping over them. */
  take(count: number, field: string): number {
    const from = this.at;
    if (count > this.bytes.byteLength - from) refuse('truncated', field, this.bytes.byteLength - from, `${count} bytes more`);
    this.at = from + count;
    return from;
  }

  u8(at: number): number {
    return this.bytes[at] as number;
  }

  u16(at: number): number {
    return this.#view.getUint16(at, true);
  }

  u32(at: number): number {
    return this.#view.getUint32(at, true);
  }

  f64(at: number): number {
    return this.#view.getFloat64(at, true);
  }

  /** As a double: exact up to 2^53 - 1, larger ones are only ever refused. */
  u64(at: number): number {
    return this.#view.getUint32(at + 4, true) * twoTo32 + this.#view.getUint32(at, true);
  }

  /** A copy of `count` u32, so that nothing keeps or shares the message's memory. */
  u32Column(count: number, field: string): Uint32Array {
    const from = this.take(count * 4, field);
    if (count === 0) return noPlaces;
    const column = new Uint32Array(count);
    if (sameOrder && count > fewEntries) {
      new Uint8Array(column.buffer).set(this.bytes.subarray(from, from + count * 4));
    } else {
      for (let i = 0; i < count; i += 1) column[i] = this.#view.getUint32(from + i * 4, true);
    }
    return column;
  }

  f64Column(count: number, field: string): Float64Array {
    const from = this.take(count * 8, field);
    const column = new Float64Array(count);
    if (sameOrder && count > fewEntries) {
      new Uint8Array(column.buffer).set(this.bytes.subarray(from, from + count * 8));
    } else {
      for (let i = 0; i < count; i += 1) column[i] = this.#view.getFloat64(from + i * 8, true);
    }
    return column;
  }

  /** `count` u32 offsets, each added to `base`. */
  offsetColumn(base: number, count: number, field: string): Float64Array {
    const from = this.take(count * 4, field);
    const view = this.#view;
    const column = newColumn(count);
    for (let i = 0; i < count; i += 1) column[i] = base + view.getUint32(from + i * 4, true);
    return column;
  }

  /** Steps to the next multiple of 8. */
  align(field: string): void {
    this.take((8 - (this.at & 7)) & 7, field);
  }
}
