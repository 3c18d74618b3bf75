import type { Finding } from '../record/part.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { RecordIdentity, RecordRange } from '../window/record-identity.ts';
import { UnitWindow, type UnitWindowSnapshot } from '../window/unit-window.ts';
import { clusterWarnings } from './cluster-warnings.ts';
import { countBounds } from './count-bounds.ts';
import { countFigures } from './count-figures.ts';
import { countMargin } from './count-margin.ts';
import type { CountRule } from './count-rule.ts';
import { countedFinding } from './counted-finding.ts';
import type { Batch, Bounds, CorrectionFate, Evidence, WindowStrip } from './evidence.ts';
import type { Moment, RecordMoment } from './moment.ts';
import { firstAtOrAfter, tellsUnits, type Limit } from './nonconforming-places.ts';
import type { Weighing } from './weighing.ts';

export interface UnitEvidenceSettings {
  /** Units of the window; undefined for a growing one. */
  readonly size: number | undefined;
  /** Nonconforming units at most so far from the one before count as one event with it; undefined: each counts. */
  readonly gap: number | undefined;
  /** Judges measurements, where the quantity counts values beyond a limit. */
  readonly limit: Limit | undefined;
  /** Clusters are declared and allowed for: they need no warning. */
  readonly clustersDeclared?: boolean;
  /** Shows the share of conforming units instead of that of nonconforming ones. */
  readonly asYield: boolean;
}

export interface UnitEvidenceSnapshot {
  readonly position: number;
  readonly window: UnitWindowSnapshot;
}

/**
 * Evidence on a fraction of units: verdicts, tallies, or measurements judged by a limit, in a window of the last N
 * units or a growing one. A run of conforming units costs one step but where a count changes inside it.
 */
export class UnitEvidence implements Evidence {
  readonly window: UnitWindow;
  readonly #settings: UnitEvidenceSettings;
  readonly #weighing: Weighing;
  #rule: CountRule;
  #position = 0;
  #clustersAt = '';
  #clusterWarnings: readonly string[] = [];
  /** Position before which, with conforming units only, nothing can change. */
  #wakeAt = 0;

  constructor(settings: UnitEvidenceSettings, rule: CountRule, weighing: Weighing) {
    this.#settings = settings;
    this.#rule = rule;
    this.#weighing = weighing;
    this.window = new UnitWindow({ ...(settings.size !== undefined && { size: settings.size }), ...(settings.gap !== undefined && { gap: settings.gap }) });
  }

  get position(): number {
    return this.#position;
  }

  /** Whether the window may call a violation: full, or growing with no size of its own. */
  get ripe(): boolean {
    return this.window.size === undefined || this.window.full;
  }

  /** Judges by another rule from the next weighing on: a lot of another size, say. */
  useRule(rule: CountRule): void {
    this.#rule = rule;
    this.#wakeAt = 0;
  }

  take(batch: Batch, moment: RecordMoment): void {
    const { part, from, to, places, source, firstSequence } = batch;
    if (!tellsUnits(part, this.#settings.limit)) return;
    if (part.kind === 'tallies') {
      for (let place = from; place < to; place += 1) {
        const inspected = part.inspected[place] as number;
        const nonconforming = part.nonconforming[place] as number;
        moment.place = place;
        this.window.admitRun(source, firstSequence + place, 1, inspected);
        this.#conforming(inspected - nonconforming, moment, undefined);
        for (let unit = 0; unit < nonconforming; unit += 1) this.#nonconforming(moment);
      }
      return;
    }
    this.window.admitRun(source, firstSequence + from, to - from);
    let done = from;
    for (let row = firstAtOrAfter(places, from); row < places.length; row += 1) {
      const place = places[row] as number;
      if (place >= to) break;
      if (place > done) this.#conforming(place - done, moment, done);
      moment.place = place;
      this.#nonconforming(moment);
      done = place + 1;
    }
    if (to > done) this.#conforming(to - done, moment, done);
    moment.place = to - 1;
  }

  fill(batch: Batch, moment: RecordMoment): void {
    const { part, from, to, places, source, firstSequence } = batch;
    if (!tellsUnits(part, this.#settings.limit)) return;
    if (part.kind === 'tallies') {
      for (let place = from; place < to; place += 1) {
        const unitsPerRecord = part.inspected[place] as number;
        const nonconforming = part.nonconforming[place] as number;
        const last = Array.from({ length: nonconforming }, (_, unit) => unitsPerRecord - nonconforming + unit);
        this.window.insertLate({ source, sequence: firstSequence + place, records: 1, unitsPerRecord, places: last });
      }
    } else {
      const within = Array.from(places.subarray(firstAtOrAfter(places, from), firstAtOrAfter(places, to)), (place) => place - from);
      this.window.insertLate({ source, sequence: firstSequence + from, records: to - from, unitsPerRecord: 1, places: within });
    }
    moment.place = to - 1;
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
    this.#weighing.beginAnew();
    this.weigh(moment);
  }

  moveClock(): void {
    // Units leave this window by number, not by age.
  }

  nextDue(): number {
    return Infinity;
  }

  weigh(moment: Moment): void {
    const { inspected, events } = this.window;
    this.#weighing.weigh(this.#rule.judge.assess(inspected, events, this.ripe, this.#weighing.waiting), this.#position, moment);
    this.#wakeAt = this.#nextWake(inspected, events);
  }

  figures(): Readonly<Record<string, number>> {
    const { inspected, nonconforming, events, size } = this.window;
    const figures = countFigures(this.#rule, inspected, nonconforming, size);
    return this.#settings.gap === undefined ? figures : { ...figures, events };
  }

  ranges(): readonly RecordRange[] {
    return this.window.ranges();
  }

  bounds(): Bounds {
    return countBounds(this.#rule, this.window.inspected, this.window.events, this.#settings.asYield);
  }

  margin(): Margin {
    const { inspected, events, size } = this.window;
    return countMargin(this.#rule.thresholds, inspected, events, () => this.#conformingNeeded(inspected, size ?? Infinity));
  }

  warnings(): readonly string[] {
    const doubt = this.#rule.doubt?.(this.window.inspected, this.window.events);
    return [...(doubt === undefined ? [] : [doubt]), ...(this.#settings.clustersDeclared ? [] : this.#clusters())];
  }

  /** Looked at anew where a nonconforming unit came, left or was corrected: a screen asks ten times a second. */
  #clusters(): readonly string[] {
    const [newest] = this.window.newestNonconforming(1);
    const stands = `${this.window.nonconforming} ${this.#position - (newest?.ago ?? 0)}`;
    if (this.#clustersAt !== stands) [this.#clustersAt, this.#clusterWarnings] = [stands, clusterWarnings(this.window)];
    return this.#clusterWarnings;
  }

  strip(most: number): WindowStrip {
    const { inspected, nonconforming, size } = this.window;
    return { units: inspected, full: size, nonconforming: this.window.newestNonconforming(most), count: nonconforming };
  }

  snapshot(): UnitEvidenceSnapshot {
    return { position: this.#position, window: this.window.snapshot() };
  }

  restore(from: UnitEvidenceSnapshot): void {
    this.#position = from.position;
    this.window.restore(from.window);
    this.#wakeAt = this.#nextWake(this.window.inspected, this.window.events);
  }

  /** Conforming units in a row until demonstrated: by growing, and by old nonconforming units leaving. */
  #conformingNeeded(inspected: number, size: number): number {
    const { nonconforming } = this.window;
    let { events } = this.window;
    for (let leaving = 0; leaving <= nonconforming; leaving += 1) {
      if (leaving > 0 && !this.window.nextIsNear(leaving)) events -= 1;
      const needed = this.#rule.thresholds.sizeToDemonstrate(events);
      const departed = leaving === 0 ? 0 : this.window.departureOf(leaving);
      if (needed > size) continue;
      const wait = Math.max(departed, needed - Math.min(size, inspected));
      const relief = this.window.departureOf(leaving + 1);
      if (wait < relief || leaving === nonconforming) return wait;
    }
    return Infinity;
  }

  /**
   * Admits conforming units and stops wherever something can change. `from` is the place of the first one, to be
   * moved along; undefined where they belong to the one record the moment stands on.
   */
  #conforming(units: number, moment: RecordMoment, from: number | undefined): void {
    let left = units;
    let place = from;
    while (left > 0) {
      const step = Math.min(left, Math.max(1, this.#wakeAt - this.#position));
      this.window.admitConforming(step);
      this.#position += step;
      left -= step;
      if (place !== undefined) {
        place += step;
        moment.place = place - 1;
      }
      if (this.#position >= this.#wakeAt) this.weigh(moment);
    }
  }

  #nonconforming(moment: RecordMoment): void {
    this.window.admitNonconforming();
    this.#position += 1;
    this.weigh(moment);
  }

  #nextWake(inspected: number, events: number): number {
    let wait = this.window.nextDeparture();
    if (!this.window.full) {
      const size = this.window.size ?? Infinity;
      const grown = this.#rule.judge.nextSize(inspected, events);
      wait = Math.min(wait, Math.min(grown, size) - inspected);
    }
    return Math.min(this.#position + Math.max(1, wait), this.#weighing.dueAt(this.#position));
  }
}
