/** Splits a double into two halves of 26 bits. */
const splitter = 134217729;

/**
 * A running sum that keeps about 32 digits: what a plain sum would round away is carried beside it, so
 * that values taken out again leave (almost) nothing behind. Mutable; `high + low` is the sum.
 *
 * @source T. J. Dekker, Numer. Math. 18 (1971) 224-242; D. E. Knuth, The Art of Computer Programming 2, 4.2.2 (from memory)
 */
export class ExactSum {
  high: number;
  low: number;

  constructor(high = 0, low = 0) {
    this.high = high;
    this.low = low;
  }

  /** Adds one double, keeping the 32nd digit of the sum. */
  add(value: number): void {
    const sum = this.high + value;
    const part = sum - this.high;
    const lost = this.high - (sum - part) + (value - part) + this.low;
    this.high = sum + lost;
    this.low = lost - (this.high - sum);
  }

  /** Adds a product of two doubles with what its rounding takes away. */
  addProduct(a: number, b: number): void {
    const product = a * b;
    this.add(product);
    this.add(productRest(a, b, product));
  }

  /** This sum less `factor` times another, as a new sum. */
  less(factor: number, other: ExactSum): ExactSum {
    const rest = new ExactSum(this.high, this.low);
    rest.addProduct(-factor, other.high);
    rest.add(-factor * other.low);
    return rest;
  }

  get value(): number {
    return this.high + this.low;
  }
}

/** a b - product, exactly, where product is a b rounded; a and b below 1e140 in size. */
export function productRest(a: number, b: number, product: number): number {
  const aCoarse = splitter * a;
  const aHigh = aCoarse - (aCoarse - a);
  const bCoarse = splitter * b;
  const bHigh = bCoarse - (bCoarse - b);
  const aLow = a - aHigh;
  const bLow = b - bHigh;
  return aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}
