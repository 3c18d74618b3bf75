import { OutOfDomain } from '../bound/out-of-domain.ts';
import { ExactSum, productRest } from './exact-sum.ts';

/** The state of running moments as plain numbers, to be stored and restored without loss. */
export interface MomentsSnapshot {
  readonly reference: number;
  readonly count: number;
  /** Sums of the distances from the reference, their squares and their cubes: high and low part of each. */
  readonly sums: readonly [number, number, number, number, number, number];
  /** Largest sum of squares since the window was last empty. */
  readonly largest: number;
}

/** Farthest a measurement may lie from the reference; the cube must stay a double. */
export const farthestMeasurement = 1e90;

/**
 * Count, mean, standard deviation and skewness of the measurements in a window, kept up as values come and
 * go. Sums are taken about a reference value and keep 32 digits, so values in and out leave nothing behind. Mutable.
 *
 * @source own derivation: power sums about a reference, moved to the mean only when they are read
 */
export class RunningMoments {
  readonly reference: number;
  #count = 0;
  #largest = 0;
  readonly #first = new ExactSum();
  readonly #second = new ExactSum();
  readonly #third = new ExactSum();
  readonly #scratch = new ExactSum();
  /** Sum of the squares about the mean; NaN after a change until it is asked for. */
  #known = NaN;

  /**
   * @param reference a value near the measurements, e.g. the target, in their unit
   * @throws OutOfDomain unless it is finite
   */
  constructor(reference: number) {
    if (!Number.isFinite(reference)) throw new OutOfDomain('reference', reference, 'a finite number');
    this.reference = reference + 0; // no -0, which JSON does not keep
  }

  static restore(from: MomentsSnapshot): RunningMoments {
    const moments = new RunningMoments(from.reference);
    moments.restore(from);
    return moments;
  }

  /**
   * Takes over a snapshot in place of what is held.
   * @throws OutOfDomain when it has another reference
   */
  restore(from: MomentsSnapshot): void {
    this.#requireSameReference(from.reference);
    this.#known = NaN;
    this.#count = from.count;
    this.#largest = from.largest;
    this.#sums().forEach((sum, i) => {
      sum.high = from.sums[2 * i] ?? NaN;
      sum.low = from.sums[2 * i + 1] ?? NaN;
    });
  }

  /**
   * Adds what other moments hold.
   * @throws OutOfDomain when they have another reference
   */
  include(other: RunningMoments): void {
    this.#requireSameReference(other.reference);
    this.#known = NaN;
    this.#count += other.#count;
    const others = other.#sums();
    this.#sums().forEach((sum, i) => {
      sum.add(others[i]?.high ?? NaN);
      sum.add(others[i]?.low ?? NaN);
    });
    this.#largest = Math.max(this.#largest, other.#largest, this.#second.high);
  }

  /** Forgets every value. */
  clear(): void {
    this.#known = NaN;
    this.#count = 0;
    this.#largest = 0;
    for (const sum of this.#sums()) {
      sum.high = 0;
      sum.low = 0;
    }
  }

  /** @throws OutOfDomain when the value is not finite or farther than 1e90 from the reference; nothing is changed then */
  admit(value: number): void {
    this.#change(value, 1);
  }

  /**
   * Takes out a value that was admitted before.
   * @throws OutOfDomain as `admit`, and when the window is empty
   */
  drop(value: number): void {
    if (this.#count === 0) throw new OutOfDomain('value', value, 'a value that was admitted before');
    this.#change(value, -1);
  }

  #change(value: number, sign: 1 | -1): void {
    const distance = value - this.reference;
    if (!(Math.abs(distance) <= farthestMeasurement)) {
      throw new OutOfDomain('value', value, `a finite number within ${farthestMeasurement} of ${this.reference}`);
    }
    const signed = sign * distance;
    const square = distance * distance;
    const rest = productRest(distance, distance, square);
    this.#known = NaN;
    this.#count += sign;
    this.#first.add(signed);
    this.#second.add(sign * square);
    this.#second.add(sign * rest);
    this.#third.addProduct(signed, square);
    this.#third.add(signed * rest);
    if (this.#count === 0) this.clear();
    else if (this.#second.high > this.#largest) this.#largest = this.#second.high;
  }

  #requireSameReference(reference: number): void {
    if (reference !== this.reference) throw new OutOfDomain('reference', reference, String(this.reference));
  }

  #sums(): readonly ExactSum[] {
    return [this.#first, this.#second, this.#third];
  }

  /** Sum of the squared distances from the mean, 0 or more. Without objects, and once a change: it is asked after every record. */
  #squares(): number {
    const known = this.#known;
    return known === known ? known : (this.#known = this.#computedSquares());
  }

  #computedSquares(): number {
    const [first, rest, n] = [this.#first.high, this.#first.low, this.#count];
    const centre = (first + rest) / n;
    const moved = this.#scratch;
    moved.high = this.#second.high;
    moved.low = this.#second.low;
    moved.addProduct(-2 * centre, first);
    moved.add(-2 * centre * rest);
    const sum = n * centre;
    moved.addProduct(sum, centre);
    moved.add(productRest(n, centre, sum) * centre);
    return Math.max(0, moved.value);
  }

  /** Sum of the cubed distances from the mean. */
  #cubes(): number {
    const centre = this.#first.value / this.#count;
    const once = this.#first.less(centre, new ExactSum(this.#count));
    const mixed = this.#second.less(centre, this.#first);
    const twice = mixed.less(centre, once);
    return this.#third.less(centre, this.#second).less(centre, mixed).less(centre, twice).value;
  }

  /** Values in the window, 0 or more. */
  get count(): number {
    return this.#count;
  }

  /** Average in the unit of measure; undefined when the window is empty. */
  get mean(): number | undefined {
    return this.#count === 0 ? undefined : this.reference + this.#first.value / this.#count;
  }

  /** Sample standard deviation (n - 1), 0 or more, in the unit of measure; undefined below two values. */
  get sd(): number | undefined {
    return this.#count < 2 ? undefined : Math.sqrt(this.#squares() / (this.#count - 1));
  }

  /** Third central moment over the 3/2 power of the second; undefined below three values or without spread. */
  get skewness(): number | undefined {
    if (this.#count < 3) return undefined;
    const squares = this.#squares();
    return squares > 0 ? (this.#cubes() / squares) * Math.sqrt(this.#count / squares) : undefined;
  }

  /**
   * True when values so far out have come and gone that the digits they pushed out are missed now: build
   * the moments anew from the kept values.
   */
  get needsRecount(): boolean {
    return this.#count > 0 && this.#largest * 1e-31 > 1e-14 * this.#squares();
  }

  snapshot(): MomentsSnapshot {
    const [first, second, third] = [this.#first, this.#second, this.#third];
    return {
      reference: this.reference,
      count: this.#count,
      sums: [first.high, first.low, second.high, second.low, third.high, third.low],
      largest: this.#largest,
    };
  }
}
