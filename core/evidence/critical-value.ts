/** Sizes told apart up to this; beyond, neighbours share a cell of the grid: 64 to each doubling. */
const cellsEach = 64;
/** Nearer than this to the ends of its cell a statistic is compared exactly. */
const slack = 1e-9;

/**
 * What a statistic of n values must reach for its bound to stand on a line: a t quantile, a tolerance factor. The record
 * path asks after every value; windows that grow have another n each time. The answer moves one way with n, so it is
 * computed at a grid of n only, and for an n between two of them only where a statistic falls between their answers:
 * the decision is exact, not an approximation.
 *
 * @source own derivation
 */
export class CriticalValue {
  readonly #of: (n: number) => number;
  readonly #grid = new Map<number, number>();
  #n = 0;
  #exact = NaN;

  /** @param of the value for n, rising or falling with n throughout */
  constructor(of: (n: number) => number) {
    this.#of = of;
  }

  /** Whether the statistic of n values reaches it; false for a statistic that is not a number. */
  reachedBy(statistic: number, n: number): boolean {
    if (n === this.#n) return statistic >= this.#exact;
    const cell = n < 2 * cellsEach ? 1 : 2 ** (Math.floor(Math.log2(n)) - Math.log2(cellsEach));
    if (cell > 1) {
      const from = n - (n % cell);
      const [one, other] = [this.#atGrid(from), this.#atGrid(from + cell)];
      const near = slack * (1 + Math.abs(one));
      if (statistic > Math.max(one, other) + near) return true;
      if (statistic < Math.min(one, other) - near) return false;
    }
    this.#n = n;
    this.#exact = cell > 1 ? this.#of(n) : this.#atGrid(n);
    return statistic >= this.#exact;
  }

  #atGrid(n: number): number {
    let known = this.#grid.get(n);
    if (known === undefined) {
      known = this.#of(n);
      this.#grid.set(n, known);
    }
    return known;
  }
}
