import type { RecordRange } from '../window/record-identity.ts';

export type RecordSpansSnapshot = readonly (readonly [source: number, floor: number, first: number, last: number, lost: number])[];

interface Span {
  /** Records below this came before the beginning. */
  floor: number;
  /** 0 while none has come. */
  first: number;
  last: number;
  /** Newest record that was declared lost; 0 if none. */
  lost: number;
}

/** Which records came since a beginning: one span a source, however long it goes on. A span may hold records of other stations of its source. */
export class RecordSpans {
  readonly #spans = new Map<number, Span>();

  note(source: number, first: number, last: number): void {
    const known = this.#spans.get(source);
    if (known === undefined) this.#spans.set(source, { floor: 0, first, last, lost: 0 });
    else {
      if (known.first === 0 || first < known.first) known.first = first;
      if (last > known.last) known.last = last;
    }
  }

  /** Records up to `last` were declared lost; they may come late. */
  noteLost(source: number, last: number): void {
    const known = this.#spans.get(source);
    if (known === undefined) this.#spans.set(source, { floor: 0, first: 0, last: 0, lost: last });
    else if (last > known.lost) known.lost = last;
  }

  /** Everything that came or was declared lost so far lies before the beginning. */
  beginAnew(): void {
    for (const span of this.#spans.values()) {
      span.floor = Math.max(span.floor, span.last + 1, span.lost + 1);
      span.first = 0;
    }
  }

  /** Whether a record that came late belongs before the beginning. */
  isBefore(source: number, sequence: number): boolean {
    return sequence < (this.#spans.get(source)?.floor ?? 0);
  }

  /** Whether a record came since the beginning. */
  holds(source: number, sequence: number): boolean {
    const span = this.#spans.get(source);
    return span !== undefined && span.first > 0 && sequence >= span.first && sequence <= span.last;
  }

  /** By source. */
  ranges(): RecordRange[] {
    const ranges = [...this.#spans].filter(([, { first }]) => first > 0).map(([source, { first, last }]) => ({ source, first, last }));
    return ranges.sort((a, b) => a.source - b.source);
  }

  snapshot(): RecordSpansSnapshot {
    return [...this.#spans].map(([source, { floor, first, last, lost }]) => [source, floor, first, last, lost] as const).sort((a, b) => a[0] - b[0]);
  }

  restore(from: RecordSpansSnapshot): void {
    this.#spans.clear();
    for (const [source, floor, first, last, lost] of from) this.#spans.set(source, { floor, first, last, lost });
  }
}
