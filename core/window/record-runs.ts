import { joinedRanges, type RecordIdentity, type RecordRange } from './record-identity.ts';
import { SlidingColumns } from './sliding-columns.ts';

const source = 0;
const sequence = 1;
const ordinal = 2;
const units = 3;

/** Where a record's units stand: ordinals first to end - 1. */
export interface RecordPlace {
  readonly run: number;
  readonly first: number;
  readonly end: number;
}

/** Columns source, first sequence, first ordinal, units a record, oldest run first; and the ordinal after the last run. */
export interface RecordRunsSnapshot {
  readonly columns: readonly Float64Array[];
  readonly end: number;
}

/**
 * Which record stands at which ordinal. Runs of records that follow each other in both are one row; the rows tile
 * the ordinals without a gap, so a run ends where the next begins. The sequences of one source rise with the ordinals.
 * At most `most` rows are kept; beyond, the oldest are forgotten, and their records are no longer found.
 */
export class RecordRuns {
  readonly #most: number;
  readonly #rows = new SlidingColumns(4);
  #end = 0;

  /** @param most rows kept, 1 or more */
  constructor(most: number) {
    this.#most = most;
  }

  get byteLength(): number {
    return this.#rows.byteLength;
  }

  /** Ordinal after the last announced unit. */
  get end(): number {
    return this.#end;
  }

  /** First ordinal of a row; `end` beyond the last. */
  startOf(run: number): number {
    return run < this.#rows.length ? this.#rows.get(ordinal, run) : this.#end;
  }

  /** Appends records of one source, each of `unitsPerRecord` units. */
  announce(from: number, firstSequence: number, records: number, unitsPerRecord: number): void {
    const rows = this.#rows;
    const last = rows.length - 1;
    if (last < 0 || !this.#continues(last, from, firstSequence, unitsPerRecord)) {
      rows.push(from, firstSequence, this.#end, unitsPerRecord);
      if (rows.length > this.#most) rows.dropOldest(1);
    }
    this.#end += records * unitsPerRecord;
  }

  /** Where the record stands, or undefined if it is not indexed. */
  find(from: number, wanted: number): RecordPlace | undefined {
    const run = this.#runAtOrBelow(from, wanted);
    if (run < 0) return undefined;
    const per = this.#rows.get(units, run);
    const first = this.#rows.get(ordinal, run) + (wanted - this.#rows.get(sequence, run)) * per;
    return first < this.startOf(run + 1) ? { run, first, end: first + per } : undefined;
  }

  /** The record whose unit has this ordinal, or undefined if it is not indexed. */
  identityAt(wanted: number): RecordIdentity | undefined {
    const run = this.#rows.rowFrom(ordinal, wanted + 1) - 1;
    if (run < 0 || wanted >= this.#end) return undefined;
    return { source: this.#rows.get(source, run), sequence: this.#sequenceAt(run, wanted) };
  }

  /** Row before which late records of the source belong: after its nearest lower sequence; undefined if there is none. */
  rowAfter(from: number, firstSequence: number): number | undefined {
    const run = this.#runAtOrBelow(from, firstSequence);
    return run < 0 ? undefined : run + 1;
  }

  /** Puts late records before row `run`; everything newer moves on. Returns the first one's ordinal. */
  insert(run: number, from: number, firstSequence: number, records: number, unitsPerRecord: number): number {
    const at = this.startOf(run);
    this.#rows.open(run, 1);
    this.#write(run, from, firstSequence, at, unitsPerRecord);
    this.#move(run + 1, records * unitsPerRecord);
    this.#join(run + 1);
    this.#join(run);
    if (this.#rows.length > this.#most) this.#rows.dropOldest(1);
    return at;
  }

  /** Gives one record another number of units; everything newer moves by `shift`. */
  resize(place: RecordPlace, wanted: number, unitsPerRecord: number, shift: number): void {
    const rows = this.#rows;
    const { run } = place;
    const [from, per] = [rows.get(source, run), rows.get(units, run)];
    const hasBefore = place.first > rows.get(ordinal, run);
    const hasAfter = place.end < this.startOf(run + 1);
    const own = hasBefore ? run + 1 : run;
    if (hasBefore) rows.open(own, 1);
    if (hasAfter) {
      rows.open(own + 1, 1);
      this.#write(own + 1, from, wanted + 1, place.end, per);
    }
    this.#write(own, from, wanted, place.first, unitsPerRecord);
    this.#move(own + 1, shift);
    this.#join(own + 1);
    this.#join(own);
  }

  /** Forgets the runs that end at or before the ordinal. */
  dropBefore(first: number): void {
    while (this.#rows.length > 0 && this.startOf(1) <= first) this.#rows.dropOldest(1);
  }

  /** Forgets the records that end at or before the ordinal. */
  trimBefore(first: number): void {
    this.dropBefore(first);
    if (this.#rows.length === 0) return;
    const [at, per] = [this.#rows.get(ordinal, 0), this.#rows.get(units, 0)];
    const left = Math.max(0, Math.floor((first - at) / per));
    this.#rows.set(sequence, 0, this.#rows.get(sequence, 0) + left);
    this.#rows.set(ordinal, 0, at + left * per);
  }

  /** Records with a unit from ordinal `first` to before `end`, joined source by source. */
  ranges(first: number, end: number): RecordRange[] {
    const found: RecordRange[] = [];
    for (let run = 0; run < this.#rows.length; run += 1) {
      const from = Math.max(first, this.startOf(run));
      const to = Math.min(end, this.startOf(run + 1));
      if (from >= to) continue;
      found.push({ source: this.#rows.get(source, run), first: this.#sequenceAt(run, from), last: this.#sequenceAt(run, to - 1) });
    }
    return joinedRanges(found);
  }

  /** Forgets everything; ordinals go on. */
  clear(): void {
    this.#rows.clear();
  }

  /** @param first records wholly before this ordinal are left out */
  snapshot(first: number): RecordRunsSnapshot {
    this.trimBefore(first);
    return { columns: this.#rows.snapshot(), end: this.#end };
  }

  restore(snapshot: RecordRunsSnapshot): void {
    this.#rows.restore(snapshot.columns);
    this.#end = snapshot.end;
  }

  #sequenceAt(run: number, wanted: number): number {
    const rows = this.#rows;
    return rows.get(sequence, run) + Math.floor((wanted - rows.get(ordinal, run)) / rows.get(units, run));
  }

  #runAtOrBelow(from: number, wanted: number): number {
    let run = this.#rows.length - 1;
    while (run >= 0 && (this.#rows.get(source, run) !== from || this.#rows.get(sequence, run) > wanted)) run -= 1;
    return run;
  }

  #continues(run: number, from: number, firstSequence: number, unitsPerRecord: number): boolean {
    const rows = this.#rows;
    return (
      rows.get(source, run) === from &&
      rows.get(units, run) === unitsPerRecord &&
      rows.get(sequence, run) + (this.startOf(run + 1) - rows.get(ordinal, run)) / unitsPerRecord === firstSequence
    );
  }

  #write(run: number, from: number, firstSequence: number, at: number, unitsPerRecord: number): void {
    this.#rows.set(source, run, from);
    this.#rows.set(sequence, run, firstSequence);
    this.#rows.set(ordinal, run, at);
    this.#rows.set(units, run, unitsPerRecord);
  }

  #move(run: number, by: number): void {
    this.#rows.shift(ordinal, run, by);
    this.#end += by;
  }

  /** Makes row `run` one with the row before where it continues it. */
  #join(run: number): void {
    const rows = this.#rows;
    if (run < 1 || run >= rows.length) return;
    if (this.#continues(run - 1, rows.get(source, run), rows.get(sequence, run), rows.get(units, run))) rows.close(run, 1);
  }
}
