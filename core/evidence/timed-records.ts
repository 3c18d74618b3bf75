import type { RecordRange } from '../window/record-identity.ts';
import { RecordTimeWindow, type RecordTimeWindowSnapshot } from '../window/record-time-window.ts';
import type { TimeSpan } from '../window/time-steps.ts';
import type { HeldRecords, RecordRun, RecordSum } from './held-records.ts';
import { SpanCover } from './span-cover.ts';

interface TimedSnapshot<T> {
  readonly window: RecordTimeWindowSnapshot<T>;
  readonly sum: T;
  readonly began: number;
}

/**
 * The records of the last span of time. Their sum goes along with each admission and is put together afresh from the
 * steps' sums whenever records leave or change, so that rounding cannot pile up.
 */
export class TimedRecords<T, S extends RecordSum<T, S>> implements HeldRecords<S> {
  readonly size = undefined;
  readonly sum: S;
  readonly #window: RecordTimeWindow<T, S>;
  readonly #cover: SpanCover;

  constructor(span: TimeSpan, emptySum: () => S) {
    this.sum = emptySum();
    this.#window = new RecordTimeWindow<T, S>(span, emptySum);
    this.#cover = new SpanCover(span);
  }

  get records(): number {
    return this.#window.records;
  }

  get ripe(): boolean {
    return this.#cover.full(this.#window.since);
  }

  announce(source: number, firstSequence: number, records: number): void {
    this.#window.admitRun(source, firstSequence, records);
  }

  admit(at: number, a: number, b: number): boolean {
    if (!this.#window.admit(at, a, b)) return false;
    this.#cover.begin(at);
    this.sum.admit(a, b);
    return true;
  }

  fill({ source, sequence, a, b, timeOf }: RecordRun): void {
    const at = Float64Array.from(a, (_, index) => timeOf(index));
    this.#window.insertLate({ source, sequence, at, a, ...(b === undefined ? {} : { b }) });
    if (this.records > 0) this.#cover.begin(at[0] as number);
    this.#addUp();
  }

  correct(source: number, sequence: number, a: number, b: number): boolean {
    if (this.#window.correct(source, sequence, a, b) === 'not here') return false;
    this.#addUp();
    return true;
  }

  nextDue(): number {
    return this.records === 0 ? Infinity : this.#cover.stepAfter(this.#window.since);
  }

  advance(at: number): void {
    const before = this.records;
    this.#window.advance(at);
    if (this.records === 0) this.#cover.clear();
    if (this.records !== before) this.#addUp();
  }

  clear(): void {
    this.#window.clear();
    this.#cover.clear();
    this.sum.clear();
  }

  visit(see: (a: number, b: number) => void, most: number): void {
    this.#window.visit(see, most);
  }

  ranges(): readonly RecordRange[] {
    return this.#window.ranges();
  }

  snapshot(): TimedSnapshot<T> {
    return { window: this.#window.snapshot(), sum: this.sum.snapshot(), began: this.#cover.began };
  }

  restore(from: TimedSnapshot<T>): void {
    this.#window.restore(from.window);
    this.sum.restore(from.sum);
    this.#cover.began = from.began;
  }

  #addUp(): void {
    this.sum.clear();
    for (const sum of this.#window.sinks()) this.sum.include(sum);
  }
}
