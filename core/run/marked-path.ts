export interface MarkedPathSnapshot {
  readonly at: readonly number[];
  readonly columns: readonly (readonly number[])[];
  readonly every: number;
  readonly passed: number;
}

/** Marks kept at most. */
const most = 120;

/**
 * Where figures stood at the marks of the plant clock, oldest first; at most 120 marks. Kept 'from the beginning', a full
 * path lets every second mark go and from then on takes every second one; kept 'lately', the oldest goes.
 */
export class MarkedPath {
  readonly #kept: 'from the beginning' | 'lately';
  #at: number[] = [];
  #columns: number[][];
  /** Of so many marks one is taken; how many have passed since the last. */
  #every = 1;
  #passed = 0;

  /** @param width figures of a mark */
  constructor(kept: 'from the beginning' | 'lately', width: number) {
    this.#kept = kept;
    this.#columns = Array.from({ length: width }, () => []);
  }

  /** ms */
  get at(): readonly number[] {
    return this.#at;
  }

  /** One a figure, as long as `at`. */
  get columns(): readonly (readonly number[])[] {
    return this.#columns;
  }

  /** @param figures finite; a mark with one that is not is left out */
  mark(at: number, figures: readonly number[]): void {
    this.#passed += 1;
    if (this.#passed < this.#every || !figures.every(Number.isFinite)) return;
    this.#passed = 0;
    this.#at.push(at);
    this.#columns.forEach((column, place) => column.push(figures[place] as number));
    if (this.#at.length > most) this.#shorten();
  }

  clear(): void {
    this.#at = [];
    this.#columns = this.#columns.map(() => []);
    this.#every = 1;
    this.#passed = 0;
  }

  snapshot(): MarkedPathSnapshot {
    return { at: [...this.#at], columns: this.#columns.map((column) => [...column]), every: this.#every, passed: this.#passed };
  }

  restore({ at, columns, every, passed }: MarkedPathSnapshot): void {
    this.#at = [...at];
    this.#columns = columns.map((column) => [...column]);
    this.#every = every;
    this.#passed = passed;
  }

  #shorten(): void {
    if (this.#kept === 'lately') {
      this.#at.shift();
      for (const column of this.#columns) column.shift();
      return;
    }
    const half = <T>(all: readonly T[]): T[] => all.filter((_, place) => place % 2 === 0);
    this.#at = half(this.#at);
    this.#columns = this.#columns.map(half);
    this.#every *= 2;
  }
}
