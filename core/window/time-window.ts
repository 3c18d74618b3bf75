import { joinedRanges, type RecordIdentity, type RecordRange } from './record-identity.ts';
import { SourceFloors, type SourceFloorsSnapshot } from './source-floors.ts';
import { StepTally, type StepTallySnapshot } from './step-tally.ts';
import { wholeSteps, type TimeSpan } from './time-steps.ts';
import { defaultReach, type CorrectedCount } from './unit-window.ts';

export interface TimeWindowSettings extends TimeSpan {
  /** Rows kept to find records again, whole, 1 or more; beyond, the oldest step's records stay counted but are no longer found. */
  readonly reach?: number;
}

/** A record with nonconforming units in a time window, for the strip. */
export interface MarkedInTime {
  /** Start of the step it was inspected in, ms. */
  readonly stepAt: number;
  readonly record: RecordIdentity;
  readonly nonconforming: number;
}

/** Plain copy of a time window; steps oldest first. */
export interface TimeWindowSnapshot {
  readonly present: number;
  readonly steps: ReadonlyArray<{ readonly step: number; readonly tally: StepTallySnapshot }>;
  readonly floors: SourceFloorsSnapshot;
}

/**
 * Verdicts and tallies of the last span of time, by time of inspection: the span's whole steps and the present one.
 * The present step is that of the newest time told, by a record or by `advance`; it never goes back. A record that
 * comes late counts in its own step while that is inside, else not at all.
 */
export class TimeWindow {
  readonly stepMs: number;
  readonly #whole: number;
  readonly #reach: number;
  /** Step s at place s modulo the length; undefined where nothing was inspected. */
  readonly #steps: (StepTally | undefined)[];
  readonly #floors = new SourceFloors();
  #present = 0;
  #inspected = 0;
  #nonconforming = 0;
  #rows = 0;

  /** @throws RangeError for a span that is no multiple of its step, or too many steps */
  constructor(settings: TimeWindowSettings) {
    this.stepMs = settings.stepMs;
    this.#whole = wholeSteps(settings);
    this.#reach = settings.reach ?? defaultReach;
    this.#steps = Array.from({ length: this.#whole + 1 }, () => undefined);
  }

  /** Units in the window. */
  get inspected(): number {
    return this.#inspected;
  }

  /** Nonconforming units in the window. */
  get nonconforming(): number {
    return this.#nonconforming;
  }

  /** Start of the oldest step covered, ms. */
  get since(): number {
    return (this.#present - this.#whole) * this.stepMs;
  }

  /** Moves the window on to the step of the time `to` (ms); steps that leave are dropped. */
  advance(to: number): void {
    const step = Math.floor(to / this.stepMs);
    if (!(step > this.#present)) return;
    for (let entering = Math.max(this.#present + 1, step - this.#whole); entering <= step; entering += 1) this.#drop(entering);
    this.#present = step;
  }

  /**
   * Admits records inspected in one step, all of whose units conform.
   *
   * @param at time of inspection of any of them, ms; the window moves on to it
   * @returns whether they count: false if their step has left, or they come from before the last clear
   */
  admitConforming(at: number, source: number, firstSequence: number, records: number, unitsPerRecord = 1): boolean {
    return this.#admit(at, source, firstSequence, records, unitsPerRecord, 0);
  }

  /** Admits one record with nonconforming units, 1 to inspected; as `admitConforming`. */
  admitNonconforming(at: number, source: number, sequence: number, nonconforming = 1, inspected = 1): boolean {
    return this.#admit(at, source, sequence, 1, inspected, nonconforming);
  }

  /** Time (ms) at which the `d`-th oldest nonconforming unit (d 1 or more) leaves; Infinity if there are fewer. */
  departureOf(d: number): number {
    let seen = 0;
    for (const [step, tally] of this.#covered()) {
      seen += tally.nonconforming;
      if (seen >= d) return (step + this.#whole + 1) * this.stepMs;
    }
    return Infinity;
  }

  /**
   * Puts a re-inspected record right in its own step.
   *
   * @param nonconforming nonconforming units it has now, 0 to its units
   * @param inspected     units it has now, if that changed; 1 or more
   * @returns its nonconforming units before and now; 'not here' if its step has left or its records were forgotten
   */
  correct(source: number, sequence: number, nonconforming: number, inspected?: number): CorrectedCount | 'not here' {
    for (const [, tally] of this.#covered()) {
      const units = tally.unitsOf(source, sequence);
      if (units === undefined) continue;
      const now = inspected ?? units;
      if (!(nonconforming >= 0 && nonconforming <= now)) {
        throw new RangeError(`nonconforming must be 0 to ${now} for the corrected record, not ${nonconforming}`);
      }
      this.#count(tally, -1);
      const before = tally.correct(source, sequence, nonconforming, now);
      this.#count(tally, 1);
      this.#forget();
      return { before, after: nonconforming };
    }
    return 'not here';
  }

  /** The records with nonconforming units, newest step first, at most `most`. */
  newestNonconforming(most: number): MarkedInTime[] {
    const found: MarkedInTime[] = [];
    for (const [step, tally] of [...this.#covered()].reverse()) {
      for (const { source, sequence, nonconforming } of tally.marked().reverse()) {
        if (found.length >= most) return found;
        found.push({ stepAt: step * this.stepMs, record: { source, sequence }, nonconforming });
      }
    }
    return found;
  }

  /** What was inspected in each step of the window that held anything, in no order. */
  steps(): { readonly inspected: number; readonly nonconforming: number }[] {
    return this.#steps.flatMap((step) => (step === undefined || step.inspected === 0 ? [] : [{ inspected: step.inspected, nonconforming: step.nonconforming }]));
  }

  /**
   * What was inspected over the window in equal parts of whole steps, oldest first.
   *
   * @param most parts, 1 or more
   */
  parts(most: number): { readonly from: number; readonly stepMs: number; readonly inspected: readonly number[]; readonly nonconforming: readonly number[] } {
    const stepsEach = Math.ceil((this.#whole + 1) / most);
    const count = Math.ceil((this.#whole + 1) / stepsEach);
    const first = this.#present + 1 - count * stepsEach;
    const inspected = new Array<number>(count).fill(0);
    const nonconforming = new Array<number>(count).fill(0);
    for (const [step, tally] of this.#covered()) {
      const part = Math.floor((step - first) / stepsEach);
      inspected[part] = (inspected[part] ?? 0) + tally.inspected;
      nonconforming[part] = (nonconforming[part] ?? 0) + tally.nonconforming;
    }
    return { from: first * this.stepMs, stepMs: stepsEach * this.stepMs, inspected, nonconforming };
  }

  /** Records in the window, as far as they are indexed, source by source. */
  ranges(): RecordRange[] {
    const ranges = [...this.#covered()].flatMap(([, tally]) => tally.ranges());
    return joinedRanges(ranges.sort((a, b) => a.source - b.source || a.first - b.first));
  }

  /** Restarts the window. @param seen highest sequence seen of each source, marks included */
  clear(seen: Iterable<readonly [source: number, sequence: number]> = []): void {
    this.#floors.raise(seen);
    this.#steps.fill(undefined);
    this.#inspected = 0;
    this.#nonconforming = 0;
    this.#rows = 0;
  }

  snapshot(): TimeWindowSnapshot {
    const steps = [...this.#covered()].map(([step, tally]) => ({ step, tally: tally.snapshot() }));
    return { present: this.#present, steps, floors: this.#floors.snapshot() };
  }

  /** Takes over a snapshot of a window with the same step; steps outside this span leave. */
  restore(snapshot: TimeWindowSnapshot): void {
    this.clear();
    this.#present = snapshot.present;
    this.#floors.restore(snapshot.floors);
    for (const { step, tally: stored } of snapshot.steps) {
      if (step < this.#present - this.#whole) continue;
      const tally = new StepTally();
      tally.restore(stored);
      this.#steps[step % this.#steps.length] = tally;
      this.#count(tally, 1);
    }
    this.#forget();
  }

  #admit(at: number, source: number, first: number, records: number, unitsPerRecord: number, nonconforming: number): boolean {
    this.advance(at);
    const step = Math.floor(at / this.stepMs);
    if (!(step >= this.#present - this.#whole) || this.#floors.covers(source, first)) return false;
    this.#floors.note(source, first + records - 1);
    const place = step % this.#steps.length;
    const tally = (this.#steps[place] ??= new StepTally());
    this.#count(tally, -1);
    tally.admit(source, first, records, unitsPerRecord, nonconforming);
    this.#count(tally, 1);
    this.#forget();
    return true;
  }

  /** Steps with units, oldest first. */
  *#covered(): Generator<[step: number, tally: StepTally]> {
    for (let step = Math.max(0, this.#present - this.#whole); step <= this.#present; step += 1) {
      const tally = this.#steps[step % this.#steps.length];
      if (tally !== undefined) yield [step, tally];
    }
  }

  #drop(step: number): void {
    const place = step % this.#steps.length;
    const tally = this.#steps[place];
    if (tally === undefined) return;
    this.#count(tally, -1);
    this.#steps[place] = undefined;
  }

  #count(tally: StepTally, sign: 1 | -1): void {
    this.#inspected += sign * tally.inspected;
    this.#nonconforming += sign * tally.nonconforming;
    this.#rows += sign * tally.rows;
  }

  #forget(): void {
    if (this.#rows <= this.#reach) return;
    for (const [, tally] of this.#covered()) {
      this.#rows -= tally.rows;
      tally.forgetRecords();
      if (this.#rows <= this.#reach) return;
    }
  }
}
