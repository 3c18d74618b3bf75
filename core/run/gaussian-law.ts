import type { Side } from '../evidence/mean-method.ts';
import { allLooksMeanDistance, logMeanEvidence } from '../sequential/mean-known-sigma.ts';
import { allLooksMeanDistanceUnknownSigma, logMeanEvidenceUnknownSigma, usualTuning } from '../sequential/mean-unknown-sigma.ts';
import type { Tail } from '../units.ts';
import type { MeanLaw, MeanLevels } from './mean-law.ts';

interface GaussianSnapshot {
  readonly values: number;
  readonly average: number;
  readonly squares: number;
}

/** The figures of a run against a line: values, average minus line, sum of squared deviations from the average. */
interface Sample {
  readonly n: number;
  readonly excess: number;
  readonly squares: number;
}

/** A mixture's evidence as 'base + grown + ln of a share from 1/2 to 1', and the same exactly. */
interface Mixture {
  /** Evidence at most this, and at least half of it, while the average is on the good side of the line. */
  readonly grown: (sample: Sample) => number;
  readonly exact: (sample: Sample) => number;
  readonly distance: (sample: Sample, tail: Tail) => number;
  readonly least: number;
}

/** Known standard deviation, above 0. @param spreadTuning see `tuningFor` */
export function knownSigmaMixture(sigma: number, spreadTuning: number): Mixture {
  const variance = sigma * sigma;
  return {
    least: 1,
    grown: ({ n, excess }) => {
      const spread = n * variance;
      const sum = n * excess;
      return Math.LN2 - 0.5 * Math.log1p(spread / spreadTuning) + (sum * sum) / (2 * (spread + spreadTuning));
    },
    exact: ({ n, excess }) => logMeanEvidence(n * excess, n * variance, spreadTuning),
    distance: ({ n }, tail) => allLooksMeanDistance(n, sigma, tail, spreadTuning),
  };
}

/** Unknown standard deviation, Gaussian values. @param enough ln(1 / tail) of the guarantee's level */
export function unknownSigmaMixture(enough: number): Mixture {
  const tuning = usualTuning;
  let least = 2;
  // With next to no spread the evidence is the largest that so few values can give.
  while (!(logMeanEvidenceUnknownSigma(least, 1, Number.MIN_VALUE, tuning) >= enough)) least += 1;
  return {
    least,
    grown: ({ n, excess, squares }) => {
      const within = (n + tuning) * squares + n * tuning * excess * excess;
      const square = squares > 0 ? (excess * excess * n * n * n) / within : 0;
      return Math.LN2 - 0.5 * Math.log1p(n / tuning) + (n / 2) * Math.log1p(square / n);
    },
    exact: ({ n, excess, squares }) => logMeanEvidenceUnknownSigma(n, excess, squares, tuning),
    distance: ({ n, squares }, tail) => allLooksMeanDistanceUnknownSigma(n, squares, tail, tuning),
  };
}

/** The mean of Gaussian values; three numbers, by Welford's recursion. */
export class GaussianLaw implements MeanLaw {
  readonly #levels: MeanLevels;
  readonly #mixture: Mixture;
  #values = 0;
  /** Average minus line, and sum of squared deviations from the average. */
  #average = 0;
  #squares = 0;

  constructor(levels: MeanLevels, mixture: Mixture) {
    this.#levels = levels;
    this.#mixture = mixture;
  }

  get values(): number {
    return this.#values;
  }

  get least(): number {
    return this.#mixture.least;
  }

  admit(value: number): void {
    const off = value - this.#levels.line - this.#average;
    this.#values += 1;
    this.#average += off / this.#values;
    this.#squares += off * (value - this.#levels.line - this.#average);
  }

  clear(): void {
    [this.#values, this.#average, this.#squares] = [0, 0, 0];
  }

  lnOn(side: Side): number {
    return this.#values === 0 ? 0 : this.#mixture.exact(this.#sample(side, this.#levels.line));
  }

  isOn(side: Side): boolean {
    return this.#reaches(side, this.#levels.line);
  }

  stands(side: Side, line: number): boolean {
    return this.#reaches(side, line);
  }

  bounds(): ReturnType<MeanLaw['bounds']> {
    if (this.#values === 0) return { estimate: undefined, above: undefined, below: undefined };
    const estimate = this.#levels.line + this.#average;
    const far = (side: Side): number | undefined => {
      const distance = this.#mixture.distance(this.#sample(side, this.#levels.line), this.#levels.tail[side]);
      return Number.isFinite(distance) ? distance : undefined;
    };
    const [above, below] = [far('above'), far('below')];
    return { estimate, above: above === undefined ? above : estimate - above, below: below === undefined ? below : estimate + below };
  }

  snapshot(): GaussianSnapshot {
    return { values: this.#values, average: this.#average, squares: this.#squares };
  }

  restore({ values, average, squares }: GaussianSnapshot): void {
    [this.#values, this.#average, this.#squares] = [values, average, squares];
  }

  #sample(side: Side, line: number): Sample {
    const excess = this.#average + (this.#levels.line - line);
    return { n: this.#values, excess: side === 'above' ? excess : -excess, squares: Math.max(0, this.#squares) };
  }

  /** The share of the mixture's last factor lies between a half and one, so most records need no distribution function. */
  #reaches(side: Side, line: number): boolean {
    const sample = this.#sample(side, line);
    if (this.#values < this.#mixture.least || !(sample.excess > 0)) return false;
    const enough = this.#levels.enough[side];
    const grown = this.#mixture.grown(sample);
    if (!(grown >= enough)) return false;
    return grown - Math.LN2 >= enough || this.#mixture.exact(sample) >= enough;
  }
}
