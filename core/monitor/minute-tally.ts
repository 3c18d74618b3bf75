/** What one guarantee saw in one minute of the plant clock. */
export interface MinuteCount {
  readonly minute: number;
  readonly inspected: number;
  readonly nonconforming: number;
}

/** Counts by minute of inspection until the minute is over and they are written down. */
export class MinuteTally {
  readonly #open = new Map<number, { inspected: number; nonconforming: number }>();

  /** Minutes not yet written down. */
  get size(): number {
    return this.#open.size;
  }

  note(minute: number, inspected: number, nonconforming: number): void {
    const known = this.#open.get(minute);
    if (known === undefined) this.#open.set(minute, { inspected, nonconforming });
    else {
      known.inspected += inspected;
      known.nonconforming += nonconforming;
    }
  }

  /** Takes out the minutes that begin before `before`, oldest first. */
  closeBefore(before: number): MinuteCount[] {
    const closed: MinuteCount[] = [];
    for (const [minute, count] of this.#open) {
      if (minute < before) closed.push({ minute, ...count });
    }
    for (const { minute } of closed) this.#open.delete(minute);
    return closed.sort((a, b) => a.minute - b.minute);
  }

  snapshot(): MinuteCount[] {
    return [...this.#open].map(([minute, count]) => ({ minute, ...count }));
  }

  restore(from: readonly MinuteCount[]): void {
    this.#open.clear();
    for (const { minute, inspected, nonconforming } of from) this.#open.set(minute, { inspected, nonconforming });
  }
}
