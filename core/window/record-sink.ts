/**
 * What a record window adds up. A record is one or two numbers: a measured value (`b` is 0), or a count `a` with its
 * exposure `b`. An object whose methods take the value alone fits, too.
 */
export interface RecordSink {
  admit(a: number, b: number): void;
  /** Takes back a record that was admitted. */
  drop(a: number, b: number): void;
  clear(): void;
}

/** A sink that can be stored as plain data and taken up again, to the last bit. */
export interface StoredSink<T> extends RecordSink {
  snapshot(): T;
  restore(snapshot: T): void;
}

/** Records that come after later ones of their source, `sequence` is the first one's. */
export interface LateRecords {
  readonly source: number;
  readonly sequence: number;
  readonly a: ArrayLike<number>;
  /** As long as `a`; 0 where it is left out. */
  readonly b?: ArrayLike<number>;
}

/** What a record said before and after its correction. */
export interface CorrectedRecord {
  readonly before: { readonly a: number; readonly b: number };
  readonly after: { readonly a: number; readonly b: number };
}
