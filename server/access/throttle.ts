/** How failures of one kind are slowed down. */
export interface ThrottleRule {
  /** Failures that cost nothing. */
  readonly free: number;
  /** Wait after the next one, ms; doubled with each further one up to the most. */
  readonly first: number;
  readonly most: number;
}

interface Failures {
  count: number;
  last: number;
}

/** Failures are forgotten after an hour without another. */
const forgottenMs = 3_600_000;
const mostKeys = 10_000;

/**
 * Slows down guessing: waits grow with the failures of a key and fade with time; nobody is locked out for good. A try
 * counts as a failure until it has succeeded, so that many at the same time are no way around.
 */
export class Throttle {
  readonly #rule: ThrottleRule;
  readonly #now: () => number;
  readonly #failures = new Map<string, Failures>();

  /** @param now wall time, ms */
  constructor(rule: ThrottleRule, now: () => number) {
    this.#rule = rule;
    this.#now = now;
  }

  /** How long a key has to wait before its next try, ms; 0 if not at all. */
  wait(key: string): number {
    const failures = this.#failures.get(key);
    if (failures === undefined) return 0;
    const since = this.#now() - failures.last;
    if (since >= forgottenMs) {
      this.#failures.delete(key);
      return 0;
    }
    const over = failures.count - this.#rule.free;
    return over <= 0 ? 0 : Math.max(0, Math.min(this.#rule.most, this.#rule.first * 2 ** (over - 1)) - since);
  }

  tried(key: string): void {
    const count = (this.#failures.get(key)?.count ?? 0) + 1;
    this.#failures.delete(key);
    this.#failures.set(key, { count, last: this.#now() });
    if (this.#failures.size <= mostKeys) return;
    const [oldest] = this.#failures.keys();
    if (oldest !== undefined) this.#failures.delete(oldest);
  }

  /** A try that was none: of one that succeeded, where failures from the same place before it still count. */
  untried(key: string): void {
    const failures = this.#failures.get(key);
    if (failures !== undefined) failures.count -= 1;
  }

  succeeded(key: string): void {
    this.#failures.delete(key);
  }
}
