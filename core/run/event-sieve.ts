/**
 * Keeps, of nonconforming units in a stream, those that begin an event: each that stands more than `gap` units behind
 * the nonconforming one before it, whether that began an event or not.
 */
export class EventSieve {
  readonly #gap: number;
  /** Units since the newest nonconforming one; Infinity before the first. */
  #since = Infinity;

  /** @param gap units, whole, 1 or more; 0 lets every unit through */
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

  /**
   * Moves over units `from` to `to` of a record batch.
   *
   * @param places of the nonconforming ones, rising
   * @returns those of them that begin an event
   */
  over(places: ArrayLike<number>, from: number, to: number): ArrayLike<number> {
    if (this.#gap === 0) return places;
    const begun: number[] = [];
    let done = from;
    for (let k = 0; k < places.length; k += 1) {
      const place = places[k] as number;
      if (this.#found(place - done)) begun.push(place);
      done = place + 1;
    }
    this.#since += to - done;
    return begun;
  }

  /** The same for a tally, whose nonconforming units stand last. @returns how many events begin in it */
  overTally(inspected: number, nonconforming: number): number {
    if (this.#gap === 0) return nonconforming;
    if (nonconforming === 0) {
      this.#since += inspected;
      return 0;
    }
    return this.#found(inspected - nonconforming) ? 1 : 0;
  }

  /** A nonconforming unit after so many conforming ones. */
  #found(conforming: number): boolean {
    const begins = this.#since + conforming + 1 > this.#gap;
    this.#since = 0;
    return begins;
  }
}
