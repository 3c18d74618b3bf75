import { demonstrationUnits, violationUnits } from '../../core/bound/critical-count.ts';
import { lotDemonstrationUnits } from '../../core/bound/critical-lot.ts';
import { lotLower, lotUpper } from '../../core/bound/finite-lot.ts';
import { jeffreysLower, jeffreysUpper } from '../../core/bound/jeffreys.ts';
import { midPLower, midPUpper } from '../../core/bound/mid-p.ts';
import { fractionLower, fractionUpper } from '../../core/bound/nonconforming-fraction.ts';
import { jeffreysRateLower, jeffreysRateUpper, rateLower, rateUpper } from '../../core/bound/rate.ts';
import { stoppedFractionLower, stoppedFractionUpper } from '../../core/bound/stopped-sampling.ts';
import { wilsonLower, wilsonUpper } from '../../core/bound/wilson.ts';
import { demonstrationExposure } from '../../core/bound/critical-exposure.ts';
import type { Tail } from '../../core/units.ts';
import type { GridEvaluator, Inputs, PublishedEvaluator } from './evaluator.ts';
import { bySide, numberOf, tailIn } from './inputs.ts';

type SampleBound = (nonconforming: number, inspected: number, tail: Tail) => number;
type CountBound = (count: number, exposure: number, tail: Tail) => number;

const ofSample = (lower: SampleBound, upper: SampleBound) => (row: Inputs): number => {
  const [x, n, tail] = [numberOf(row, 'nonconforming'), numberOf(row, 'n'), tailIn(row)];
  return bySide(row, { lower: () => lower(x, n, tail), upper: () => upper(x, n, tail) });
};

const ofCount = (lower: CountBound, upper: CountBound) => (row: Inputs): number => {
  const exposure = 'exposure' in row ? numberOf(row, 'exposure') : 1;
  const [count, tail] = [numberOf(row, 'count'), tailIn(row)];
  return bySide(row, { lower: () => lower(count, exposure, tail), upper: () => upper(count, exposure, tail) });
};

const exact = ofSample(fractionLower, fractionUpper);
const jeffreys = ofSample(jeffreysLower, jeffreysUpper);
const midP = ofSample(midPLower, midPUpper);
const wilson = ofSample(wilsonLower, wilsonUpper);
const garwood = ofCount(rateLower, rateUpper);

const unitsToDemonstrate = (row: Inputs): number =>
  demonstrationUnits(numberOf(row, 'nonconforming'), numberOf(row, 'rate'), tailIn(row));

const lot = (row: Inputs): number => {
  const sample = { nonconforming: numberOf(row, 'nonconforming'), sampled: numberOf(row, 'n'), lotSize: numberOf(row, 'lot_size') };
  return bySide(row, { lower: () => lotLower(sample, tailIn(row)), upper: () => lotUpper(sample, tailIn(row)) });
};

const unitsOfLot = (row: Inputs): number => {
  const promise = { lotSize: numberOf(row, 'lot_size'), allowed: numberOf(row, 'lot_nonconforming') - 1 };
  return lotDemonstrationUnits(numberOf(row, 'nonconforming'), promise, tailIn(row));
};

/** P(X = 0) >= confidence says the same as P(X >= 1) <= 1 - confidence. */
const unitsWithoutEvent = (row: Inputs): number =>
  violationUnits(numberOf(row, 'nonconforming') + 1, numberOf(row, 'rate'), tailIn(row));

const bound = (quantity: string, compute: (row: Inputs) => number): GridEvaluator =>
  ({ quantity, answer: 'bound', exact: false, compute });

export const attributeGrids: readonly GridEvaluator[] = [
  bound('exact (Clopper-Pearson) one-sided bound on a binomial proportion', exact),
  bound('mid-P one-sided bound on a binomial proportion', midP),
  bound('Wilson score one-sided bound on a binomial proportion, no continuity correction', wilson),
  bound('one-sided quantile of the Jeffreys posterior Beta(x+1/2, n-x+1/2)', jeffreys),
  bound('exact (Garwood) one-sided bound on a Poisson mean, exposure 1', garwood),
  {
    quantity: 'smallest n with P(X<=nonconforming | n, rate) <= 1-confidence',
    answer: 'n',
    exact: true,
    compute: unitsToDemonstrate,
  },
  {
    quantity: 'exact (hypergeometric) one-sided bound on the number nonconforming in a lot',
    answer: 'bound',
    exact: true,
    compute: lot,
  },
];

/** 'percent' and 'times 13500000' at the end of a quantity, or '(percent)' in it. */
const scaled = (inputs: Inputs, quantity: string): number => {
  const times = /, times (\d+)$/.exec(quantity);
  return exact(inputs) * (times ? Number(times[1]) : 100);
};

export const attributePublished: readonly PublishedEvaluator[] = [
  { quantity: 'exact (Clopper-Pearson) one-sided bound on a proportion', compute: exact },
  { quantity: /^exact \(Clopper-Pearson\) one-sided bound on a proportion, (percent|times \d+)$/, compute: scaled },
  { quantity: /^(limiting|standard) quality: fraction \(percent\) .* Clopper-Pearson/, compute: scaled },
  { quantity: 'one-sided Jeffreys posterior quantile of a proportion, Beta(x+1/2, n-x+1/2)', compute: jeffreys },
  { quantity: 'Wilson score one-sided bound on a proportion', compute: wilson },
  { quantity: 'mid-P one-sided bound on a proportion', compute: midP },
  {
    quantity: 'exact one-sided bound on a proportion, sampling stopped at the x-th event (negative binomial)',
    compute: ofSample(stoppedFractionLower, stoppedFractionUpper),
  },
  { quantity: 'exact (Garwood) one-sided bound on a Poisson mean', compute: garwood },
  {
    quantity: 'one-sided Jeffreys posterior quantile of a Poisson rate, Gamma(x+1/2)',
    compute: ofCount(jeffreysRateLower, jeffreysRateUpper),
  },
  { quantity: /^smallest n with P\(X<=nonconforming \| n, rate\) <= 1-confidence( \(Wilks\))?$/, compute: unitsToDemonstrate },
  {
    quantity: 'exact (hypergeometric) one-sided upper bound on the fraction nonconforming in a finite lot',
    compute: (row) => lot(row) / numberOf(row, 'lot_size'),
  },
  {
    quantity: 'smallest n with hypergeometric P(X<=nonconforming | lot, D nonconforming) <= 1-confidence',
    compute: unitsOfLot,
  },
  {
    quantity: 'largest n with P(X=0 | n, rate) >= confidence',
    compute: unitsWithoutEvent,
  },
  {
    quantity: /^smallest n with Poisson P\(0 \| n\*[\d.]+\) <= 1-confidence$/,
    compute: (row) => Math.ceil(demonstrationExposure(numberOf(row, 'nonconforming'), numberOf(row, 'rate'), tailIn(row))),
  },
  { quantity: 'rule of three: n times the 95 % upper bound for 0 of n', compute: (row) => rateUpper(0, 1, tailIn(row)) },
];
