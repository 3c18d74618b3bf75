import { Histogram, histogramBins } from '../moments/histogram.ts';
import { RunningMoments } from '../moments/running-moments.ts';
import type { Picture } from '../view/history.ts';
import type { Limit } from './nonconforming-places.ts';

type Distribution = Extract<Picture, { kind: 'distribution' }>;

export interface DistributionSettings {
  /** A bin edge stands here: the specification limit or the guarantee line. */
  readonly reference: number;
  readonly unit: string;
  readonly limit: Limit | undefined;
  readonly model: Distribution['model'];
}

/** Values the picture is made from at most, the newest. */
const mostValues = 50_000;
const binsToSd = 8;
/** A step of the values wider than so many bins is an accident of few values. */
const mostStep = 8;

/** How the newest values of a window are spread; made when somebody looks. */
export function distributionOf(values: { visit(see: (value: number) => void, most: number): void }, { reference, unit, limit, model }: DistributionSettings): Picture {
  const moments = new RunningMoments(reference);
  const seen: number[] = [];
  values.visit((value) => {
    if (!(Math.abs(value - reference) <= 1e90)) return;
    seen.push(value);
    moments.admit(value);
  }, mostValues);
  const { mean, sd = 0 } = moments;
  if (mean === undefined) return { kind: 'none' };
  const width = widthOf(sd, mean - reference);
  const finest = resolutionOf(seen, width);
  const whole = finest === undefined ? width : Math.max(1, Math.round(width / finest)) * finest;
  // Half a step off the reference, so that no value stands on an edge, and one on a limit on the side where it conforms.
  const edge = finest === undefined ? reference : reference + (limit?.side === 'above' ? 0.5 : -0.5) * finest;
  const histogram = new Histogram(edge, whole);
  for (const value of seen) histogram.admit(value);
  const { width: reached, counts } = histogram.snapshot();
  const [first, last] = [counts.findIndex((count) => count > 0), counts.findLastIndex((count) => count > 0)];
  const edges = Array.from({ length: last - first + 2 }, (_, bin) => edge + (first + bin - histogramBins / 2) * reached);
  return { kind: 'distribution', unit, edges, counts: counts.slice(first, last + 1), mean, sd, limit, model };
}

/**
 * The step values are read in, as far as it matters in bins of this width: bins that are no whole number of it would
 * hold now more, now fewer of the values there can be, like the teeth of a comb.
 *
 * @returns 1, 2 or 5 times a power of ten; undefined where values are finer than a sixteenth of a bin
 */
function resolutionOf(values: readonly number[], width: number): number | undefined {
  for (let power = Math.ceil(Math.log10(width)) + 1; 10 ** power > width / 16; power -= 1) {
    const found = [5, 2, 1].map((times) => times * 10 ** power).find((step) => step <= mostStep * width && values.every((value) => Math.abs(value / step - Math.round(value / step)) < 1e-6));
    if (found !== undefined) return found;
  }
  return undefined;
}

/** An eighth of the standard deviation; values all alike get one bin of a size that shows. */
function widthOf(sd: number, distance: number): number {
  const width = sd / binsToSd;
  return width > 1e-290 ? width : Math.max(Math.abs(distance) / binsToSd, 1e-6);
}
