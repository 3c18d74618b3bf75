import { skewAgainstBound } from '../bound/skew-guard.ts';
import type { Guarantee, Promised } from '../plant/guarantee.ts';
import type { Tail } from '../units.ts';
import type { Picture } from '../view/history.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { Assessment } from './assessment.ts';
import { distributionOf } from './distribution-of.ts';
import type { Bounds } from './evidence.ts';
import type { EvidenceState } from './evidence-state.ts';
import type { HeldRecords } from './held-records.ts';
import { boundedMean, knownSigmaMean, studentMean, type MeanMethod, type MeanSample, type Side } from './mean-method.ts';
import type { MeasuredSum } from './measured-sum.ts';
import { measuredFigures } from './measured-figures.ts';
import type { RecordRule } from './record-rule.ts';
import { levelsOf, movedIn } from './rule-levels.ts';

export type MeanPromised = Extract<Promised, { quantity: 'mean' }>;

const none = { backFromCrossing: false, backFromViolation: false };
const noBounds: Bounds = { estimate: undefined, bound: undefined, opposite: undefined };

/** Judges the mean of a window's values by comparing its bounds with the line. */
export class MeanRule implements RecordRule<MeasuredSum> {
  readonly #promise: MeanPromised;
  readonly #method: MeanMethod;
  readonly #good: Side;
  readonly #bad: Side;
  readonly #tail: Tail;
  readonly #opposite: Tail;
  readonly #backFromCrossing: number;
  readonly #backFromViolation: number;

  constructor(guarantee: Guarantee, promise: MeanPromised) {
    const { crossingDistance, violationDistance, violationTail } = levelsOf(guarantee);
    const { line, target, side } = promise;
    this.#promise = promise;
    this.#method = methodOf(guarantee, promise);
    this.#good = side === 'at-least' ? 'above' : 'below';
    this.#bad = side === 'at-least' ? 'below' : 'above';
    this.#tail = guarantee.tail;
    this.#opposite = violationTail;
    this.#backFromCrossing = movedIn(line, target, crossingDistance);
    this.#backFromViolation = movedIn(line, target, violationDistance);
  }

  assess(sum: MeasuredSum, ripe: boolean, waiting: boolean): Assessment {
    const sample = sampleOf(sum);
    if (this.#method.gathers(sample.n, this.#good, this.#promise.line)) return { state: 'gathering', ...none };
    const state = this.#state(sample, ripe);
    if (!waiting || state === 'unknown') return { state, ...none };
    return {
      state,
      backFromCrossing: state === 'demonstrated' && this.#method.stands(this.#good, sample, this.#backFromCrossing, this.#tail),
      backFromViolation: state !== 'violated' && !this.#method.stands(this.#bad, sample, this.#backFromViolation, this.#opposite),
    };
  }

  doubt(sum: MeasuredSum): string | undefined {
    const { sigma, range } = this.#promise;
    if (sum.outside > 0) {
      const told = range ? `the stated range ${range.from} to ${range.to} ${this.#promise.unit}` : 'what can be computed with';
      return `${sum.outside} ${sum.outside === 1 ? 'value lies' : 'values lie'} outside ${told}: either they are wrong, or the range is.`;
    }
    const { n, sd } = sampleOf(sum);
    if (sigma || range || sd > 0 || this.#method.gathers(n, this.#good, this.#promise.line)) return undefined;
    return 'All values of the window are alike: without spread nothing can be said of the mean.';
  }

  figures(sum: MeasuredSum): Readonly<Record<string, number>> {
    return measuredFigures(sum);
  }

  bounds(sum: MeasuredSum): Bounds {
    const sample = sampleOf(sum);
    const { line } = this.#promise;
    if (sample.n === 0 || sum.outside > 0) return noBounds;
    if (this.#method.gathers(sample.n, this.#good, line) && sample.n < 2) return { ...noBounds, estimate: sample.mean };
    return {
      estimate: sample.mean,
      bound: this.#method.bound(this.#good, sample, this.#tail),
      opposite: this.#method.bound(this.#bad, sample, this.#opposite),
    };
  }

  margin({ sum }: HeldRecords<MeasuredSum>): Margin {
    const { bound } = this.bounds(sum);
    if (bound === undefined) return {};
    return { clearance: this.#good === 'above' ? bound - this.#promise.line : this.#promise.line - bound };
  }

  warnings({ moments: { count, skewness } }: MeasuredSum): readonly string[] {
    if (this.#promise.range || skewness === undefined) return [];
    const against = skewAgainstBound(this.#good === 'above' ? 'lower' : 'upper', skewness, count);
    if (against === undefined) return [];
    return [
      `The values are skewed against the bound (skewness ${Number(skewness.toPrecision(3))}, called from ${Number(against.limit.toPrecision(3))}): it promises more than it keeps. ` +
        'Remedy: state the range the values can take, or measure means of groups.',
    ];
  }

  picture(held: HeldRecords<MeasuredSum>): Picture {
    const { line, unit } = this.#promise;
    return distributionOf(held, { reference: line, unit, limit: undefined, model: { verdict: 'not used', sentence: 'The bound is one on the mean; no model of the single values is drawn.' } });
  }

  #state(sample: MeanSample, ripe: boolean): EvidenceState {
    if (!Number.isFinite(sample.mean)) return 'unknown';
    const { line } = this.#promise;
    if (this.#method.stands(this.#good, sample, line, this.#tail)) return 'demonstrated';
    return ripe && this.#method.stands(this.#bad, sample, line, this.#opposite) ? 'violated' : 'undecided';
  }
}

function methodOf({ tail, window }: Guarantee, { sigma, range }: MeanPromised): MeanMethod {
  if (range) return boundedMean(range, tail);
  if (sigma) return knownSigmaMean(sigma.value);
  return studentMean(window.kind === 'units' ? window.units : undefined);
}

function sampleOf({ moments }: MeasuredSum): MeanSample {
  return { n: moments.count, mean: moments.mean ?? NaN, sd: moments.sd ?? NaN };
}
