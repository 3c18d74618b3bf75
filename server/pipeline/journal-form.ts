import type { Act } from '../../core/monitor/act.ts';
import type { Entry, EntryKind } from '../store/entry.ts';

/** JSON bodies of the journal, by kind; frames are binary, plant files are the text itself. */
export interface RefusedNote {
  readonly stations: readonly string[];
  readonly frames: number;
}

export interface PlantNote {
  readonly version: string;
  readonly text: string;
  /** Whether the plant clock followed the records from here on. */
  readonly clock: 'time' | 'records';
}

const encoder = new TextEncoder();
const decoder = new TextDecoder();
const noBytes = new Uint8Array(0);

export function noteBody(note: RefusedNote | PlantNote | Act): Uint8Array {
  return encoder.encode(JSON.stringify(note));
}

export const tickBody = noBytes;

/** What an entry that this program wrote says; its form is known from its kind. */
export function noteOf<K extends 'act' | 'plant' | 'refused'>(entry: Entry & { readonly kind: K }): NoteOf[K] {
  return JSON.parse(decoder.decode(entry.body)) as NoteOf[K];
}

interface NoteOf {
  readonly act: Act;
  readonly plant: PlantNote;
  readonly refused: RefusedNote;
}

export function isKind<K extends EntryKind>(entry: Entry, kind: K): entry is Entry & { readonly kind: K } {
  return entry.kind === kind;
}
