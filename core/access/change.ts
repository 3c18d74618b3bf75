import type { Json } from './canonical-json.ts';

/** What the record of changes speaks of. */
export const changeKinds = [
  'acknowledge',
  'restart',
  'plant',
  'source-made',
  'token-renewed',
  'token-withdrawn',
  'refused',
  'sign-in',
  'sign-in-failed',
  'sign-out',
  'account',
  'invitation',
  'session',
  'token',
  'display',
  'passkey',
  'pin',
] as const;
export type ChangeKind = (typeof changeKinds)[number];

/** Something that changed the meaning of a figure or an alarm, or who may do so: one line of the record of changes. */
export interface Change {
  readonly kind: ChangeKind;
  /** The person's name as given, or the program's part that did it. */
  readonly who: string;
  /** Which alarm, guarantee, file or source. */
  readonly what: string;
  readonly before: Json;
  readonly after: Json;
  /** The reason given; empty where none was asked for. */
  readonly why: string;
  /** Id of the journal entry that carries it; null where there is none. */
  readonly entry: number | null;
}

/** A change in its place in the record. */
export interface RecordedChange extends Change {
  /** Whole, 1 or more, without gaps. */
  readonly id: number;
  /** Wall time, ms since 1970-01-01 UTC. */
  readonly at: number;
  /** SHA-256 of the hash before and this record's canonical JSON, 64 hexadecimal digits. */
  readonly hash: string;
}
