import type { RecordRange } from './record-identity.ts';
import { SourceTally } from './source-tally.ts';

/** A record with nonconforming units. */
export interface MarkedRecord {
  readonly source: number;
  readonly sequence: number;
  readonly nonconforming: number;
}

/** Plain copy of one step; rows by source, then sequence. */
export interface StepTallySnapshot {
  readonly inspected: number;
  readonly nonconforming: number;
  /** Four numbers a row: source, first sequence, records, units a record. */
  readonly runs: Float64Array;
  /** Three numbers a row: source, sequence, nonconforming units. */
  readonly marks: Float64Array;
}

/** What was inspected in one step of a time window. */
export class StepTally {
  #inspected = 0;
  #nonconforming = 0;
  #rows = 0;
  readonly #sources = new Map<number, SourceTally>();

  get inspected(): number {
    return this.#inspected;
  }

  get nonconforming(): number {
    return this.#nonconforming;
  }

  /** Rows kept to find records again. */
  get rows(): number {
    return this.#rows;
  }

  /** Adds records, of which the first has `nonconforming` nonconforming units and all others none. */
  admit(source: number, first: number, records: number, unitsPerRecord: number, nonconforming: number): void {
    this.#inspected += records * unitsPerRecord;
    this.#nonconforming += nonconforming;
    const tally = this.#sources.get(source) ?? new SourceTally();
    this.#sources.set(source, tally);
    this.#rows -= tally.rows;
    tally.addRun({ first, records, unitsPerRecord });
    if (nonconforming > 0) tally.mark(first, nonconforming);
    this.#rows += tally.rows;
  }

  /** Units of the record, or undefined if it is not found here. */
  unitsOf(source: number, sequence: number): number | undefined {
    return this.#sources.get(source)?.unitsOf(sequence);
  }

  /** Gives a record found here other counts; returns its nonconforming units before. */
  correct(source: number, sequence: number, nonconforming: number, inspected: number): number {
    const tally = this.#sources.get(source);
    const units = tally?.unitsOf(sequence);
    if (tally === undefined || units === undefined) throw new Error(`record ${sequence} of source ${source} is not in this step`);
    this.#rows -= tally.rows;
    if (units !== inspected) tally.resize(sequence, inspected);
    const before = tally.unmark(sequence);
    if (nonconforming > 0) tally.mark(sequence, nonconforming);
    this.#rows += tally.rows;
    this.#inspected += inspected - units;
    this.#nonconforming += nonconforming - before;
    return before;
  }

  /** Keeps the counts, forgets which records they came from. */
  forgetRecords(): void {
    this.#sources.clear();
    this.#rows = 0;
  }

  /** Records found here, by source, then sequence. */
  ranges(): RecordRange[] {
    return this.#bySource().flatMap(([source, tally]) =>
      tally.runs.map(({ first, records }) => ({ source, first, last: first + records - 1 })),
    );
  }

  /** Records with nonconforming units, by source, then sequence. */
  marked(): MarkedRecord[] {
    return this.#bySource().flatMap(([source, tally]) => tally.marks.map((mark) => ({ source, ...mark })));
  }

  snapshot(): StepTallySnapshot {
    const runs = this.#bySource().flatMap(([source, tally]) =>
      tally.runs.flatMap(({ first, records, unitsPerRecord }) => [source, first, records, unitsPerRecord]),
    );
    const marks = this.marked().flatMap(({ source, sequence, nonconforming }) => [source, sequence, nonconforming]);
    return { inspected: this.#inspected, nonconforming: this.#nonconforming, runs: Float64Array.from(runs), marks: Float64Array.from(marks) };
  }

  restore({ inspected, nonconforming, runs, marks }: StepTallySnapshot): void {
    this.forgetRecords();
    for (let at = 0; at < runs.length; at += 4) {
      const [source, first, records, unitsPerRecord] = runs.subarray(at, at + 4);
      this.admit(source as number, first as number, records as number, unitsPerRecord as number, 0);
    }
    for (let at = 0; at < marks.length; at += 3) {
      const [source, sequence, found] = marks.subarray(at, at + 3);
      this.#sources.get(source as number)?.mark(sequence as number, found as number);
      this.#rows += 1;
    }
    this.#inspected = inspected;
    this.#nonconforming = nonconforming;
  }

  #bySource(): [source: number, tally: SourceTally][] {
    return [...this.#sources].sort((a, b) => a[0] - b[0]);
  }
}
