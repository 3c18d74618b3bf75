import { farthestMeasurement, RunningMoments, type MomentsSnapshot } from '../moments/running-moments.ts';
import type { StoredSink } from '../window/record-sink.ts';

export interface MeasuredSumSnapshot {
  readonly moments: MomentsSnapshot;
  readonly outside: number;
}

/** Values a measurement can take, both ends included. */
export interface ValueRange {
  readonly from: number;
  readonly to: number;
}

/** What the measurements of a window add up to. Values that cannot be are counted apart: while one is there, nothing holds. */
export class MeasuredSum implements StoredSink<MeasuredSumSnapshot> {
  readonly moments: RunningMoments;
  readonly #range: ValueRange;
  #outside = 0;

  /**
   * @param reference a value near the measurements, in their unit
   * @param range     values that are possible; undefined: all that can be computed with
   */
  constructor(reference: number, range: ValueRange | undefined) {
    this.moments = new RunningMoments(reference);
    this.#range = range ?? { from: reference - farthestMeasurement, to: reference + farthestMeasurement };
  }

  /** Values in the window that cannot be. */
  get outside(): number {
    return this.#outside;
  }

  admit(value: number): void {
    if (this.#isPossible(value)) this.moments.admit(value);
    else this.#outside += 1;
  }

  drop(value: number): void {
    if (this.#isPossible(value)) this.moments.drop(value);
    else this.#outside -= 1;
  }

  include(other: MeasuredSum): void {
    this.moments.include(other.moments);
    this.#outside += other.#outside;
  }

  get needsRecount(): boolean {
    return this.moments.needsRecount;
  }

  clear(): void {
    this.moments.clear();
    this.#outside = 0;
  }

  snapshot(): MeasuredSumSnapshot {
    return { moments: this.moments.snapshot(), outside: this.#outside };
  }

  restore(from: MeasuredSumSnapshot): void {
    this.moments.restore(from.moments);
    this.#outside = from.outside;
  }

  /** False for a value that is not a number. */
  #isPossible(value: number): boolean {
    return value >= this.#range.from && value <= this.#range.to;
  }
}
