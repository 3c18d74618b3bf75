import { boundMethods, type BoundMethod } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import { looksIn, numberIn, optionalNumberIn, type Given } from './given.ts';
import { quantityNamed } from './quantities.ts';

const number = (given: Given, field: string): string => writtenNumber(numberIn(given, field), 6);
const values = (given: Given): string => `${writtenNumber(numberIn(given, 'n'), 15)} measurements`;

function averaged(given: Given): string {
  const sigma = optionalNumberIn(given, 'sigma');
  const spread = sigma === undefined ? `standard deviation ${number(given, 'sd')}` : `known standard deviation ${number(given, 'sigma')}`;
  return `${values(given)}, mean ${number(given, 'mean')}, ${spread}`;
}

function meanMethod(given: Given): BoundMethod {
  const known = given['sigma'] !== undefined;
  if (looksIn(given) === 'all') return known ? boundMethods.runMeanKnown : boundMethods.runMean;
  if (given['from'] !== undefined) return boundMethods.boundedMean;
  return known ? boundMethods.knownSigmaMean : boundMethods.studentMean;
}

/** Commands for measurements. */
export const askedMeasurements: readonly AskedQuantity[] = [
  {
    command: 'mean',
    quantity: quantityNamed('mean'),
    summary: 'mean of a measurement, from figures or a column',
    usualSide: undefined,
    promise: 'asked',
    scale: 'measure',
    beside: ['column', 'line', 'unit'],
    seen: averaged,
    subject: () => 'the mean',
    method: meanMethod,
  },
  {
    command: 'fraction-beyond-limit',
    quantity: quantityNamed('fraction-beyond-limit'),
    summary: 'share of units beyond a specification limit, from figures or a column',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'share',
    beside: ['column', 'limits', 'line'],
    seen: (given) => `${values(given)}, the limit ${number(given, 'k')} standard deviations from the mean`,
    subject: () => 'the fraction beyond the limit',
    method: () => boundMethods.normalTail,
  },
  {
    command: 'capability',
    quantity: quantityNamed('capability'),
    summary: 'one-sided capability index, from figures or a column',
    usualSide: 'lower',
    promise: 'at least',
    scale: 'plain',
    beside: ['column', 'limits', 'line'],
    seen: (given) => `${values(given)}, index of the sample ${number(given, 'estimate')}`,
    subject: () => 'the capability index',
    method: () => boundMethods.capability,
  },
  {
    command: 'standard-deviation',
    quantity: quantityNamed('standard-deviation'),
    summary: 'standard deviation of a measurement, from figures or a column',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'measure',
    beside: ['column', 'line', 'unit'],
    seen: (given) => `${values(given)}, standard deviation ${number(given, 'sd')}`,
    subject: () => 'the true standard deviation',
    method: () => boundMethods.spread,
  },
  {
    command: 'tolerance',
    quantity: quantityNamed('tolerance-factor'),
    summary: 'factor k: mean + k sd holds a share of all units (normal model)',
    usualSide: undefined,
    promise: undefined,
    scale: 'plain',
    beside: ['column'],
    seen: values,
    subject: (given) => `the factor k that leaves ${writtenNumber(100 * numberIn(given, 'coverage'), 10)} % of the units on one side`,
    method: () => boundMethods.tolerance,
  },
  {
    command: 'tolerance-rank',
    quantity: quantityNamed('tolerance-rank'),
    summary: 'the same without a distribution: which outermost measurement bounds them',
    usualSide: undefined,
    promise: undefined,
    scale: 'units',
    beside: ['column'],
    seen: values,
    subject: (given) => `the rank of the measurement that leaves ${writtenNumber(100 * numberIn(given, 'coverage'), 10)} % of the units on one side`,
    method: () => boundMethods.rank,
  },
];
