import { firstAtOrAfter, tellsUnits, type Limit } from '../evidence/nonconforming-places.ts';
import type { CusumState } from '../sequential/cusum.ts';
import type { DetectorState } from '../sequential/change-detector.ts';
import type { ChangeFigures, ChangeWatch } from './change-watch.ts';
import type { DetectorArithmetic } from './detector-arithmetic.ts';
import type { Batch } from '../evidence/evidence.ts';

/** Units without a nonconforming one that would speak for the baseline at 95 %, times the baseline. */
const usualDistances = 3;

type State = DetectorState | CusumState;

interface CountWatchSnapshot<S> {
  readonly detector: S;
  readonly held: S | undefined;
  readonly seen: number;
  readonly found: number;
  readonly records: number;
  readonly left: number;
  readonly calmLeft: number;
}

/**
 * A detector of a risen fraction or rate on the record path. At its alarm the detector begins anew; beside it the level
 * that raised the alarm goes on, at the threshold at most, and the alarm returns when that is back at half way and three
 * times the usual distance between nonconforming units has passed: one good minute is no return.
 */
export class CountWatch<S extends State> implements ChangeWatch {
  readonly #by: DetectorArithmetic<S>;
  readonly #limit: Limit | undefined;
  /** Whether each record is one exposure, not units. */
  readonly #exposures: boolean;
  /** Units or exposure that must pass between an alarm and its return. */
  readonly #calm: number;
  #detector: S;
  #held: S | undefined;
  /** Conforming units until the alarm returns. */
  #left = Infinity;
  #calmLeft = 0;
  #seen = 0;
  #found = 0;
  #records = 0;
  /** The figures are those of an alarm raised by the newest record: the next one begins anew. */
  #spent = false;

  /** @param baseline nonconforming units per unit, or nonconformities per unit of exposure */
  constructor(by: DetectorArithmetic<S>, baseline: number, limit: Limit | undefined, exposures: boolean) {
    this.#by = by;
    this.#limit = limit;
    this.#exposures = exposures;
    this.#calm = usualDistances / baseline;
    this.#detector = by.fresh;
  }

  get alarmed(): boolean {
    return this.#held !== undefined;
  }

  get alarms(): number {
    return this.#detector.alarms;
  }

  take(batch: Batch, from: number): number {
    const { part, to } = batch;
    if (part.kind === 'exposures' && this.#exposures) {
      for (let place = from; place < to; place += 1) if (this.#record(part.count[place] as number, part.exposure[place] as number)) return place + 1;
      return to;
    }
    if (part.kind === 'tallies') {
      for (let place = from; place < to; place += 1) if (this.#record(part.nonconforming[place] as number, part.inspected[place] as number)) return place + 1;
      return to;
    }
    return tellsUnits(part, this.#limit) ? this.#units(batch, from) : to;
  }

  figures(): ChangeFigures {
    return { seen: this.#seen, found: this.#found };
  }

  gauge(): number {
    return this.#by.gauge(this.#held ?? this.#detector);
  }

  inARowToAlarm(): number | undefined {
    const each = this.#records === 0 ? 1 : this.#seen / this.#records;
    const inARow = this.#by.inARow(this.#detector, this.#exposures ? each : 1);
    return Number.isFinite(inARow) ? inARow : undefined;
  }

  conformingToHalfWay(): number | undefined {
    const units = this.#by.toHalfWay(this.#held ?? this.#detector);
    return Number.isFinite(units) ? units : undefined;
  }

  toReturn(): number | undefined {
    return this.#held === undefined || !Number.isFinite(this.#left) ? undefined : Math.max(0, this.#left);
  }

  beginAnew(): void {
    this.#detector = { ...this.#by.fresh, alarms: this.#detector.alarms };
    this.#held = undefined;
    this.#left = Infinity;
    this.#calmLeft = 0;
    [this.#seen, this.#found, this.#records] = [0, 0, 0];
    this.#spent = false;
  }

  snapshot(): CountWatchSnapshot<S> {
    const [seen, found, records] = this.#spent ? [0, 0, 0] : [this.#seen, this.#found, this.#records];
    return { detector: this.#detector, held: this.#held, seen, found, records, left: this.#left, calmLeft: this.#calmLeft };
  }

  restore(from: CountWatchSnapshot<S>): void {
    this.#detector = from.detector;
    this.#held = from.held;
    this.#left = from.left;
    this.#calmLeft = from.calmLeft;
    [this.#seen, this.#found, this.#records] = [from.seen, from.found, from.records];
    this.#spent = false;
  }

  /** Single units: runs of conforming ones in one step. */
  #units({ places, to }: Batch, from: number): number {
    let row = firstAtOrAfter(places, from);
    for (let place = from; place < to; row += 1) {
      const found = Math.min(to, places[row] ?? to);
      if (found > place) {
        const before = this.#held;
        place += this.#conforming(found - place);
        if (before !== undefined && this.#held === undefined) return place;
      }
      if (found === to) return to;
      place = found + 1;
      if (this.#strike(1, 1)) return place;
    }
    return to;
  }

  /** @returns how many were taken: all, or up to the one at which the alarm returned */
  #conforming(units: number): number {
    const held = this.#held;
    const step = Math.min(units, Math.max(1, this.#left));
    this.#note(step, 0, step);
    this.#detector = this.#by.quiet(this.#detector, step, 1);
    if (held === undefined) return step;
    this.#held = this.#by.quiet(held, step, 1);
    this.#left -= step;
    this.#calmLeft -= step;
    if (this.#left <= 0) this.#return();
    return step;
  }

  /** @returns whether the alarm was raised or returned */
  #record(found: number, weight: number): boolean {
    if (found > 0) return this.#strike(found, weight);
    this.#note(weight, 0, 1);
    this.#detector = this.#by.quiet(this.#detector, 1, weight);
    if (this.#held === undefined) return false;
    this.#held = this.#by.quiet(this.#held, 1, weight);
    this.#calmLeft -= weight;
    return this.#returnIfBack();
  }

  #strike(found: number, weight: number): boolean {
    this.#note(weight, found, 1);
    const before = this.#detector;
    this.#detector = this.#by.found(before, found, weight);
    if (this.#held !== undefined) {
      this.#held = this.#by.held(this.#held, found, weight);
      this.#calmLeft -= weight;
      return this.#returnIfBack();
    }
    if (this.#detector.alarms === before.alarms) return false;
    this.#held = this.#by.held(before, found, weight);
    this.#calmLeft = this.#calm;
    this.#left = this.#toReturn(this.#held);
    this.#spent = true;
    return true;
  }

  #returnIfBack(): boolean {
    this.#left = this.#held === undefined ? Infinity : this.#toReturn(this.#held);
    if (!(this.#left <= 0)) return false;
    this.#return();
    return true;
  }

  #toReturn(held: S): number {
    return Math.max(this.#by.toHalfWay(held), Math.ceil(this.#calmLeft));
  }

  #return(): void {
    this.#held = undefined;
    this.#left = Infinity;
    this.#detector = this.#by.cleared(this.#detector);
  }

  #note(seen: number, found: number, records: number): void {
    if (this.#spent) {
      [this.#seen, this.#found, this.#records] = [0, 0, 0];
      this.#spent = false;
    }
    this.#seen += seen;
    this.#found += found;
    this.#records += records;
  }
}
