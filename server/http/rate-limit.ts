interface Bucket {
  tokens: number;
  at: number;
}

const mostAddresses = 20_000;

/** So many requests a second an address, with a burst; more are told when to come again. */
export class RateLimit {
  readonly #perSecond: number;
  readonly #burst: number;
  readonly #now: () => number;
  readonly #buckets = new Map<string, Bucket>();

  /** @param now wall time, ms */
  constructor(perSecond: number, burst: number, now: () => number = Date.now) {
    this.#perSecond = perSecond;
    this.#burst = burst;
    this.#now = now;
  }

  /** Takes one. @returns 0, or how long to wait, ms */
  take(address: string): number {
    const now = this.#now();
    const known = this.#buckets.get(address);
    const tokens = known === undefined ? this.#burst : Math.min(this.#burst, known.tokens + ((now - known.at) / 1000) * this.#perSecond);
    const left = tokens >= 1 ? tokens - 1 : tokens;
    this.#buckets.delete(address);
    this.#buckets.set(address, { tokens: left, at: now });
    if (this.#buckets.size > mostAddresses) this.#forgetOldest();
    return tokens >= 1 ? 0 : Math.ceil(((1 - tokens) / this.#perSecond) * 1000);
  }

  #forgetOldest(): void {
    const [oldest] = this.#buckets.keys();
    if (oldest !== undefined) this.#buckets.delete(oldest);
  }
}
