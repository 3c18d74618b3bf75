const firstRoom = 16;

/**
 * Rows of numbers, oldest first, that grow at the new end and shrink at the old one: a queue whose rows lie side by
 * side in memory, so that a search needs no wrapping and a row in the middle can be put in or taken out by one move.
 * Room follows what is held, up and down: between 4/3 and 8/3 of it at each move.
 */
export class SlidingColumns {
  readonly #columns: Float64Array[];
  #from = 0;
  #to = 0;

  /** @param width numbers a row, 1 to 4 */
  constructor(width: number) {
    this.#columns = Array.from({ length: width }, () => new Float64Array(firstRoom));
  }

  /** Rows held. */
  get length(): number {
    return this.#to - this.#from;
  }

  /** Bytes of all arrays, spare room included. */
  get byteLength(): number {
    return this.#columns.reduce((sum, column) => sum + column.byteLength, 0);
  }

  /** @param row 0 (oldest) to length - 1 */
  get(column: number, row: number): number {
    return (this.#columns[column] as Float64Array)[this.#from + row] as number;
  }

  set(column: number, row: number, value: number): void {
    (this.#columns[column] as Float64Array)[this.#from + row] = value;
  }

  /** Adds one row at the new end; columns not given are 0, those beyond the width are not kept. */
  push(a: number, b = 0, c = 0, d = 0): void {
    this.#makeRoom(1);
    const at = this.#to;
    this.#to += 1;
    const [first, second, third, fourth] = this.#columns;
    if (first !== undefined) first[at] = a;
    if (second !== undefined) second[at] = b;
    if (third !== undefined) third[at] = c;
    if (fourth !== undefined) fourth[at] = d;
  }

  /** Adds a row a number at the new end, in the first column; the others are 0. */
  pushAll(numbers: Float64Array): void {
    this.#makeRoom(numbers.length);
    const [first, ...others] = this.#columns;
    first?.set(numbers, this.#to);
    for (const column of others) column.fill(0, this.#to, this.#to + numbers.length);
    this.#to += numbers.length;
  }

  /** Removes the `rows` oldest rows. */
  dropOldest(rows: number): void {
    this.#from += rows;
    if (this.#from === this.#to) this.clear();
  }

  /** Opens `rows` rows of unsettled content before row `at` (0 to length). */
  open(at: number, rows: number): void {
    this.#makeRoom(rows);
    const place = this.#from + at;
    for (const column of this.#columns) column.copyWithin(place + rows, place, this.#to);
    this.#to += rows;
  }

  /** Removes `rows` rows from row `at` on. */
  close(at: number, rows: number): void {
    const place = this.#from + at;
    for (const column of this.#columns) column.copyWithin(place, place + rows, this.#to);
    this.#to -= rows;
  }

  /** First row whose number in the (rising) column is at least `value`; length if there is none. */
  rowFrom(column: number, value: number): number {
    const numbers = this.#columns[column] as Float64Array;
    let low = this.#from;
    let high = this.#to;
    while (low < high) {
      const middle = (low + high) >>> 1;
      if ((numbers[middle] as number) < value) low = middle + 1;
      else high = middle;
    }
    return low - this.#from;
  }

  /** Adds `by` to the column in all rows from `row` on. */
  shift(column: number, row: number, by: number): void {
    const numbers = this.#columns[column] as Float64Array;
    for (let at = this.#from + row; at < this.#to; at += 1) numbers[at] = (numbers[at] as number) + by;
  }

  clear(): void {
    this.#from = 0;
    this.#to = 0;
  }

  /** A copy of what is held, one array a column, oldest row first. */
  snapshot(): Float64Array[] {
    return this.#columns.map((column) => column.slice(this.#from, this.#to));
  }

  restore(columns: readonly Float64Array[]): void {
    const rows = columns[0]?.length ?? 0;
    if (columns.length !== this.#columns.length || columns.some((column) => column.length !== rows)) {
      throw new RangeError(`columns must be ${this.#columns.length} of equal length`);
    }
    this.clear();
    this.#makeRoom(rows);
    columns.forEach((column, index) => this.#columns[index]?.set(column));
    this.#to = rows;
  }

  /** Leaves at least a quarter of the room free, so that a row is moved a few times only in the long run. */
  #makeRoom(rows: number): void {
    const room = (this.#columns[0] as Float64Array).length;
    if (this.#to + rows <= room) return;
    const held = this.length;
    let wanted = firstRoom;
    while (held + rows > wanted - wanted / 4) wanted *= 2;
    for (const [index, column] of this.#columns.entries()) {
      if (wanted === room) column.copyWithin(0, this.#from, this.#to);
      else {
        const wider = new Float64Array(wanted);
        wider.set(column.subarray(this.#from, this.#to));
        this.#columns[index] = wider;
      }
    }
    this.#from = 0;
    this.#to = held;
  }
}
