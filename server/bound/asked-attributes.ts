import { boundMethods, type BoundMethod } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import { looksIn, numberIn, stationsIn, type Given } from './given.ts';
import { quantityNamed } from './quantities.ts';

const count = (given: Given, field: string): string => writtenNumber(numberIn(given, field), 15);
const unitsSeen = (given: Given): string => `${count(given, 'nonconforming')} of ${count(given, 'n')} units nonconforming`;
const atLooks = (given: Given, one: BoundMethod, all: BoundMethod): BoundMethod => (looksIn(given) === 'all' ? all : one);

const fractionMethods: Readonly<Record<string, BoundMethod>> = {
  exact: boundMethods.binomial,
  'mid-p': boundMethods.midP,
  wilson: boundMethods.wilson,
  jeffreys: boundMethods.jeffreys,
};
const rateMethods: Readonly<Record<string, BoundMethod>> = { exact: boundMethods.poisson, 'mid-p': boundMethods.midPRate, jeffreys: boundMethods.jeffreysRate };
const byMethod = (given: Given, methods: Readonly<Record<string, BoundMethod>>, exact: BoundMethod): BoundMethod => {
  const { method } = given;
  return typeof method === 'string' ? (methods[method] ?? exact) : exact;
};

function errorMethod(given: Given): BoundMethod {
  if (given['sensitivity'] !== undefined) return boundMethods.knownError;
  return given['method'] === 'melded' ? boundMethods.meldedError : boundMethods.triedError;
}

/** Commands for verdicts and counts. */
export const askedAttributes: readonly AskedQuantity[] = [
  {
    command: 'nonconforming-fraction',
    quantity: quantityNamed('nonconforming-fraction'),
    summary: 'share of nonconforming units, from counts',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'share',
    beside: ['line'],
    seen: unitsSeen,
    subject: () => 'the nonconforming fraction',
    method: (given) => atLooks(given, byMethod(given, fractionMethods, boundMethods.binomial), boundMethods.runFraction),
  },
  {
    command: 'yield',
    quantity: quantityNamed('yield'),
    summary: 'share of conforming units, from counts',
    usualSide: 'lower',
    promise: 'at least',
    scale: 'share',
    beside: ['line'],
    seen: unitsSeen,
    subject: () => 'the yield',
    method: (given) => atLooks(given, boundMethods.yield, boundMethods.runFraction),
  },
  {
    command: 'rate',
    quantity: quantityNamed('count'),
    summary: 'nonconformities per unit, length, area or time',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'rate',
    beside: ['line', 'unit'],
    seen: (given) => `${count(given, 'count')} nonconformities in ${given['exposure'] === undefined ? '1' : writtenNumber(numberIn(given, 'exposure'), 12)}`,
    subject: () => 'the rate',
    method: (given) => atLooks(given, byMethod(given, rateMethods, boundMethods.poisson), boundMethods.runRate),
  },
  {
    command: 'chained-yield',
    quantity: quantityNamed('chained-yield'),
    summary: 'yield through several stations one after the other',
    usualSide: 'lower',
    promise: 'at least',
    scale: 'share',
    beside: ['line'],
    seen: (given) => stationsIn(given).map(({ station, nonconforming, inspected }) => `${station} ${nonconforming} of ${writtenNumber(inspected, 15)}`).join(', '),
    subject: () => 'the chained yield',
    method: () => boundMethods.chained,
  },
  {
    command: 'finite-lot',
    quantity: quantityNamed('finite-lot'),
    summary: 'nonconforming units in a lot, from a random sample of it',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'units',
    beside: ['line'],
    seen: (given) => `${count(given, 'nonconforming')} of ${count(given, 'n')} sampled units nonconforming, in a lot of ${count(given, 'lot_size')}`,
    subject: () => 'the number nonconforming in the lot',
    method: (given) => atLooks(given, boundMethods.lot, boundMethods.runLot),
  },
  {
    command: 'stopped-fraction',
    quantity: quantityNamed('stopped-fraction'),
    summary: 'nonconforming fraction where inspection stopped at a nonconforming unit',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'share',
    beside: ['line'],
    seen: (given) => `Nonconforming unit ${count(given, 'nonconforming')} came as unit ${count(given, 'n')}`,
    subject: () => 'the nonconforming fraction',
    method: () => boundMethods.stopped,
  },
  {
    command: 'clustered-fraction',
    quantity: quantityNamed('clustered-fraction'),
    summary: 'nonconforming fraction where defects come in clusters, with a planned design effect',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'share',
    beside: ['line'],
    seen: unitsSeen,
    subject: () => 'the nonconforming fraction',
    method: () => boundMethods.clustered,
  },
  {
    command: 'inspected-fraction',
    quantity: quantityNamed('inspected-fraction'),
    summary: 'true nonconforming fraction behind a station that errs',
    usualSide: 'upper',
    promise: 'at most',
    scale: 'share',
    beside: ['line'],
    seen: (given) => `${count(given, 'rejected')} of ${count(given, 'n')} units rejected`,
    subject: () => 'the true nonconforming fraction',
    method: errorMethod,
  },
];
