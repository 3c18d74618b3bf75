import type { RecordRange } from '../window/record-identity.ts';
import { RecordWindow, type RecordWindowSnapshot } from '../window/record-window.ts';
import type { HeldRecords, RecordRun, RecordSum } from './held-records.ts';

interface NumberedSnapshot<T> {
  readonly window: RecordWindowSnapshot;
  readonly sum: T;
}

/** The last N records, or all since the last clear. */
export class NumberedRecords<T, S extends RecordSum<T, S>> implements HeldRecords<S> {
  readonly sum: S;
  readonly #window: RecordWindow;

  /** @param width numbers a record: 1 for a value, 2 for a count with its exposure */
  constructor(size: number | undefined, width: 1 | 2, sum: S) {
    this.sum = sum;
    this.#window = new RecordWindow({ width, ...(size === undefined ? {} : { size }) }, sum);
  }

  get size(): number | undefined {
    return this.#window.size;
  }

  get records(): number {
    return this.#window.records;
  }

  get ripe(): boolean {
    return this.size === undefined || this.#window.full;
  }

  announce(source: number, firstSequence: number, records: number): void {
    this.#window.admitRun(source, firstSequence, records);
  }

  admit(_at: number, a: number, b: number): boolean {
    this.#window.admit(a, b);
    this.#recount();
    return true;
  }

  fill(run: RecordRun): void {
    const { source, sequence, a, b } = run;
    this.#window.insertLate({ source, sequence, a, ...(b === undefined ? {} : { b }) });
    this.#recount();
  }

  correct(source: number, sequence: number, a: number, b: number): boolean {
    if (this.#window.correct(source, sequence, a, b) === 'not here') return false;
    this.#recount();
    return true;
  }

  nextDue(): number {
    return Infinity;
  }

  advance(): void {
    // Records leave this window by number, not by age.
  }

  clear(): void {
    this.#window.clear();
  }

  visit(see: (a: number, b: number) => void, most: number): void {
    this.#window.visit(see, most);
  }

  ranges(): readonly RecordRange[] {
    return this.#window.ranges();
  }

  snapshot(): NumberedSnapshot<T> {
    return { window: this.#window.snapshot(), sum: this.sum.snapshot() };
  }

  restore(from: NumberedSnapshot<T>): void {
    this.sum.restore(from.sum);
    this.#window.restore(from.window);
  }

  #recount(): void {
    if (this.sum.needsRecount === true) this.#window.recount();
  }
}
