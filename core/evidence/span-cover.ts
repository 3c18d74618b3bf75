import type { TimeSpan } from '../window/time-steps.ts';

/**
 * Whether a window of time has covered its whole span since it last began: only then may it call a violation, like a
 * window of units that is full. A window that has run empty begins anew.
 */
export class SpanCover {
  /** Start of the step of the first record, ms; Infinity before it. */
  began = Infinity;
  readonly #span: TimeSpan;

  constructor(span: TimeSpan) {
    this.#span = span;
  }

  begin(at: number): void {
    if (this.began === Infinity) this.began = at - (at % this.#span.stepMs);
  }

  clear(): void {
    this.began = Infinity;
  }

  /** @param since start of the oldest step the window covers, ms */
  full(since: number): boolean {
    return since >= this.began;
  }

  /** Moment at which the window moves on by one step, ms. */
  stepAfter(since: number): number {
    return since + this.#span.spanMs + this.#span.stepMs;
  }
}
