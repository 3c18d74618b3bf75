import type { Batch } from '../evidence/evidence.ts';

/**
 * Keeps, of nonconforming units in a stream, those that begin an event: each that stands more than `gap` units behind
 * the nonconforming one before it, whether that began an event or not.
 */
export class EventSieve {
  readonly #gap: number;
  /** Units since the newest nonconforming one; Infinity before the first. */
  #since = Infinity;

  /** @param gap units, whole, 1 or more */
  constructor(gap: number) {
    this.#gap = gap;
  }

  get since(): number {
    return this.#since;
  }

  /** Takes up where another left off. */
  restore(since: number): void {
    this.#since = since;
  }

  beginAnew(): void {
    this.#since = Infinity;
  }

  /** Records with those nonconforming units alone that begin an event; of a tally, whose nonconforming units stand last, one at most. */
  batch(records: Batch): Batch {
    const { part, from, to, places } = records;
    if (part.kind === 'tallies') {
      const nonconforming = new Uint32Array(part.nonconforming);
      for (let place = from; place < to; place += 1) nonconforming[place] = this.#inTally(part.inspected[place] as number, part.nonconforming[place] as number);
      return { ...records, part: { ...part, nonconforming } };
    }
    return { ...records, places: this.#among(places, from, to) };
  }

  #among(places: Uint32Array, from: number, to: number): Uint32Array {
    let done = from;
    const begun = places.filter((place) => {
      const begins = this.#found(place - done);
      done = place + 1;
      return begins;
    });
    this.#since += to - done;
    return begun;
  }

  #inTally(inspected: number, nonconforming: number): number {
    if (nonconforming > 0) return this.#found(inspected - nonconforming) ? 1 : 0;
    this.#since += inspected;
    return 0;
  }

  /** A nonconforming unit after so many conforming ones. */
  #found(conforming: number): boolean {
    const begins = this.#since + conforming + 1 > this.#gap;
    this.#since = 0;
    return begins;
  }
}
