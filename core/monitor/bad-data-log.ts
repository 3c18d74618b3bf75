/** Records that could not be believed, at one moment of the plant clock. */
interface Entry {
  readonly at: number;
  readonly records: number;
}

export type BadDataSnapshot = readonly Entry[];

/** Entries kept for a station; beyond that the two oldest are merged, so that a flood costs no memory. */
const mostEntries = 1024;

/** Bad records of one station over time: rejected, contradictory, implausibly timed or lost. */
export class BadDataLog {
  #entries: Entry[] = [];

  note(at: number, records: number): void {
    const newest = this.#entries.at(-1);
    if (newest && newest.at >= at) this.#entries[this.#entries.length - 1] = { at: newest.at, records: newest.records + records };
    else this.#entries.push({ at, records });
    const [first, second] = this.#entries;
    if (this.#entries.length > mostEntries && first && second) {
      this.#entries.splice(0, 2, { at: second.at, records: first.records + second.records });
    }
  }

  /** Bad records within the `spanMs` up to `at`. */
  within(at: number, spanMs: number): number {
    let records = 0;
    for (let place = this.#entries.length - 1; place >= 0; place -= 1) {
      const entry = this.#entries[place] as Entry;
      if (entry.at <= at - spanMs) break;
      records += entry.records;
    }
    return records;
  }

  /** The moment after `at` at which the oldest entry within the span falls out of it; Infinity if there is none. */
  nextFall(at: number, spanMs: number): number {
    const oldest = this.#entries.find((entry) => entry.at > at - spanMs);
    return oldest ? oldest.at + spanMs : Infinity;
  }

  snapshot(): BadDataSnapshot {
    return [...this.#entries];
  }

  restore(from: BadDataSnapshot): void {
    this.#entries = [...from];
  }
}
