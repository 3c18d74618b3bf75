import type { Entry, EntryKind } from './entry.ts';

/** Stored codes of the kinds, from 1 up in this order; never reordered. */
const kinds: readonly EntryKind[] = ['frame', 'act', 'tick', 'plant', 'refused'];
/** id, at, kind code, source id, first sequence, records, bytes of the body; NaN where there is none. */
const figuresEach = 7;

/** Entries as two buffers that change threads without a copy. */
export interface PackedEntries {
  readonly figures: Float64Array<ArrayBuffer>;
  /** All bodies, one behind the other. */
  readonly bodies: Uint8Array<ArrayBuffer>;
}

export function kindCode(kind: EntryKind): number {
  return kinds.indexOf(kind) + 1;
}

export function kindOfCode(code: number): EntryKind {
  const kind = kinds[code - 1];
  if (kind === undefined) throw new RangeError(`Journal kind ${code}: expected 1 to ${kinds.length}.`);
  return kind;
}

export function packEntries(entries: readonly Entry[]): PackedEntries {
  const figures = new Float64Array(entries.length * figuresEach);
  const bodies = new Uint8Array(entries.reduce((bytes, entry) => bytes + entry.body.length, 0));
  let offset = 0;
  entries.forEach(({ id, at, kind, sourceId, firstSequence, records, body }, index) => {
    figures.set([id, at, kindCode(kind), sourceId ?? NaN, firstSequence ?? NaN, records, body.length], index * figuresEach);
    bodies.set(body, offset);
    offset += body.length;
  });
  return { figures, bodies };
}

/** Bodies of the answer are views of the packed ones. */
export function unpackEntries({ figures, bodies }: PackedEntries): Entry[] {
  const entries: Entry[] = [];
  let offset = 0;
  for (let at = 0; at < figures.length; at += figuresEach) {
    const figure = (place: number): number => figures[at + place] as number;
    entries.push({
      id: figure(0),
      at: figure(1),
      kind: kindOfCode(figure(2)),
      sourceId: present(figure(3)),
      firstSequence: present(figure(4)),
      records: figure(5),
      body: bodies.subarray(offset, (offset += figure(6))),
    });
  }
  return entries;
}

const present = (figure: number): number | undefined => (Number.isNaN(figure) ? undefined : figure);
