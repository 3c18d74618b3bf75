const minute = 60_000;
const mostKeys = 10_000;

/** Lets through each thing once a minute, and so many of all in a minute at most: nobody fills the disk by being refused. */
export class Sparing {
  readonly #most: number;
  readonly #now: () => number;
  readonly #last = new Map<string, number>();
  #begun = -Infinity;
  #let = 0;

  /** @param most a minute, 1 or more @param now wall time, ms */
  constructor(most: number, now: () => number) {
    this.#most = most;
    this.#now = now;
  }

  /** @param key what is the same thing; without one, only the most of all counts */
  lets(key?: string): boolean {
    const now = this.#now();
    if (now - this.#begun >= minute) {
      this.#begun = now;
      this.#let = 0;
    }
    if (this.#let >= this.#most || (key !== undefined && now - (this.#last.get(key) ?? -Infinity) < minute)) return false;
    this.#let += 1;
    if (key === undefined) return true;
    if (this.#last.size >= mostKeys) this.#last.clear();
    this.#last.set(key, now);
    return true;
  }
}
