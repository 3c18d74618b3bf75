interface Held<T> {
  readonly value: T;
  readonly until: number;
}

/** Things that are waited for a few minutes and used once: challenges, tickets, sign-ins under way. Bounded; forgotten at a stop. */
export class ShortLived<T> {
  readonly #held = new Map<string, Held<T>>();
  readonly #forMs: number;
  readonly #most: number;
  readonly #now: () => number;

  constructor(forMs: number, most: number, now: () => number) {
    this.#forMs = forMs;
    this.#most = most;
    this.#now = now;
  }

  hold(key: string, value: T): void {
    const now = this.#now();
    for (const [old, { until }] of this.#held) {
      if (until > now && this.#held.size < this.#most) break;
      this.#held.delete(old);
    }
    this.#held.set(key, { value, until: now + this.#forMs });
  }

  /** Without using it up. */
  look(key: string): T | undefined {
    const held = this.#held.get(key);
    return held !== undefined && held.until > this.#now() ? held.value : undefined;
  }

  /** Once. */
  take(key: string): T | undefined {
    const value = this.look(key);
    this.#held.delete(key);
    return value;
  }
}
