import type { Finding } from '../record/part.ts';
import { timeAt } from '../record/time-column.ts';
import type { EpochMs } from '../units.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { Picture } from '../view/history.ts';
import type { RecordIdentity, RecordRange } from '../window/record-identity.ts';
import { endOfStep, type TimeSpan } from '../window/time-steps.ts';
import { TimeWindow, type TimeWindowSnapshot } from '../window/time-window.ts';
import { stepWarnings } from './cluster-warnings.ts';
import { countBounds } from './count-bounds.ts';
import { countFigures } from './count-figures.ts';
import { countMargin } from './count-margin.ts';
import type { CountRule } from './count-rule.ts';
import { countedFinding } from './counted-finding.ts';
import type { Batch, Bounds, CorrectionFate, Evidence } from './evidence.ts';
import { clockMoment, type Moment, type RecordMoment } from './moment.ts';
import { firstAtOrAfter, tellsUnits, type Limit } from './nonconforming-places.ts';
import { SpanCover } from './span-cover.ts';
import type { Weighing } from './weighing.ts';

export interface TimedUnitSettings {
  readonly span: TimeSpan;
  /** Judges measurements, where the quantity counts values beyond a limit. */
  readonly limit: Limit | undefined;
  /** Clusters are declared and allowed for: they need no warning. */
  readonly clustersDeclared?: boolean;
  /** Shows the share of conforming units instead of that of nonconforming ones. */
  readonly asYield: boolean;
}

export interface TimedUnitSnapshot {
  readonly position: number;
  readonly began: number;
  readonly window: TimeWindowSnapshot;
}

/** Parts of the window that are drawn at most. */
const mostParts = 120;

/**
 * Evidence on a fraction of units in a window of the last span of time. Steps leave at the moment they are over, by the
 * clock or by a record of a later step, whichever comes first: the decision is the same and bears that moment.
 */
export class TimedUnitEvidence implements Evidence {
  readonly window: TimeWindow;
  readonly #settings: TimedUnitSettings;
  readonly #weighing: Weighing;
  readonly #rule: CountRule;
  readonly #cover: SpanCover;
  #position = 0;
  /** At which count and step the warnings were looked for last. */
  #clustersAt = '';
  #clusterWarnings: readonly string[] = [];
  /** Position before which, with conforming units only and no step leaving, nothing can change. */
  #wakeAt = 0;

  constructor(settings: TimedUnitSettings, rule: CountRule, weighing: Weighing) {
    this.#settings = settings;
    this.#rule = rule;
    this.#weighing = weighing;
    this.#cover = new SpanCover(settings.span);
    this.window = new TimeWindow(settings.span);
  }

  get position(): number {
    return this.#position;
  }

  /** Whether the window may call a violation. */
  get ripe(): boolean {
    return this.#cover.full(this.window.since);
  }

  take(batch: Batch, moment: RecordMoment): void {
    const { part, from, to } = batch;
    if (!tellsUnits(part, this.#settings.limit)) return;
    for (let place = from; place < to; ) {
      const end = part.kind === 'tallies' ? place + 1 : Math.min(to, endOfStep(part.time, place, part.records, this.window.stepMs));
      this.#weighing.moveFirst?.(timeAt(part.time, place));
      this.#leaveUntil(timeAt(part.time, place));
      this.#takeInStep({ ...batch, from: place, to: end }, moment);
      place = end;
    }
  }

  fill(batch: Batch, moment: RecordMoment): void {
    this.take(batch, moment);
    this.weigh(moment);
  }

  correct(identity: RecordIdentity, _station: number, finding: Finding, moment: Moment): CorrectionFate {
    const found = countedFinding(finding, this.#settings.limit);
    if (found === undefined) return 'another kind';
    const change = this.window.correct(identity.source, identity.sequence, found.nonconforming, found.inspected);
    if (change === 'not here') return 'not here';
    this.weigh(moment);
    return 'corrected';
  }

  clear(moment: Moment): void {
    this.window.clear();
    this.#cover.clear();
    this.#weighing.beginAnew();
    this.weigh(moment);
  }

  moveClock(moment: Moment): void {
    this.#leaveUntil(moment.at);
  }

  nextDue(): number {
    return this.window.inspected === 0 ? Infinity : this.#cover.stepAfter(this.window.since);
  }

  weigh(moment: Moment): void {
    const { inspected, nonconforming } = this.window;
    const { judge } = this.#rule;
    this.#weighing.weigh(judge.assess(inspected, nonconforming, this.ripe, this.#weighing.waiting), this.#position, moment);
    this.#wakeAt = this.#nextWake();
  }

  figures(): Readonly<Record<string, number>> {
    return countFigures(this.#rule, this.window.inspected, this.window.nonconforming);
  }

  picture(): Picture {
    return this.window.inspected === 0 ? { kind: 'none' } : { kind: 'steps', ...this.window.parts(mostParts) };
  }

  ranges(): readonly RecordRange[] {
    return this.window.ranges();
  }

  bounds(): Bounds {
    return countBounds(this.#rule, this.window.inspected, this.window.nonconforming, this.#settings.asYield);
  }

  margin(): Margin {
    const { inspected, nonconforming } = this.window;
    const { thresholds } = this.#rule;
    return countMargin(thresholds, inspected, nonconforming, () => thresholds.sizeToDemonstrate(nonconforming) - inspected);
  }

  warnings(): readonly string[] {
    const { inspected, nonconforming, since } = this.window;
    const doubt = this.#rule.doubt?.(inspected, nonconforming);
    if (this.#settings.clustersDeclared === true) return doubt === undefined ? [] : [doubt];
    const stands = `${nonconforming} ${since}`;
    if (this.#clustersAt !== stands) [this.#clustersAt, this.#clusterWarnings] = [stands, stepWarnings(this.window)];
    return doubt === undefined ? this.#clusterWarnings : [doubt, ...this.#clusterWarnings];
  }

  snapshot(): TimedUnitSnapshot {
    return { position: this.#position, began: this.#cover.began, window: this.window.snapshot() };
  }

  restore(from: TimedUnitSnapshot): void {
    this.#position = from.position;
    this.#cover.began = from.began;
    this.window.restore(from.window);
    this.#wakeAt = this.#nextWake();
  }

  #nextWake(): number {
    const { inspected, nonconforming } = this.window;
    const wait = Math.max(1, this.#rule.judge.nextSize(inspected, nonconforming) - inspected);
    return Math.min(this.#position + wait, this.#weighing.dueAt(this.#position));
  }

  /** Lets every step go that is over by `at`, each at its own moment; weighs after each. */
  #leaveUntil(at: number): void {
    for (let due = this.nextDue(); due <= at; due = this.nextDue()) {
      this.window.advance(due);
      if (this.window.inspected === 0) this.#cover.clear();
      this.weigh(clockMoment(due as EpochMs));
    }
    this.window.advance(at);
  }

  /** Records of one step: `from` to `to` of one part, verdicts or measurements, or one tally. */
  #takeInStep(batch: Batch, moment: RecordMoment): void {
    const { part, from, to, places, source, firstSequence } = batch;
    const at = timeAt(part.time, from);
    if (part.kind === 'tallies') {
      const [inspected, nonconforming] = [part.inspected[from] as number, part.nonconforming[from] as number];
      moment.place = from;
      if (nonconforming > 0) this.#admit(at, this.window.admitNonconforming(at, source, firstSequence + from, nonconforming, inspected), inspected, moment);
      else this.#admit(at, this.window.admitConforming(at, source, firstSequence + from, 1, inspected), inspected, moment);
      return;
    }
    let done = from;
    for (let row = firstAtOrAfter(places, from); row < places.length; row += 1) {
      const place = places[row] as number;
      if (place >= to) break;
      this.#conforming(batch, at, done, place, moment);
      moment.place = place;
      this.#admit(at, this.window.admitNonconforming(at, source, firstSequence + place), 1, moment);
      done = place + 1;
    }
    this.#conforming(batch, at, done, to, moment);
    moment.place = to - 1;
  }

  /** Admits conforming records and stops wherever something can change. */
  #conforming({ source, firstSequence }: Batch, at: number, from: number, to: number, moment: RecordMoment): void {
    for (let place = from; place < to; ) {
      const step = Math.min(to - place, Math.max(1, this.#wakeAt - this.#position));
      const counts = this.window.admitConforming(at, source, firstSequence + place, step);
      place += step;
      moment.place = place - 1;
      if (!counts) continue;
      this.#cover.begin(at);
      this.#position += step;
      if (this.#position >= this.#wakeAt) this.weigh(moment);
    }
  }

  #admit(at: number, counts: boolean, units: number, moment: RecordMoment): void {
    if (!counts) return;
    this.#cover.begin(at);
    this.#position += units;
    this.weigh(moment);
  }
}
