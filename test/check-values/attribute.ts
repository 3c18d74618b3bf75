import { demonstrationUnits } from '../../core/bound/critical-count.ts';
import { fractionLower, fractionUpper } from '../../core/bound/nonconforming-fraction.ts';
import type { GridEvaluator, Inputs, PublishedEvaluator, VectorEvaluator } from './evaluator.ts';
import { bySide, numberOf, tailIn } from './inputs.ts';

const exactFraction = (row: Inputs): number => {
  const [x, n, tail] = [numberOf(row, 'nonconforming'), numberOf(row, 'n'), tailIn(row)];
  return bySide(row, { lower: () => fractionLower(x, n, tail), upper: () => fractionUpper(x, n, tail) });
};

const units = (row: Inputs): number =>
  demonstrationUnits(numberOf(row, 'nonconforming'), numberOf(row, 'rate'), tailIn(row));

export const attributeGrids: readonly GridEvaluator[] = [
  {
    quantity: 'exact (Clopper-Pearson) one-sided bound on a binomial proportion',
    answer: 'bound',
    exact: false,
    compute: exactFraction,
  },
  {
    quantity: 'smallest n with P(X<=nonconforming | n, rate) <= 1-confidence',
    answer: 'n',
    exact: true,
    compute: units,
  },
];

export const attributePublished: readonly PublishedEvaluator[] = [
  { quantity: 'exact (Clopper-Pearson) one-sided bound on a proportion', compute: exactFraction },
];

export const attributeVectors: readonly VectorEvaluator[] = [];
