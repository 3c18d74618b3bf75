import type { Guarantee } from '../plant/guarantee.ts';
import { clusterWords, errorWords } from './remedy-words.ts';

/** How a guarantee's bound is computed, for people and for the record. The version rises when figures could change. */
export interface Method {
  readonly name: string;
  readonly version: number;
  readonly sentence: string;
  readonly assumes: readonly string[];
  readonly source: string;
}

const steady = 'The units of the window come from one steady process: each nonconforms with the same chance, independently of the others.';
const clopperPearson = 'C. J. Clopper, E. S. Pearson, Biometrika 26 (1934), 404–413';

export const windowMethods = {
  binomial: {
    name: 'exact binomial bound',
    version: 1,
    sentence: 'The largest nonconforming fraction at which so few nonconforming units would still be seen with the probability that the confidence level leaves over.',
    assumes: [steady],
    source: clopperPearson,
  },
  yield: {
    name: 'exact binomial bound on the yield',
    version: 1,
    sentence: 'The smallest yield at which so many conforming units would still be seen with the probability that the confidence level leaves over.',
    assumes: [steady],
    source: clopperPearson,
  },
  poisson: {
    name: 'exact Poisson bound',
    version: 1,
    sentence: 'The largest rate at which so few nonconformities in this exposure would still be seen with the probability that the confidence level leaves over.',
    assumes: ['Nonconformities occur singly, independently and at one rate per exposure within the window.'],
    source: 'F. Garwood, Biometrika 28 (1936), 437–442 (from memory)',
  },
  knownError: {
    name: 'exact binomial bound corrected for known inspection errors',
    version: 1,
    sentence: 'The exact bound on the share of rejected units, turned into the share of nonconforming ones by the chances with which the station rejects bad and good units.',
    assumes: [steady, 'The station rejects bad and good units with the declared chances, independently from unit to unit.'],
    source: 'W. J. Rogan, B. Gladen, American Journal of Epidemiology 107 (1978), 71–76 (seen cited); J. Reiczigel, J. Földi, L. Ózsvári, Epidemiology and Infection 138 (2010), 1674–1678 (opening read)',
  },
  triedError: {
    name: 'exact binomial bound corrected for tried inspection errors',
    version: 1,
    sentence: 'Three exact bounds that hold together, on the share of rejected units and on the chances with which the station rejected bad and good units in its trial; 6/10 of the error for the first, 2/10 for each of the others.',
    assumes: [steady, 'The station rejects units as it did those of its trial.'],
    source: 'C. E. Bonferroni’s inequality on the formula of W. J. Rogan and B. Gladen 1978; shares: own choice',
  },
  designed: {
    name: 'exact binomial bound with a planned design effect',
    version: 1,
    sentence: 'The exact bound of a sample smaller by the declared design effect.',
    assumes: ['Nonconforming units may come in clusters; the design effect was declared from history and not taken from these units.'],
    source: 'effective sample size after L. Kish 1965 (from memory); coverage measured, not proved',
  },
  events: {
    name: 'exact binomial bound on events',
    version: 1,
    sentence: 'Nonconforming units within the declared gap of the one before count as one event; the exact bound on the share of events, times the declared units of an event.',
    assumes: ['Events come independently of each other at one rate.', 'An event has the declared number of units in the mean.'],
    source: `${clopperPearson}, on events: own derivation`,
  },
  wholeLots: {
    name: 'exact binomial bound on whole lots',
    version: 1,
    sentence: 'The largest share of nonconforming lots at which so few of them would still be seen with the probability that the confidence level leaves over. What happens within a lot is left open.',
    assumes: ['Lots come from one steady process: each nonconforms with the same chance, independently of the others.', 'A lot counts once it has ended.'],
    source: `${clopperPearson}, on lots`,
  },
  studentMean: {
    name: 't bound on the mean',
    version: 1,
    sentence: 'The mean of the window, moved toward the line by the t quantile times its standard error.',
    assumes: ['Values are independent and near enough to normal; skewness against the bound is watched and said.'],
    source: 'Student, Biometrika 6 (1908), 1–25 (from memory)',
  },
  knownSigmaMean: {
    name: 'z bound on the mean',
    version: 1,
    sentence: 'The mean of the window, moved toward the line by the normal quantile times the known standard error.',
    assumes: ['The standard deviation is known from the stated source and still holds.', 'Values are independent.'],
    source: 'ISO 2854:1976, section on a known variance (from memory)',
  },
  boundedMean: {
    name: 'bound on the mean of a bounded measurement',
    version: 1,
    sentence: 'A bound that assumes no distribution, only that every value lies within the stated range.',
    assumes: ['Values lie within the stated range and are independent.'],
    source: 'A. Maurer, M. Pontil, Conference on Learning Theory 2009, theorem 4',
  },
  normalTail: {
    name: 'normal-model bound on the fraction beyond a limit',
    version: 1,
    sentence: 'The distance from mean to limit in standard deviations, turned into a fraction by the noncentral t distribution.',
    assumes: ['Values are independent and normally distributed; the fit is tested and the model is not used where it fails.'],
    source: 'ISO 16269-6:2014, annex on one-sided normal tolerance (from memory)',
  },
  chained: {
    name: 'gamma bound on the chained yield',
    version: 1,
    sentence: 'The losses of all stations added on a logarithmic scale, bounded by a gamma distribution with the same mean and spread.',
    assumes: ['Stations lose units independently; units lost upstream are not inspected downstream.'],
    source: 'M. P. Fay, E. J. Feuer, Statistics in Medicine 16 (1997), 791–801, on a logarithmic scale (own adaptation)',
  },
  lot: {
    name: 'exact hypergeometric bound',
    version: 1,
    sentence: 'The largest number nonconforming in the lot with which so few in the sample would still be seen with the probability that the confidence level leaves over.',
    assumes: ['The sampled units were drawn from the lot by chance.', 'The lot size is known.'],
    source: 'hypergeometric tail inverted as for the exact binomial bound; own derivation',
  },
} as const satisfies Record<string, Method>;

export function methodOf(guarantee: Guarantee): Method {
  const { promise, stationError, clusters } = guarantee;
  if (stationError !== undefined) return told(stationError.kind === 'known' ? windowMethods.knownError : windowMethods.triedError, errorWords(stationError));
  if (clusters !== undefined) return told(clusterMethods[clusters.kind], clusterWords(clusters));
  switch (promise.quantity) {
    case 'nonconforming-fraction':
      return windowMethods.binomial;
    case 'yield':
      return windowMethods.yield;
    case 'rate':
      return windowMethods.poisson;
    case 'mean':
      if (promise.range) return windowMethods.boundedMean;
      return promise.sigma ? windowMethods.knownSigmaMean : windowMethods.studentMean;
    case 'fraction-beyond-limit':
      return promise.model === 'normal' ? windowMethods.normalTail : windowMethods.binomial;
    case 'chained-yield':
      return windowMethods.chained;
    case 'lot-fraction':
      return windowMethods.lot;
  }
}

const clusterMethods = { events: windowMethods.events, 'design-effect': windowMethods.designed, lots: windowMethods.wholeLots } as const;

/** A method with what the limit sheet declares for it. */
const told = (method: Method, declared: string): Method => ({ ...method, assumes: [...method.assumes, declared] });
