import type { RecordIdentity, RecordRange } from './record-identity.ts';
import { RecordRuns, type RecordRunsSnapshot } from './record-runs.ts';
import { SlidingColumns } from './sliding-columns.ts';

/** Plain copy of a record ring; one array a column, oldest record first. */
export interface RecordRingSnapshot {
  /** Ordinals of the oldest record that counts, and of the oldest whose numbers are held. */
  readonly start: number;
  readonly first: number;
  readonly columns: readonly Float64Array[];
  readonly runs: RecordRunsSnapshot;
}

/** Before which run of the index, and before which row; a row below 0 is one whose neighbours were forgotten. */
export interface LatePlace {
  readonly run: number;
  readonly row: number;
}

/**
 * The newest records with their numbers, oldest first, found by their source and sequence. Records are announced,
 * then pushed one by one.
 */
export class RecordRing {
  readonly #rows: SlidingColumns;
  readonly #runs: RecordRuns;
  /** Ordinal of the oldest record that was not dropped. */
  #start = 0;
  /** Ordinal of row 0; later than the start where numbers were forgotten. */
  #first = 0;

  /** @param width numbers a record, 1 to 3  @param most rows of the record index, 1 or more */
  constructor(width: number, most: number) {
    this.#rows = new SlidingColumns(width);
    this.#runs = new RecordRuns(most);
  }

  get length(): number {
    return this.#rows.length;
  }

  get byteLength(): number {
    return this.#rows.byteLength + this.#runs.byteLength;
  }

  /** Whether all announced records were pushed. */
  get settled(): boolean {
    return this.#runs.end === this.#first + this.#rows.length;
  }

  announce(source: number, firstSequence: number, records: number): void {
    this.#runs.announce(source, firstSequence, records, 1);
  }

  /** @throws Error where no record was announced */
  push(a: number, b: number, c: number): void {
    if (this.settled) throw new Error('a record was admitted that was not announced');
    this.#rows.push(a, b, c);
  }

  /** @param column 0 to width - 1 */
  get(column: number, row: number): number {
    return this.#rows.get(column, row);
  }

  set(column: number, row: number, value: number): void {
    this.#rows.set(column, row, value);
  }

  /** Records leave for good. */
  dropOldest(records: number): void {
    this.forgetOldest(records);
    this.#start = this.#first;
    this.#runs.dropBefore(this.#first);
  }

  /** Records' numbers are given up; that they are here is still known. */
  forgetOldest(records: number): void {
    this.#rows.dropOldest(records);
    this.#first += records;
  }

  /** Row of the record, or undefined if it is not here. */
  rowOf(source: number, sequence: number): number | undefined {
    const ordinal = this.#runs.find(source, sequence)?.first;
    return ordinal !== undefined && ordinal >= this.#first && ordinal < this.#first + this.#rows.length ? ordinal - this.#first : undefined;
  }

  identityOf(row: number): RecordIdentity | undefined {
    return this.#runs.identityAt(this.#first + row);
  }

  /** Where late records of the source belong: after its nearest lower sequence; undefined if there is none here. */
  placeAfter(source: number, sequence: number): LatePlace | undefined {
    const run = this.#runs.rowAfter(source, sequence);
    return run === undefined ? undefined : { run, row: this.#runs.startOf(run) - this.#first };
  }

  /** The place before everything that counts. */
  oldestPlace(): LatePlace {
    this.#runs.trimBefore(this.#start);
    return { run: 0, row: this.#runs.startOf(0) - this.#first };
  }

  /** Takes up late records at their place; their rows are open for their numbers, unless the place is a forgotten one. */
  insert(place: LatePlace, source: number, firstSequence: number, records: number): void {
    this.#runs.insert(place.run, source, firstSequence, records, 1);
    if (place.row < 0) this.#first += records;
    else this.#rows.open(place.row, records);
  }

  ranges(): RecordRange[] {
    return this.#runs.ranges(this.#start, this.#first + this.#rows.length);
  }

  clear(): void {
    this.#first += this.#rows.length;
    this.#start = this.#first;
    this.#rows.clear();
    this.#runs.clear();
  }

  snapshot(): RecordRingSnapshot {
    return {
      start: this.#start,
      first: this.#first,
      columns: this.#rows.snapshot(),
      runs: this.#runs.snapshot(this.#start),
    };
  }

  restore(snapshot: RecordRingSnapshot): void {
    this.#rows.restore(snapshot.columns);
    this.#runs.restore(snapshot.runs);
    this.#start = snapshot.start;
    this.#first = snapshot.first;
  }
}
