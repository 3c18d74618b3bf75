/**
 * What the monitor takes in, all in one order: 'frame' holds a binary frame as core/protocol encodes it, 'act' a
 * person's act (JSON), 'tick' an advance of the clock that made something happen, 'plant' the text of a plant file,
 * 'refused' a count of refused frames of a source (JSON). Text is UTF-8.
 */
export type EntryKind = 'frame' | 'act' | 'tick' | 'plant' | 'refused';

/** One journal entry. Replaying the entries in the order of their ids gives the monitor's state. */
export interface Entry {
  /** Whole, 1 or more, strictly rising over the life of the data directory; gaps are allowed. */
  readonly id: number;
  /** When it was taken in, ms since 1970-01-01 UTC. */
  readonly at: number;
  readonly kind: EntryKind;
  /** Id of the source in the source register; undefined where no source sent it. */
  readonly sourceId: number | undefined;
  /** Sequence of the first record, 1 or more; undefined where there is none. */
  readonly firstSequence: number | undefined;
  /** Records in it, 0 or more. */
  readonly records: number;
  readonly body: Uint8Array;
}
