import { fractionBeyondLower, fractionBeyondUpper } from '../bound/fraction-beyond-limit.ts';
import { toleranceFactor } from '../bound/tolerance.ts';
import { decimalComplement } from '../figure/decimal-complement.ts';
import { normalTail } from '../numerics/normal.ts';
import type { Guarantee, Promised } from '../plant/guarantee.ts';
import type { Tail } from '../units.ts';
import type { Picture } from '../view/history.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { Assessment } from './assessment.ts';
import { CriticalValue } from './critical-value.ts';
import { distributionOf } from './distribution-of.ts';
import type { Bounds } from './evidence.ts';
import type { HeldRecords } from './held-records.ts';
import type { MeasuredSum } from './measured-sum.ts';
import { measuredFigures } from './measured-figures.ts';
import { ModelCheck } from './model-check.ts';
import type { RecordRule } from './record-rule.ts';
import { levelsOf, movedIn } from './rule-levels.ts';

export type BeyondLimit = Extract<Promised, { quantity: 'fraction-beyond-limit' }>;

const none = { backFromCrossing: false, backFromViolation: false };
const noBounds: Bounds = { estimate: undefined, bound: undefined, opposite: undefined };
/** Standard deviations beyond which no distance of a limit is computed with. */
const farthest = 1e9;

/**
 * Judges the fraction beyond a specification limit by the normal model: the distance from mean to limit in standard
 * deviations against tolerance factors. While the model does not fit the values, nothing is told.
 *
 * @source the upper bound stands at or below the line where the distance reaches the tolerance factor of the share
 *   1 - line (`toleranceFactor`); the lower bound beyond it where its negative reaches that of the share line
 */
export class NormalRule implements RecordRule<MeasuredSum> {
  readonly check = new ModelCheck();
  readonly #promise: BeyondLimit;
  readonly #tail: Tail;
  readonly #opposite: Tail;
  readonly #demonstrates: CriticalValue;
  readonly #violates: CriticalValue;
  readonly #backFromCrossing: CriticalValue;
  readonly #notBackFromViolation: CriticalValue;

  constructor(guarantee: Guarantee, promise: BeyondLimit) {
    const { crossingDistance, violationDistance, violationTail } = levelsOf(guarantee);
    const { atMost, target } = promise;
    const { tail } = guarantee;
    this.#promise = promise;
    this.#tail = tail;
    this.#opposite = violationTail;
    const good = (line: number): CriticalValue => new CriticalValue((n) => toleranceFactor(n, decimalComplement(line), tail));
    const bad = (line: number): CriticalValue => new CriticalValue((n) => toleranceFactor(n, line, violationTail));
    this.#demonstrates = good(atMost);
    this.#backFromCrossing = good(movedIn(atMost, target, crossingDistance));
    this.#violates = bad(atMost);
    this.#notBackFromViolation = bad(movedIn(atMost, target, violationDistance));
  }

  assess(sum: MeasuredSum, ripe: boolean, waiting: boolean): Assessment {
    const { fit } = this.check;
    if (fit === undefined || fit.kind === 'too few values') return { state: 'gathering', ...none };
    const { count } = sum.moments;
    const distance = this.#distance(sum);
    if (fit.kind !== 'fits' || !(Math.abs(distance) <= farthest)) return { state: 'unknown', ...none };
    const demonstrated = this.#demonstrates.reachedBy(distance, count);
    const violated = !demonstrated && ripe && this.#violates.reachedBy(-distance, count);
    const state = demonstrated ? 'demonstrated' : violated ? 'violated' : 'undecided';
    if (!waiting) return { state, ...none };
    return {
      state,
      backFromCrossing: demonstrated && this.#backFromCrossing.reachedBy(distance, count),
      backFromViolation: !violated && !this.#notBackFromViolation.reachedBy(-distance, count),
    };
  }

  doubt(sum: MeasuredSum): string | undefined {
    if (sum.outside > 0) return `${sum.outside} ${sum.outside === 1 ? 'value lies' : 'values lie'} outside what can be computed with.`;
    return this.check.fit?.kind === 'does not fit' ? this.#verdict().sentence : undefined;
  }

  figures(sum: MeasuredSum): Readonly<Record<string, number>> {
    const distance = this.#distance(sum);
    return { ...measuredFigures(sum), ...(Number.isFinite(distance) ? { limitDistanceInSd: distance } : {}) };
  }

  bounds(sum: MeasuredSum): Bounds {
    const distance = this.#distance(sum);
    const { count } = sum.moments;
    if (this.check.fit?.kind !== 'fits' || sum.outside > 0 || !(Math.abs(distance) <= farthest)) return noBounds;
    return {
      estimate: normalTail(distance),
      bound: fractionBeyondUpper(count, distance, this.#tail),
      opposite: fractionBeyondLower(count, distance, this.#opposite),
    };
  }

  margin(): Margin {
    return {};
  }

  warnings(): readonly string[] {
    return [];
  }

  picture(held: HeldRecords<MeasuredSum>): Picture {
    const { limit, unit } = this.#promise;
    return distributionOf(held, { reference: limit.value, unit, limit, model: this.#verdict() });
  }

  /** From the mean to the limit, positive on the good side; not finite without spread. */
  #distance({ moments: { mean = NaN, sd = NaN } }: MeasuredSum): number {
    const { side, value } = this.#promise.limit;
    return (side === 'below' ? mean - value : value - mean) / sd;
  }

  #verdict(): Extract<Picture, { kind: 'distribution' }>['model'] {
    const { fit } = this.check;
    switch (fit?.kind) {
      case undefined:
        return { verdict: 'too few values', sentence: 'The normal model has not been checked yet.' };
      case 'too few values':
        return { verdict: 'too few values', sentence: `The normal model is checked from ${fit.needed} values on; there are ${fit.n}.` };
      case 'fits':
        return { verdict: 'fits', sentence: `The newest ${fit.n} values do not speak against the normal model (p = ${Number(fit.pValue.toPrecision(2))}); that does not prove it.` };
      case 'does not fit':
        return {
          verdict: 'does not fit',
          sentence: `The newest ${fit.n} values do not fit the normal model (p = ${Number(fit.pValue.toPrecision(2))}): its bound is not used. Count the units beyond the limit instead.`,
        };
    }
  }
}
