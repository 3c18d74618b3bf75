import { capabilityLower, capabilityUpper } from '../../core/bound/capability.ts';
import { fractionBeyondLower, fractionBeyondUpper } from '../../core/bound/fraction-beyond-limit.ts';
import { meanLower, meanUpper } from '../../core/bound/mean.ts';
import { sdLower, sdUpper } from '../../core/bound/standard-deviation.ts';
import { tailOfConfidence } from '../../core/bound/tail-of.ts';
import { toleranceFactor, toleranceRank } from '../../core/bound/tolerance.ts';
import { RunningMoments } from '../../core/moments/running-moments.ts';
import { noncentralTUpper } from '../../core/numerics/noncentral-t.ts';
import { normalQuantileOfTail } from '../../core/numerics/normal.ts';
import { tQuantileOfTail } from '../../core/numerics/student-t.ts';
import type { Tail } from '../../core/units.ts';
import { valuesNamed } from './data-sets.ts';
import type { DataSetEvaluator, GridEvaluator, Inputs, PublishedEvaluator } from './evaluator.ts';
import { bySide, numberOf, numbersOf, tailIn } from './inputs.ts';

const tOrNormal = (row: Inputs): number => {
  const df = numberOf(row, 'df');
  return df === Infinity ? normalQuantileOfTail(tailIn(row)) : tQuantileOfTail(tailIn(row), df);
};

type DistanceBound = (n: number, distance: number, tail: Tail) => number;

const ofDistance = (field: string, lower: DistanceBound, upper: DistanceBound) => (row: Inputs): number => {
  const [n, distance, tail] = [numberOf(row, 'n'), numberOf(row, field), tailIn(row)];
  return bySide(row, { lower: () => lower(n, distance, tail), upper: () => upper(n, distance, tail) });
};

/** A capability estimate of the form k/3, taken from its decimals. */
const capability = ofDistance('estimate', capabilityLower, capabilityUpper);

const tolerance = (row: Inputs): number => toleranceFactor(numberOf(row, 'n'), numberOf(row, 'coverage'), tailIn(row));

/** Rows about measurements: t and normal quantiles, capability, tolerance factors, fraction beyond a limit. */
export const measurementGrids: readonly GridEvaluator[] = [
  {
    quantity: 'one-sided Student t quantile (df) and normal quantile (df "inf")',
    answer: 'quantile',
    exact: false,
    compute: tOrNormal,
  },
  {
    quantity: 'upper confidence bound on the normal fraction beyond ONE specification limit',
    answer: 'bound',
    exact: false,
    compute: ofDistance('k', fractionBeyondLower, fractionBeyondUpper),
  },
  { quantity: 'one-sided normal tolerance factor k, sigma unknown', answer: 'k', exact: false, compute: tolerance },
  {
    quantity: 'lower confidence bound on a one-sided capability index (USL-mu)/(3 sigma) or (mu-LSL)/(3 sigma)',
    answer: 'bound',
    exact: false,
    compute: capability,
  },
];

const mean = (row: Inputs): number => {
  const moments = 'data' in row ? momentsOf(numbersOf(row, 'data')) : undefined;
  const n = moments?.count ?? numberOf(row, 'n');
  const average = moments?.mean ?? numberOf(row, 'mean');
  const sd = moments?.sd ?? numberOf(row, 'sd');
  const tail = tailIn(row);
  return bySide(row, { lower: () => meanLower(n, average, sd, tail), upper: () => meanUpper(n, average, sd, tail) });
};

const deviation = (row: Inputs): number => {
  const [n, sd, tail] = [numberOf(row, 'n'), numberOf(row, 'sd'), tailIn(row)];
  return bySide(row, { lower: () => sdLower(n, sd, tail), upper: () => sdUpper(n, sd, tail) });
};

/** How far below the nominal quantity a sample's average may be, in its standard deviations; in a finite lot less. */
const netContentFactor = (row: Inputs): number => {
  const n = numberOf(row, 'n');
  const rest = typeof row['lot_size'] === 'number' ? Math.sqrt(1 - n / numberOf(row, 'lot_size')) : 1;
  return meanUpper(n, 0, 1, tailIn(row)) * rest;
};

const noncentralShare = (row: Inputs): number =>
  Math.exp(noncentralTUpper(-numberOf(row, 't'), numberOf(row, 'df'), -numberOf(row, 'noncentrality')).logTail);

/** The approximation of the e-handbook, kept as the check of its printed value that it is. */
const natrella = (row: Inputs): number => {
  const n = numberOf(row, 'n');
  const z = normalQuantileOfTail(tailOfConfidence(numberOf(row, 'coverage')));
  const zConfidence = normalQuantileOfTail(tailIn(row));
  const a = 1 - zConfidence ** 2 / (2 * (n - 1));
  const b = z ** 2 - zConfidence ** 2 / n;
  return (z + Math.sqrt(z ** 2 - a * b)) / a;
};

/**
 * A figure of a named data set to its last printed digit: counted in steps of the last decimal, in which the values
 * are whole and no digit is lost on the way into a double.
 */
const named = (figure: (moments: RunningMoments) => number | undefined) => (row: Inputs): number => {
  const data = valuesNamed(String(row['dataset']));
  const decimals = Math.max(...data.map((value) => (String(value).split('.')[1] ?? '').length));
  const steps = 10 ** decimals;
  return (figure(momentsOf(data.map((value) => Math.round(value * steps)))) ?? NaN) / steps;
};

export const measurementPublished: readonly PublishedEvaluator[] = [
  { quantity: 'one-sided t bound on a mean', compute: mean },
  { quantity: 'one-sided Student t quantile', compute: tOrNormal },
  { quantity: 'one-sided bound on a normal standard deviation, sample sd = 1', compute: deviation },
  { quantity: 'noncentral t distribution function', compute: noncentralShare },
  { quantity: 'sample mean', compute: named((moments) => moments.mean) },
  { quantity: 'sample standard deviation (n-1)', compute: named((moments) => moments.sd) },
  { quantity: 'factor c in: accept when mean >= nominal - c*sd', compute: netContentFactor },
  { quantity: /^sample correction factor( c \(multiplies the sd\))?$/, compute: netContentFactor },
  { quantity: 'one-sided normal tolerance factor k', compute: tolerance },
  { quantity: 'one-sided normal tolerance factor k (Natrella normal approximation)', compute: natrella },
  {
    quantity: 'largest r with P(X<=r-1 | n, 1-coverage) <= 1-confidence (rank of the order statistic)',
    compute: (row) => toleranceRank(numberOf(row, 'n'), numberOf(row, 'coverage'), tailIn(row)),
  },
];

function momentsOf(data: readonly number[]): RunningMoments {
  const moments = new RunningMoments(data[0] ?? 0);
  for (const value of data) moments.admit(value);
  return moments;
}

export const dataSetEvaluator: DataSetEvaluator | undefined = {
  mean: (data) => momentsOf(data).mean ?? NaN,
  deviation: (data) => momentsOf(data).sd ?? NaN,
  bound: (data, side, confidence) => {
    const moments = momentsOf(data);
    const bound = side === 'lower' ? meanLower : meanUpper;
    return bound(data.length, moments.mean ?? NaN, moments.sd ?? NaN, tailOfConfidence(confidence));
  },
};
