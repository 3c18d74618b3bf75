import { boundedMeanLower, boundedMeanUpper } from '../../core/bound/bounded-mean.ts';
import { capabilityLower, capabilityUpper } from '../../core/bound/capability.ts';
import { fractionBeyondLower, fractionBeyondUpper } from '../../core/bound/fraction-beyond-limit.ts';
import { meanLower, meanLowerKnownSigma, meanUpper, meanUpperKnownSigma } from '../../core/bound/mean.ts';
import { OutOfDomain, requireWhole } from '../../core/bound/out-of-domain.ts';
import { sdLower, sdUpper } from '../../core/bound/standard-deviation.ts';
import { toleranceFactor, toleranceRank } from '../../core/bound/tolerance.ts';
import { allLooksMeanDistance, tuningFor } from '../../core/sequential/mean-known-sigma.ts';
import { allLooksMeanDistanceUnknownSigma, usualTuning } from '../../core/sequential/mean-unknown-sigma.ts';
import type { Tail } from '../../core/units.ts';
import { looksIn, numberIn, optionalNumberIn, sideIn, type Given } from './given.ts';
import { looks, measurements, side, type Field, type Quantity } from './quantity.ts';

const number = (name: string, help: string): Field => ({ name, form: 'number', help });
const meanField = number('mean', 'their average, in the unit of measure');
const sdField = number('sd', 'their sample standard deviation (n - 1), 0 or more');

const mean: Quantity = {
  name: 'mean',
  answer: 'bound',
  fields: [
    measurements,
    meanField,
    sdField,
    number('sigma', 'in place of sd: the known standard deviation of one measurement, above 0'),
    side,
    number('from', 'smallest value a measurement can take: with `to`, a bound that assumes no distribution'),
    number('to', 'largest value a measurement can take'),
    { ...looks, help: 'one look fixed in advance, or all looks of a run' },
    number('tightest_at', 'with sigma and all looks: measurements at which the bound is to be tightest, fixed in advance'),
  ],
  named: { measurements: 'n', squares: 'sd' },
  compute(given, tail) {
    const [n, average] = [numberIn(given, 'n'), numberIn(given, 'mean')];
    const upper = sideIn(given) === 'upper';
    const sigma = optionalNumberIn(given, 'sigma');
    if (sigma !== undefined && given['sd'] !== undefined) throw new OutOfDomain('sigma', sigma, 'sd or sigma, not both');
    const ranged = given['from'] !== undefined || given['to'] !== undefined;
    if (looksIn(given) === 'all') return atAllLooks(given, { n, average, sigma, upper, ranged }, tail);
    if (given['tightest_at'] !== undefined) throw new OutOfDomain('tightest_at', given['tightest_at'], 'only with sigma and looks all');
    if (ranged) {
      if (sigma !== undefined) throw new OutOfDomain('sigma', sigma, 'sd beside from and to');
      const sample = { n, mean: average, sd: numberIn(given, 'sd'), from: numberIn(given, 'from'), to: numberIn(given, 'to') };
      return (upper ? boundedMeanUpper : boundedMeanLower)(sample, tail);
    }
    if (sigma !== undefined) return (upper ? meanUpperKnownSigma : meanLowerKnownSigma)(n, average, sigma, tail);
    return (upper ? meanUpper : meanLower)(n, average, numberIn(given, 'sd'), tail);
  },
};

interface Averaged {
  readonly n: number;
  readonly average: number;
  readonly sigma: number | undefined;
  readonly upper: boolean;
  readonly ranged: boolean;
}

function atAllLooks(given: Given, { n, average, sigma, upper, ranged }: Averaged, tail: Tail): number {
  if (ranged) throw new OutOfDomain('looks', 'all', 'one beside from and to: at all looks that bound needs the values in their order');
  if (sigma === undefined) {
    requireWhole('n', n, 2);
    const distance = allLooksMeanDistanceUnknownSigma(n, (n - 1) * numberIn(given, 'sd') ** 2, tail, usualTuning);
    return upper ? average + distance : average - distance;
  }
  const distance = allLooksMeanDistance(n, sigma, tail, tuningFor(numberIn(given, 'tightest_at'), sigma, tail));
  return upper ? average + distance : average - distance;
}

const fractionBeyondLimit: Quantity = {
  name: 'fraction-beyond-limit',
  answer: 'bound',
  fields: [measurements, number('k', '(USL - mean)/sd or (mean - LSL)/sd of the sample, -1e9 to 1e9'), side],
  named: {},
  compute: (given, tail) => (sideIn(given) === 'upper' ? fractionBeyondUpper : fractionBeyondLower)(numberIn(given, 'n'), numberIn(given, 'k'), tail),
};

const capability: Quantity = {
  name: 'capability',
  answer: 'bound',
  fields: [measurements, number('estimate', 'one-sided index of the sample: (USL - mean)/(3 sd) or (mean - LSL)/(3 sd)'), side],
  named: {},
  compute: (given, tail) => (sideIn(given) === 'lower' ? capabilityLower : capabilityUpper)(numberIn(given, 'n'), numberIn(given, 'estimate'), tail),
};

const standardDeviation: Quantity = {
  name: 'standard-deviation',
  answer: 'bound',
  fields: [measurements, sdField, side],
  named: {},
  compute: (given, tail) => (sideIn(given) === 'upper' ? sdUpper : sdLower)(numberIn(given, 'n'), numberIn(given, 'sd'), tail),
};

const coverage: Field = { name: 'coverage', form: 'share', help: 'share of all units that is to lie within, above 0, below 1' };

const tolerance: Quantity = {
  name: 'tolerance-factor',
  answer: 'k',
  fields: [measurements, coverage],
  named: {},
  compute: (given, tail) => toleranceFactor(numberIn(given, 'n'), numberIn(given, 'coverage'), tail),
};

const rank: Quantity = {
  name: 'tolerance-rank',
  answer: 'rank',
  fields: [{ ...measurements, help: 'measurements, whole, 1 or more' }, coverage],
  named: {},
  compute: (given, tail) => toleranceRank(numberIn(given, 'n'), numberIn(given, 'coverage'), tail),
};

/** Quantities about measurements. */
export const measurementQuantities: readonly Quantity[] = [mean, fractionBeyondLimit, capability, standardDeviation, tolerance, rank];
