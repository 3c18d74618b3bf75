/** Records without a hole, all of the same number of units. */
interface TallyRun {
  readonly first: number;
  records: number;
  readonly unitsPerRecord: number;
}

/** A record with nonconforming units. */
interface Mark {
  readonly sequence: number;
  readonly nonconforming: number;
}

/**
 * The records of one source in one step of a time window, by sequence. Their order of arrival means nothing: runs
 * join whenever they meet, so the rows are the same in whatever order and pieces the records came.
 */
export class SourceTally {
  readonly #runs: TallyRun[] = [];
  readonly #marks: Mark[] = [];

  /** Rows kept. */
  get rows(): number {
    return this.#runs.length + this.#marks.length;
  }

  get runs(): readonly Readonly<TallyRun>[] {
    return this.#runs;
  }

  get marks(): readonly Mark[] {
    return this.#marks;
  }

  /** Adds records that conform. */
  addRun(added: TallyRun): void {
    const before = this.#runs.findLastIndex((run) => run.first <= added.first);
    this.#runs.splice(before + 1, 0, added);
    this.#join(before + 1);
    this.#join(before);
  }

  /** Marks a record as having nonconforming units, 1 or more. */
  mark(sequence: number, nonconforming: number): void {
    const before = this.#marks.findLastIndex((mark) => mark.sequence < sequence);
    this.#marks.splice(before + 1, 0, { sequence, nonconforming });
  }

  /** Takes a record's mark away; returns the nonconforming units it had. */
  unmark(sequence: number): number {
    const at = this.#marks.findIndex((mark) => mark.sequence === sequence);
    return at < 0 ? 0 : (this.#marks.splice(at, 1)[0]?.nonconforming ?? 0);
  }

  /** Units of the record, or undefined if it is not here. */
  unitsOf(sequence: number): number | undefined {
    return this.#runs[this.#runOf(sequence)]?.unitsPerRecord;
  }

  /** Gives one record that is here another number of units. */
  resize(sequence: number, inspected: number): void {
    const at = this.#runOf(sequence);
    for (const { first, records, unitsPerRecord } of this.#runs.splice(at, 1)) {
      const parts = [
        { first, records: sequence - first, unitsPerRecord },
        { first: sequence, records: 1, unitsPerRecord: inspected },
        { first: sequence + 1, records: first + records - sequence - 1, unitsPerRecord },
      ];
      for (const part of parts) if (part.records > 0) this.addRun(part);
    }
  }

  #runOf(sequence: number): number {
    return this.#runs.findLastIndex((run) => run.first <= sequence && sequence < run.first + run.records);
  }

  /** Makes the run one with the next where that continues it. */
  #join(at: number): void {
    const [run, next] = [this.#runs[at], this.#runs[at + 1]];
    if (run === undefined || next === undefined) return;
    if (run.unitsPerRecord !== next.unitsPerRecord || run.first + run.records !== next.first) return;
    run.records += next.records;
    this.#runs.splice(at + 1, 1);
  }
}
