import { measuredRecords } from '../evidence/record-columns.ts';
import { admitMean, clearMeanAlarm, meanDetectorGauge, newMeanDetector, type MeanDetectorState, type MeanDetectorTuning } from '../sequential/mean-detector.ts';
import type { ChangeFigures, ChangeWatch } from './change-watch.ts';
import type { Batch } from '../evidence/evidence.ts';

interface MeanWatchSnapshot {
  readonly detector: MeanDetectorState;
  readonly held: MeanDetectorState | undefined;
  readonly seen: number;
}

/** A detector of a mean that has become worse; as `CountWatch`, one step a value. Values that cannot be say nothing to it. */
export class MeanWatch implements ChangeWatch {
  readonly #tuning: MeanDetectorTuning;
  readonly #endless: MeanDetectorTuning;
  readonly #fresh: MeanDetectorState;
  #detector: MeanDetectorState;
  #held: MeanDetectorState | undefined;
  #seen = 0;
  #spent = false;

  constructor(tuning: MeanDetectorTuning) {
    this.#tuning = tuning;
    this.#endless = { ...tuning, threshold: Infinity };
    this.#fresh = newMeanDetector(tuning);
    this.#detector = this.#fresh;
  }

  get alarmed(): boolean {
    return this.#held !== undefined;
  }

  get alarms(): number {
    return this.#detector.alarms;
  }

  take({ part, to }: Batch, from: number): number {
    const columns = measuredRecords.columns(part, from, to);
    if (columns === undefined) return to;
    for (let place = from; place < to; place += 1) if (this.#value(columns.a[place - from] as number)) return place + 1;
    return to;
  }

  figures(): ChangeFigures {
    return { seen: this.#seen, found: undefined };
  }

  gauge(): number {
    return meanDetectorGauge(this.#held ?? this.#detector, this.#tuning);
  }

  inARowToAlarm(): undefined {
    return undefined;
  }

  conformingToHalfWay(): undefined {
    return undefined;
  }

  toReturn(): undefined {
    return undefined;
  }

  beginAnew(): void {
    this.#detector = { ...this.#fresh, alarms: this.#detector.alarms };
    this.#held = undefined;
    this.#seen = 0;
    this.#spent = false;
  }

  snapshot(): MeanWatchSnapshot {
    return { detector: this.#detector, held: this.#held, seen: this.#spent ? 0 : this.#seen };
  }

  restore({ detector, held, seen }: MeanWatchSnapshot): void {
    this.#detector = detector;
    this.#held = held;
    this.#seen = seen;
    this.#spent = false;
  }

  /** @returns whether the alarm was raised or returned */
  #value(value: number): boolean {
    if (!this.#isPossible(value)) return false;
    this.#seen = this.#spent ? 1 : this.#seen + 1;
    this.#spent = false;
    const before = this.#detector;
    this.#detector = admitMean(before, value, this.#tuning);
    if (this.#held !== undefined) return this.#heldOn(this.#held, value);
    if (this.#detector.alarms === before.alarms) return false;
    this.#held = this.#atMost(admitMean(before, value, this.#endless));
    this.#spent = true;
    return true;
  }

  #heldOn(held: MeanDetectorState, value: number): boolean {
    this.#held = this.#atMost(admitMean(held, value, this.#endless));
    if (meanDetectorGauge(this.#held, this.#tuning) > 0.5) return false;
    this.#held = undefined;
    this.#detector = clearMeanAlarm(this.#detector);
    return true;
  }

  #atMost(state: MeanDetectorState): MeanDetectorState {
    const level = state.levels.reduce((sum, one) => sum + one, 0) / state.levels.length;
    const { threshold } = this.#tuning;
    return level <= threshold ? state : { ...state, levels: state.levels.map((one) => (level === Infinity ? threshold : one * (threshold / level))) };
  }

  #isPossible(value: number): boolean {
    const { model } = this.#tuning;
    return model.kind === 'bounded' ? value >= model.from && value <= model.to : Number.isFinite(value);
  }
}
