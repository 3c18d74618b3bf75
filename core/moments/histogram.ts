import { OutOfDomain } from '../bound/out-of-domain.ts';

/** A histogram as plain data: stored, sent to screens, merged. */
export interface HistogramSnapshot {
  /** Edge between bin `bins/2 - 1` and bin `bins/2`, in the unit of measure. */
  readonly reference: number;
  /** Width of a bin when the histogram was new, and now: first times a power of two. */
  readonly firstWidth: number;
  readonly width: number;
  /** Counts from the lowest bin up; the first bin starts at reference - width * bins/2, each closed below, open above. */
  readonly counts: readonly number[];
  /** Values below the first and at or above the end of the last bin. */
  readonly below: number;
  readonly above: number;
}

/** A quarter of them lies free on either side when the width was well chosen. */
export const histogramBins = 128;
const mostDoublings = 12;

/**
 * How measurements are spread, at a fixed cost for any number of them: equal bins around a reference, which join
 * in pairs when a value lies outside (until they are 4096 times as wide; what lies farther out is counted
 * below or above). Values can be taken out again, and histograms with the same start merged, without
 * any difference to counting anew at the width reached. Mutable.
 *
 * @source own derivation: floor(x / 2w) = floor(floor(x / w) / 2), also in doubles, since doubling is exact
 */
export class Histogram {
  readonly reference: number;
  readonly firstWidth: number;
  #width: number;
  #doublings = 0;
  #counts = new Float64Array(histogramBins);
  #below = 0;
  #above = 0;

  /**
   * @param reference finite, in the unit of measure; the specification limit, so that no bin straddles it
   * @param width     of a bin, finite, above 0; about a tenth of the standard deviation
   * @throws OutOfDomain naming the argument
   */
  constructor(reference: number, width: number) {
    if (!Number.isFinite(reference)) throw new OutOfDomain('reference', reference, 'a finite number');
    if (!(width > 1e-290 && width < 1e290)) throw new OutOfDomain('width', width, 'a number from 1e-290 to 1e290');
    this.reference = reference;
    this.firstWidth = width;
    this.#width = width;
  }

  /** @throws OutOfDomain when the value is not a finite number; nothing is changed then */
  admit(value: number): void {
    if (!Number.isFinite(value)) throw new OutOfDomain('value', value, 'a finite number');
    while (this.#outside(value) && this.#doublings < mostDoublings) this.#joinPairs();
    this.#count(value, 1);
  }

  /**
   * Takes out a value that was admitted before.
   * @throws OutOfDomain when its bin is empty, so it cannot have been; nothing is changed then
   */
  drop(value: number): void {
    const bin = this.#binOf(value);
    const held = bin < 0 ? this.#below : bin >= histogramBins ? this.#above : this.#counts[bin];
    if (held === undefined || held === 0) throw new OutOfDomain('value', value, 'a value that was admitted before');
    this.#count(value, -1);
  }

  /**
   * Adds what another histogram holds; the wider bins of the two are kept.
   * @throws OutOfDomain unless both started at the same reference and width
   */
  merge(other: HistogramSnapshot): void {
    if (other.reference !== this.reference) throw new OutOfDomain('reference', other.reference, String(this.reference));
    if (other.firstWidth !== this.firstWidth) throw new OutOfDomain('firstWidth', other.firstWidth, String(this.firstWidth));
    const added = Histogram.restore(other);
    while (added.#width < this.#width) added.#joinPairs();
    while (this.#width < added.#width) this.#joinPairs();
    added.#counts.forEach((count, bin) => {
      this.#counts[bin] = (this.#counts[bin] ?? 0) + count;
    });
    this.#below += added.#below;
    this.#above += added.#above;
  }

  snapshot(): HistogramSnapshot {
    return {
      reference: this.reference,
      firstWidth: this.firstWidth,
      width: this.#width,
      counts: [...this.#counts],
      below: this.#below,
      above: this.#above,
    };
  }

  static restore(from: HistogramSnapshot): Histogram {
    const histogram = new Histogram(from.reference, from.firstWidth);
    histogram.#width = from.width;
    histogram.#doublings = Math.round(Math.log2(from.width / from.firstWidth));
    histogram.#counts.set(from.counts);
    histogram.#below = from.below;
    histogram.#above = from.above;
    return histogram;
  }

  #binOf(value: number): number {
    return Math.floor((value - this.reference) / this.#width) + histogramBins / 2;
  }

  #outside(value: number): boolean {
    const bin = this.#binOf(value);
    return bin < 0 || bin >= histogramBins;
  }

  #count(value: number, sign: 1 | -1): void {
    const bin = this.#binOf(value);
    if (bin < 0) this.#below += sign;
    else if (bin >= histogramBins) this.#above += sign;
    else this.#counts[bin] = (this.#counts[bin] ?? 0) + sign;
  }

  #joinPairs(): void {
    const joined = new Float64Array(histogramBins);
    this.#counts.forEach((count, bin) => {
      const into = (bin >> 1) + histogramBins / 4;
      joined[into] = (joined[into] ?? 0) + count;
    });
    this.#counts = joined;
    this.#width *= 2;
    this.#doublings += 1;
  }
}
