import { chainLower, chainUpper } from '../../core/bound/chained-yield.ts';
import { demonstrationUnits } from '../../core/bound/critical-count.ts';
import { designedLower, designedUpper } from '../../core/bound/clustered-defects.ts';
import { lotLower, lotUpper } from '../../core/bound/finite-lot.ts';
import { jeffreysLower, jeffreysUpper } from '../../core/bound/jeffreys.ts';
import { midPLower, midPUpper } from '../../core/bound/mid-p.ts';
import { fractionLower, fractionUpper } from '../../core/bound/nonconforming-fraction.ts';
import { jeffreysRateLower, jeffreysRateUpper, midPRateLower, midPRateUpper, rateLower, rateUpper } from '../../core/bound/rate.ts';
import { stoppedFractionLower, stoppedFractionUpper } from '../../core/bound/stopped-sampling.ts';
import { wilsonLower, wilsonUpper } from '../../core/bound/wilson.ts';
import { lineOfYield, yieldLower, yieldUpper } from '../../core/bound/yield.ts';
import { allLooksLotLower, allLooksLotUpper } from '../../core/sequential/lot-evidence.ts';
import { allLooksLower, allLooksUpper } from '../../core/sequential/nonconforming-all-looks.ts';
import { betaPriorAt, type BetaPrior } from '../../core/sequential/nonconforming-evidence.ts';
import { allLooksRateLower, allLooksRateUpper } from '../../core/sequential/rate-all-looks.ts';
import { gammaPriorAt } from '../../core/sequential/rate-evidence.ts';
import type { Tail } from '../../core/units.ts';
import { choiceIn, looksIn, numberIn, optionalNumberIn, sideIn, stationsIn, type Given } from './given.ts';
import { requireExact } from './require-exact.ts';
import { line, looks, nonconforming, side, units, type Field, type Quantity } from './quantity.ts';

type SampleBound = (nonconforming: number, inspected: number, tail: Tail) => number;

const fractionMethods = ['exact', 'mid-p', 'wilson', 'jeffreys'] as const;
const rateMethods = ['exact', 'mid-p', 'jeffreys'] as const;

const bySample: Readonly<Record<(typeof fractionMethods)[number], { readonly lower: SampleBound; readonly upper: SampleBound }>> = {
  exact: { lower: fractionLower, upper: fractionUpper },
  'mid-p': { lower: midPLower, upper: midPUpper },
  wilson: { lower: wilsonLower, upper: wilsonUpper },
  jeffreys: { lower: jeffreysLower, upper: jeffreysUpper },
};
const byCount = {
  exact: { lower: rateLower, upper: rateUpper },
  'mid-p': { lower: midPRateLower, upper: midPRateUpper },
  jeffreys: { lower: jeffreysRateLower, upper: jeffreysRateUpper },
};

const method = (choices: readonly string[]): Field => ({ name: 'method', form: choices, help: 'exact when absent; the others keep the confidence only on average' });
const field = (name: string, help: string, form: Field['form'] = 'number'): Field => ({ name, form, help });

const nonconformingFraction: Quantity = {
  name: 'nonconforming-fraction',
  answer: 'bound',
  fields: [units, nonconforming, side, method(fractionMethods), looks, line],
  named: { inspected: 'n', units: 'n' },
  compute(given, tail) {
    const [x, n] = [numberIn(given, 'nonconforming'), numberIn(given, 'n')];
    const on = sideIn(given);
    const by = choiceIn(given, 'method', fractionMethods, 'exact');
    if (looksIn(given) === 'one') return bySample[by][on](x, n, tail);
    requireExact(by);
    return allLooks(on, x, n, tail, betaPriorAt(numberIn(given, 'line')));
  },
};

const yieldQuantity: Quantity = {
  name: 'yield',
  answer: 'bound',
  fields: [units, nonconforming, side, looks, line],
  named: { inspected: 'n', units: 'n', yieldLine: 'line' },
  compute(given, tail) {
    const [x, n] = [numberIn(given, 'nonconforming'), numberIn(given, 'n')];
    const on = sideIn(given);
    if (looksIn(given) === 'one') return (on === 'lower' ? yieldLower : yieldUpper)(x, n, tail);
    const { a, b } = betaPriorAt(lineOfYield(numberIn(given, 'line')));
    return allLooks(on, n - x, n, tail, { a: b, b: a });
  },
};

function allLooks(on: 'lower' | 'upper', x: number, n: number, tail: Tail, prior: BetaPrior): number {
  return (on === 'upper' ? allLooksUpper : allLooksLower)(x, n, tail, prior);
}

const count: Quantity = {
  name: 'count',
  answer: 'bound',
  fields: [
    field('count', 'nonconformities seen, whole, 0 or more'),
    field('exposure', 'units, metres, square metres or hours they were seen in, above 0; 1 when absent'),
    side,
    method(rateMethods),
    looks,
    { ...line, form: 'number' },
  ],
  named: {},
  compute(given, tail) {
    const [x, exposure] = [numberIn(given, 'count'), optionalNumberIn(given, 'exposure') ?? 1];
    const on = sideIn(given);
    const by = choiceIn(given, 'method', rateMethods, 'exact');
    if (looksIn(given) === 'one') return byCount[by][on](x, exposure, tail);
    requireExact(by);
    return (on === 'upper' ? allLooksRateUpper : allLooksRateLower)(x, exposure, tail, gammaPriorAt(numberIn(given, 'line')));
  },
};

const finiteLot: Quantity = {
  name: 'finite-lot',
  answer: 'bound',
  fields: [field('lot_size', 'units in the lot, whole, 1 or more'), { ...units, help: 'units sampled from it, whole, 1 to lot_size' }, nonconforming, side, looks, line],
  named: { lotSize: 'lot_size', size: 'lot_size', sampled: 'n', inspected: 'n' },
  compute(given, tail) {
    const [lotSize, sampled, x] = [numberIn(given, 'lot_size'), numberIn(given, 'n'), numberIn(given, 'nonconforming')];
    const on = sideIn(given);
    if (looksIn(given) === 'one') return (on === 'upper' ? lotUpper : lotLower)({ nonconforming: x, sampled, lotSize }, tail);
    const prior = betaPriorAt(numberIn(given, 'line'));
    return (on === 'upper' ? allLooksLotUpper : allLooksLotLower)({ nonconforming: x, inspected: sampled, size: lotSize }, tail, prior);
  },
};

const stoppedFraction: Quantity = {
  name: 'stopped-fraction',
  answer: 'bound',
  fields: [{ ...units, help: 'units until inspection stopped, the last one included' }, { ...nonconforming, help: 'nonconforming unit at which it was to stop, whole, 1 to n' }, side],
  named: { inspected: 'n' },
  compute: (given, tail) => sampled(given, tail, { lower: stoppedFractionLower, upper: stoppedFractionUpper }),
};

const clusteredFraction: Quantity = {
  name: 'clustered-fraction',
  answer: 'bound',
  fields: [units, nonconforming, side, field('design_effect', 'planned design effect, declared from history, 1 or more')],
  named: { inspected: 'n', designEffect: 'design_effect' },
  compute(given, tail) {
    const effect = numberIn(given, 'design_effect');
    return sampled(given, tail, { lower: (x, n, a) => designedLower(x, n, effect, a), upper: (x, n, a) => designedUpper(x, n, effect, a) });
  },
};

function sampled(given: Given, tail: Tail, bounds: { readonly lower: SampleBound; readonly upper: SampleBound }): number {
  return bounds[sideIn(given)](numberIn(given, 'nonconforming'), numberIn(given, 'n'), tail);
}

const chainedYield: Quantity = {
  name: 'chained-yield',
  answer: 'bound',
  fields: [{ name: 'stations', form: 'stations', help: 'stations in order of the line, each with the units that reached it' }, side],
  named: {},
  compute: (given, tail) => (sideIn(given) === 'lower' ? chainLower : chainUpper)(stationsIn(given), tail),
};

const demonstration: Quantity = {
  name: 'demonstration',
  answer: 'n',
  fields: [field('rate', 'guaranteed nonconforming fraction, above 0, below 1', 'share'), { ...nonconforming, help: 'nonconforming units with which it still passes, whole, 0 or more' }],
  named: { line: 'rate' },
  compute: (given, tail) => demonstrationUnits(numberIn(given, 'nonconforming'), numberIn(given, 'rate'), tail),
};

/** Quantities about verdicts and counts. */
export const attributeQuantities: readonly Quantity[] = [
  nonconformingFraction,
  yieldQuantity,
  count,
  finiteLot,
  stoppedFraction,
  clusteredFraction,
  chainedYield,
  demonstration,
];
