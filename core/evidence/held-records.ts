import type { RecordRange } from '../window/record-identity.ts';
import type { StoredSink } from '../window/record-sink.ts';

/** Records with their numbers, as columns: values alone, or counts with their exposure; as long as each other. */
export interface RecordColumns {
  readonly a: ArrayLike<number>;
  readonly b: ArrayLike<number> | undefined;
}

/** Consecutive records of one source with their times of inspection. */
export interface RecordRun extends RecordColumns {
  readonly source: number;
  readonly sequence: number;
  readonly timeOf: (index: number) => number;
}

/** What a window adds its records up to: a sink that can take in another one. */
export interface Addable<S> {
  include(other: S): void;
  /** Rounding has left too much behind: to be filled afresh. Absent where that cannot be. */
  readonly needsRecount?: boolean;
}

export type RecordSum<T, S> = StoredSink<T> & Addable<S>;

/** The records of a window, by number or by time, and what they add up to. */
export interface HeldRecords<S> {
  readonly sum: S;
  /** Records of the window; undefined where it has no size. */
  readonly size: number | undefined;
  readonly records: number;
  /** Whether the window may call a violation: full, or growing with no size of its own. */
  readonly ripe: boolean;
  /** Announces records that are admitted next. */
  announce(source: number, firstSequence: number, records: number): void;
  /** @returns whether the record counts: false if it is older than the window */
  admit(at: number, a: number, b: number): boolean;
  fill(run: RecordRun): void;
  /** @returns whether the record is here */
  correct(source: number, sequence: number, a: number, b: number): boolean;
  /** Moment at which the clock alone lets records go next; Infinity where it never does. */
  nextDue(): number;
  advance(at: number): void;
  clear(): void;
  /** Shows the newest records that are still known, at most `most`, oldest first. */
  visit(see: (a: number, b: number) => void, most: number): void;
  ranges(): readonly RecordRange[];
  snapshot(): unknown;
  restore(from: unknown): void;
}
