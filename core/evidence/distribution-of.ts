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
  const histogram = new Histogram(reference, widthOf(sd, mean - reference));
  for (const value of seen) histogram.admit(value);
  const { width, counts } = histogram.snapshot();
  const [first, last] = [counts.findIndex((count) => count > 0), counts.findLastIndex((count) => count > 0)];
  const edges = Array.from({ length: last - first + 2 }, (_, bin) => reference + (first + bin - histogramBins / 2) * width);
  return { kind: 'distribution', unit, edges, counts: counts.slice(first, last + 1), mean, sd, limit, model };
}

/** An eighth of the standard deviation; values all alike get one bin of a size that shows. */
function widthOf(sd: number, distance: number): number {
  const width = sd / binsToSd;
  return width > 1e-290 ? width : Math.max(Math.abs(distance) / binsToSd, 1e-6);
}
