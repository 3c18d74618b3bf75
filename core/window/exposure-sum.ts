import type { StoredSink } from './record-sink.ts';

/** Plain copy of an exposure sum. */
export interface ExposureSumSnapshot {
  readonly records: number;
  readonly count: number;
  readonly sum: number;
  readonly rest: number;
}

/**
 * Nonconformities and the exposure they were counted over. Counts are whole, so their sum is exact up to 2^53; the
 * exposure carries what rounding cut off, so that taking records back leaves no trace above the last digits.
 *
 * @source compensated summation: A. Neumaier, Zeitschrift für Angewandte Mathematik und Mechanik 54 (1974), pp. 39-51
 *   (from memory)
 */
export class ExposureSum implements StoredSink<ExposureSumSnapshot> {
  #records = 0;
  #count = 0;
  #sum = 0;
  #rest = 0;

  get records(): number {
    return this.#records;
  }

  /** Nonconformities. */
  get count(): number {
    return this.#count;
  }

  /** Exposure in the guarantee's unit; exactly 0 without records. */
  get exposure(): number {
    return this.#sum + this.#rest;
  }

  admit(count: number, exposure: number): void {
    this.#records += 1;
    this.#count += count;
    this.#add(exposure);
  }

  drop(count: number, exposure: number): void {
    this.#records -= 1;
    this.#count -= count;
    if (this.#records === 0) this.clear();
    else this.#add(-exposure);
  }

  /** Adds another sum to this one. */
  include(other: ExposureSum): void {
    this.#records += other.#records;
    this.#count += other.#count;
    this.#add(other.#sum);
    this.#add(other.#rest);
  }

  clear(): void {
    this.#records = 0;
    this.#count = 0;
    this.#sum = 0;
    this.#rest = 0;
  }

  snapshot(): ExposureSumSnapshot {
    return { records: this.#records, count: this.#count, sum: this.#sum, rest: this.#rest };
  }

  restore(snapshot: ExposureSumSnapshot): void {
    this.#records = snapshot.records;
    this.#count = snapshot.count;
    this.#sum = snapshot.sum;
    this.#rest = snapshot.rest;
  }

  #add(term: number): void {
    const sum = this.#sum + term;
    this.#rest += Math.abs(this.#sum) >= Math.abs(term) ? this.#sum - sum + term : term - sum + this.#sum;
    this.#sum = sum;
  }
}
