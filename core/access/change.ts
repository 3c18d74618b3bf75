import type { Json } from './canonical-json.ts';

/** What the record of changes speaks of. */
export type ChangeKind = 'acknowledge' | 'restart' | 'plant' | 'source-made' | 'token-renewed' | 'token-withdrawn';

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
