import { boundMethods } from '../describe/bound-methods.ts';
import type { Method } from '../evidence/method.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { DeteriorationRule } from './change-watch-of.ts';

const mixed = 'All rates on one side of the line are weighed against the line itself by how likely they make what was seen; the evidence is the average of these ratios.';

/** How the evidence of a run is computed; undefined where a guarantee has none. */
export function runMethodOf({ promise, stationError, clusters }: Guarantee): Method | undefined {
  if (stationError !== undefined || clusters !== undefined) return undefined;
  switch (promise.quantity) {
    case 'nonconforming-fraction':
    case 'yield':
      return { ...boundMethods.runFraction, version: 1, sentence: mixed };
    case 'fraction-beyond-limit':
      return promise.model === 'normal' ? undefined : { ...boundMethods.runFraction, version: 1, sentence: mixed };
    case 'rate':
      return { ...boundMethods.runRate, version: 1, sentence: mixed };
    case 'lot-fraction':
      return { ...boundMethods.runLot, version: 1, sentence: 'How likely each number nonconforming in the lot was before the sample, against how likely it is after it.' };
    case 'mean':
      if (promise.range) return boundedRun;
      return promise.sigma
        ? { ...boundMethods.runMeanKnown, version: 1, sentence: 'All means on one side of the line are weighed against the line itself by how likely they make what was measured.' }
        : { ...boundMethods.runMean, version: 1, sentence: 'All means on one side of the line, in standard deviations, are weighed against the line itself by how likely they make what was measured.' };
    case 'chained-yield':
      return undefined;
  }
}

const boundedRun: Method = {
  name: 'betting bound of a run',
  version: 1,
  sentence: 'A bet against the line before each value, its stake fixed by the values before; the evidence is what the bets have won. It decides; the bound that is shown needs no line and is wider.',
  assumes: ['Values lie within the stated range.', 'The line was fixed before the run began.'],
  source: 'I. Waudby-Smith, A. Ramdas 2023 (abstract and code read)',
};

/** How a deterioration rule is computed. */
export function detectorMethodOf(rule: DeteriorationRule | undefined): Method {
  return rule?.detector === 'cusum' ? cusum : mixture;
}

const mixture: Method = {
  name: 'mixture change detector',
  version: 1,
  sentence: 'Every moment at which the change could have come, and several sizes of it, are weighed against no change; the alarm is raised when their sum reaches the units between false calls.',
  assumes: ['Given the past, each unit nonconforms with a chance of at most the baseline while the line is well; clusters break this.'],
  source: 'mixture Shiryaev–Roberts e-detector, J. Shin, A. Ramdas, A. Rinaldo (abstract read); argument derived anew',
};

const cusum: Method = {
  name: 'cumulative sum',
  version: 1,
  sentence: 'A sum that rises with each nonconforming unit and falls with each conforming one, never below zero; its threshold is set for the wanted units between false calls at the baseline.',
  assumes: ['Units nonconform independently of each other, at the baseline while the line is well.'],
  source: 'E. S. Page 1954; run length by Markov chain, M. R. Reynolds, Z. G. Stoumbos 1999 (both from memory)',
};
