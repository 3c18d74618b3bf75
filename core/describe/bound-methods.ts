import { windowMethods, type Method } from '../evidence/method.ts';

/** What a person has to know of a bound beside its figure: its name, what it assumes and where it comes from. */
export type BoundMethod = Pick<Method, 'name' | 'assumes' | 'source'>;

const [steady = ''] = windowMethods.binomial.assumes;
const [singly = ''] = windowMethods.poisson.assumes;
const normal = 'Measurements are independent and normally distributed; nothing else backs a statement about the far tail.';
const onAverage = 'It keeps the confidence level on average only: for some true values it covers less.';
const ownDerivation = 'own derivation';

/** The methods of the command line: those of the windows, and the ones that are there for comparison or for a run. */
export const boundMethods = {
  ...windowMethods,
  midP: { name: 'mid-P bound', assumes: [steady, onAverage], source: 'H. O. Lancaster 1961 (from memory)' },
  wilson: { name: 'Wilson score bound', assumes: [steady, onAverage], source: 'E. B. Wilson, Journal of the American Statistical Association 22 (1927), 209–212 (from memory)' },
  jeffreys: { name: 'Jeffreys quantile', assumes: [steady, onAverage], source: 'H. Jeffreys 1961 (from memory)' },
  midPRate: { name: 'mid-P bound on a rate', assumes: [singly, onAverage], source: 'H. O. Lancaster 1961 (from memory)' },
  jeffreysRate: { name: 'Jeffreys quantile of a rate', assumes: [singly, onAverage], source: 'H. Jeffreys 1961 (from memory)' },
  stopped: {
    name: 'exact bound for sampling that stops at a nonconforming unit',
    assumes: [steady, 'It was fixed in advance at which nonconforming unit inspection stops, and it stopped there.'],
    source: 'negative binomial waiting time; own derivation',
  },
  clustered: {
    name: 'exact bound of a sample reduced by a planned design effect',
    assumes: ['Nonconforming units may come in clusters; the design effect was declared from history and not taken from these units.'],
    source: 'L. Kish 1965 (from memory) on the exact binomial bound',
  },
  knownError: {
    name: 'exact bound corrected for known inspection errors',
    assumes: [steady, 'The station rejects nonconforming and conforming units with the stated chances, each by itself.'],
    source: 'W. J. Rogan, B. Gladen 1978 (seen cited)',
  },
  triedError: {
    name: 'three exact bounds together: rejects, and the errors as tried',
    assumes: [steady, 'Units tried, known to conform or not, stand for those of the line.'],
    source: "C. E. Bonferroni's inequality on the formula of W. J. Rogan, B. Gladen 1978 (seen cited)",
  },
  meldedError: {
    name: 'melded bound: rejects, and the errors as tried',
    assumes: [steady, 'Units tried, known to conform or not, stand for those of the line.', 'Its coverage is measured, not proved.'],
    source: 'D. M. Bayer, M. P. Fay, B. I. Graubard, arXiv 2205.13494 (abstract read)',
  },
  capability: { name: 'bound on a one-sided capability index', assumes: [normal], source: 'noncentral t distribution of the distance in standard deviations (definition)' },
  spread: { name: 'chi-square bound on the standard deviation', assumes: [normal], source: 'chi-square distribution of (n − 1) s²/σ² (definition)' },
  tolerance: { name: 'normal tolerance factor', assumes: [normal], source: 'D. B. Owen, Technometrics 10 (1968) (from memory)' },
  rank: { name: 'tolerance bound by rank', assumes: ['Measurements are independent and of one distribution, whichever it is.'], source: 'S. S. Wilks, Annals of Mathematical Statistics 12 (1941), 91–96 (from memory)' },
  runFraction: {
    name: 'beta-mixture bound of a run',
    assumes: ['The chance of nonconforming stays the same through the run.', 'The line was fixed before the run began.'],
    source: 'mixture method, H. Robbins 1970 (from memory), one-sided; own derivation',
  },
  runRate: {
    name: 'gamma-mixture bound of a run',
    assumes: [singly, 'The line was fixed before the run began.'],
    source: 'S. R. Howard and others 2021 (opening read), one-sided; own derivation',
  },
  runLot: {
    name: 'bound on a lot from its prior-posterior ratio',
    assumes: ['The sampled units were drawn from the lot by chance.', 'The line was fixed before the first was drawn.'],
    source: 'I. Waudby-Smith, A. Ramdas 2020 (opening read), one-sided; own derivation',
  },
  runMeanKnown: {
    name: 'half-normal mixture bound of a run',
    assumes: ['The standard deviation is known from elsewhere and still holds.', 'Where the bound is to be tightest was fixed before the run began.'],
    source: 'S. R. Howard and others 2021 (library header read)',
  },
  runMean: {
    name: 't-mixture bound of a run',
    assumes: ['Measurements are independent and normally distributed; it fails where they are skewed against the bound.'],
    source: `H. Wang, A. Ramdas, arXiv 2310.03722 (abstract read), one-sided; ${ownDerivation}`,
  },
} as const satisfies Record<string, BoundMethod>;

/** The look rule in words. */
export const lookRules = {
  one: 'Valid at one look fixed in advance, not at every look of a running line.',
  all: 'Valid at all looks of the run together, until the evidence is restarted.',
} as const;
