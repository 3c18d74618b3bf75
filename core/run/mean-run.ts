import type { Assessment } from '../evidence/assessment.ts';
import type { Batch, Bounds } from '../evidence/evidence.ts';
import type { MeanPromised } from '../evidence/mean-rule.ts';
import type { Side } from '../evidence/mean-method.ts';
import { measuredRecords } from '../evidence/record-columns.ts';
import { levelsOf, movedIn } from '../evidence/rule-levels.ts';
import { farthestMeasurement } from '../moments/running-moments.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import { tuningFor } from '../sequential/mean-known-sigma.ts';
import type { Margin } from '../view/guarantee-view.ts';
import { BoundedLaw } from './bounded-law.ts';
import { GaussianLaw, knownSigmaMixture, unknownSigmaMixture } from './gaussian-law.ts';
import type { MeanLaw, MeanLevels } from './mean-law.ts';
import { runAssessment } from './run-assessment.ts';
import type { RunEvidence } from './run-evidence.ts';

interface MeanRunSnapshot {
  readonly law: unknown;
  readonly outside: number;
}

const noBounds: Bounds = { estimate: undefined, bound: undefined, opposite: undefined };
/** Values around which the bound is tightest where the window does not say. */
const usualValues = 1000;

/** The run of a guarantee on a mean: one look after every value. A value that cannot be makes it unknown until it begins anew. */
export class MeanRun implements RunEvidence {
  readonly #promise: MeanPromised;
  readonly #law: MeanLaw;
  readonly #good: Side;
  readonly #bad: Side;
  readonly #backFromCrossing: number;
  readonly #backFromViolation: number;
  #outside = 0;
  #assessment: Assessment;

  constructor(guarantee: Guarantee, promise: MeanPromised) {
    const { crossingDistance, violationDistance } = levelsOf(guarantee);
    this.#promise = promise;
    this.#good = promise.side === 'at-least' ? 'above' : 'below';
    this.#bad = promise.side === 'at-least' ? 'below' : 'above';
    this.#law = lawOf(guarantee, promise, this.#good);
    this.#backFromCrossing = movedIn(promise.line, promise.target, crossingDistance);
    this.#backFromViolation = movedIn(promise.line, promise.target, violationDistance);
    this.#assessment = this.#assess();
  }

  get assessment(): Assessment {
    return this.#assessment;
  }

  get size(): number {
    return this.#law.values;
  }

  take({ part, to }: Batch, from: number): number {
    const columns = measuredRecords.columns(part, from, to);
    if (columns === undefined) return to;
    for (let place = from; place < to; place += 1) {
      this.#admit(columns.a[place - from] as number);
      const now = this.#assess();
      if (now === this.#assessment) continue;
      this.#assessment = now;
      return place + 1;
    }
    return to;
  }

  /** The evidence of a mean depends on the order of its values: what a correction says comes too late for it. */
  correct(): void {
    // The window takes the correction; the run stands as it was told.
  }

  clear(): void {
    this.#law.clear();
    this.#outside = 0;
    this.#assessment = this.#assess();
  }

  figures(): Readonly<Record<string, number>> {
    const { estimate } = this.#law.bounds();
    return { runValues: this.#law.values, ...(estimate === undefined ? {} : { runMean: estimate }) };
  }

  lnDemonstrated(): number {
    return this.#outside > 0 ? NaN : this.#law.lnOn(this.#good);
  }

  lnViolated(): number {
    return this.#outside > 0 ? NaN : this.#law.lnOn(this.#bad);
  }

  bounds(): Bounds {
    if (this.#outside > 0) return noBounds;
    const bounds = this.#law.bounds();
    return { estimate: bounds.estimate, bound: bounds[this.#good], opposite: bounds[this.#bad] };
  }

  margin(): Margin {
    const { bound } = this.bounds();
    if (bound === undefined) return {};
    return { clearance: this.#good === 'above' ? bound - this.#promise.line : this.#promise.line - bound };
  }

  snapshot(): MeanRunSnapshot {
    return { law: this.#law.snapshot(), outside: this.#outside };
  }

  restore(from: MeanRunSnapshot): void {
    this.#law.restore(from.law as never);
    this.#outside = from.outside;
    this.#assessment = this.#assess();
  }

  #admit(value: number): void {
    const { range, line } = this.#promise;
    const possible = range ? value >= range.from && value <= range.to : Math.abs(value - line) <= farthestMeasurement;
    if (possible) this.#law.admit(value);
    else this.#outside += 1;
  }

  #assess(): Assessment {
    if (this.#outside > 0) return runAssessment('unknown', false, false);
    if (this.#law.isOn(this.#bad)) return runAssessment('violated', false, false);
    // Back from a violation: the opposite bound no longer stands beyond the line moved in.
    const back = !this.#law.stands(this.#bad, this.#backFromViolation);
    if (this.#law.isOn(this.#good)) return runAssessment('demonstrated', this.#law.stands(this.#good, this.#backFromCrossing), back);
    return runAssessment(this.#law.values < this.#law.least ? 'gathering' : 'undecided', false, back);
  }
}

function lawOf({ tail, window, ...guarantee }: Guarantee, { line, sigma, range }: MeanPromised, good: Side): MeanLaw {
  const { violationTail } = levelsOf({ tail, window, ...guarantee });
  const byGood = good === 'above' ? { above: tail, below: violationTail } : { above: violationTail, below: tail };
  const levels: MeanLevels = { line, tail: byGood, enough: { above: -Math.log(byGood.above), below: -Math.log(byGood.below) } };
  if (range) return new BoundedLaw(levels, range, good);
  if (!sigma) return new GaussianLaw(levels, unknownSigmaMixture(levels.enough[good]));
  const tightest = window.kind === 'units' ? window.units : usualValues;
  return new GaussianLaw(levels, knownSigmaMixture(sigma.value, tuningFor(tightest, sigma.value, Math.min(tail, 0.4) as typeof tail)));
}
