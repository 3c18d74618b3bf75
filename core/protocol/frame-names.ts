import type { Frame, Origin, Part } from '../record/part.ts';
import { noName, originBytes, padded } from './binary-layout.ts';

/** Names and origins a frame uses, each once, in the order of their first use, with their places. */
export class FrameNames {
  readonly #names = new Map<string, number>();
  readonly #origins: Origin[] = [];
  #nameBytes = 0;

  /** The table's counts, its size and itself, as they stand in a frame from byte 16 on. */
  readonly table: Uint8Array;

  constructor(parts: readonly Part[]) {
    for (const part of parts) this.#note(part);
    this.table = this.#tableBytes();
  }

  #note(part: Part): void {
    if ('origin' in part) this.#noteOrigin(part.origin);
    else if (part.kind === 'lost') this.#noteName(part.station);
    else {
      this.#noteName(part.line);
      if ('product' in part) this.#noteName(part.product);
      if ('lot' in part) this.#noteName(part.lot);
    }
  }

  #noteOrigin(origin: Origin): void {
    if (this.#origins.some((known) => sameOrigin(known, origin))) return;
    this.#origins.push(origin);
    this.#noteName(origin.station);
    this.#noteName(origin.product);
    this.#noteName(origin.characteristic);
    if (origin.lot !== undefined) this.#noteName(origin.lot);
  }

  #noteName(name: string): void {
    if (this.#names.has(name)) return;
    this.#names.set(name, this.#names.size);
    this.#nameBytes += 1 + name.length;
  }

  placeOf(name: string | undefined): number {
    return name === undefined ? noName : (this.#names.get(name) as number);
  }

  placeOfOrigin(origin: Origin): number {
    return this.#origins.findIndex((known) => sameOrigin(known, origin));
  }

  #tableBytes(): Uint8Array {
    const size = padded(this.#origins.length * originBytes + this.#nameBytes);
    const bytes = new Uint8Array(8 + size);
    const view = new DataView(bytes.buffer);
    view.setUint16(0, this.#names.size, true);
    view.setUint16(2, this.#origins.length, true);
    view.setUint32(4, size, true);
    let at = 8;
    for (const { station, product, characteristic, lot } of this.#origins) {
      for (const name of [station, product, characteristic, lot]) {
        view.setUint16(at, this.placeOf(name), true);
        at += 2;
      }
    }
    for (const name of this.#names.keys()) {
      bytes[at] = name.length;
      for (let i = 0; i < name.length; i += 1) bytes[at + 1 + i] = name.charCodeAt(i);
      at += 1 + name.length;
    }
    return bytes;
  }
}

const namesOfOrigin = new WeakMap<Origin, FrameNames>();

/** The names of a frame; those of an origin that fills frames alone are gathered once, as long as it is in use. */
export function namesOf({ parts }: Frame): FrameNames {
  const origin = onlyOrigin(parts);
  if (origin === undefined) return new FrameNames(parts);
  const known = namesOfOrigin.get(origin) ?? new FrameNames(parts);
  namesOfOrigin.set(origin, known);
  return known;
}

function onlyOrigin(parts: readonly Part[]): Origin | undefined {
  let only: Origin | undefined;
  for (const part of parts) {
    if (!('origin' in part) || (only !== undefined && part.origin !== only)) return undefined;
    only = part.origin;
  }
  return only;
}

function sameOrigin(one: Origin, other: Origin): boolean {
  return one === other
    || (one.station === other.station && one.product === other.product && one.characteristic === other.characteristic && one.lot === other.lot);
}
