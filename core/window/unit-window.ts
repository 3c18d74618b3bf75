import type { RecordIdentity, RecordRange } from './record-identity.ts';
import { RecordRuns, type RecordPlace, type RecordRunsSnapshot } from './record-runs.ts';
import { SlidingColumns } from './sliding-columns.ts';
import { SourceFloors, type SourceFloorsSnapshot } from './source-floors.ts';

/** Which units a unit window covers, and how far back it can correct. */
export interface UnitWindowSettings {
  /** The last `size` units, whole, 1 or more; undefined: all units since the last clear (lot, shift, run). */
  readonly size?: number;
  /**
   * Rows of the record index, and in a growing window nonconforming units, that stay correctable; 1 or more. Older
   * ones are still counted, but no longer found.
   */
  readonly reach?: number;
  /** Nonconforming units at most so many units after the one before are one event with it; whole, 1 or more. Absent: each is one. */
  readonly gap?: number;
}

/** How many nonconforming units of one record a window counted before and after its correction. */
export interface CorrectedCount {
  readonly before: number;
  readonly after: number;
}

/** Units a window took up from late records. */
export interface LateUnits {
  readonly inspected: number;
  readonly nonconforming: number;
}

/** Records that come after later ones of their source. */
export interface LateRun extends RecordIdentity {
  /** Records, 1 or more; `sequence` is the first one's. */
  readonly records: number;
  readonly unitsPerRecord: number;
  /** Nonconforming units, counted from the run's first unit as 0, strictly rising. */
  readonly places: ArrayLike<number>;
}

/** A nonconforming unit in the window, for the strip. */
export interface NonconformingUnit {
  /** Units inspected since: 0 is the newest unit. */
  readonly ago: number;
  /** undefined where the record is beyond reach. */
  readonly record: RecordIdentity | undefined;
}

/** Plain copy of a unit window. */
export interface UnitWindowSnapshot {
  readonly start: number;
  readonly next: number;
  readonly known: number;
  readonly forgotten: number;
  /** Of the forgotten ones, those that were one event with the next; absent in a window without a gap. */
  readonly forgottenNear?: number;
  readonly rolled: boolean;
  readonly places: Float64Array;
  readonly runs: RecordRunsSnapshot;
  readonly floors: SourceFloorsSnapshot;
}

/** Window rows that stay correctable where the settings do not say: 2 MiB of positions at most. */
export const defaultReach = 262_144;

/**
 * Verdicts and tallies of the last N units, or of all units since the last clear. Units stand on ordinals in the
 * order of acceptance; the window is ordinals start to next - 1. Only nonconforming units and runs of records cost
 * memory; conforming units cost nothing.
 *
 * Records are announced (`admitRun`), then their units are admitted one stretch after the other, so that a caller can
 * stop at each moment the count changes. A record's nonconforming units stand last among its units.
 */
export class UnitWindow {
  readonly size: number | undefined;
  readonly #limit: number;
  readonly #reach: number;
  readonly #gap: number;
  readonly #places = new SlidingColumns(1);
  readonly #runs: RecordRuns;
  readonly #floors = new SourceFloors();
  #start = 0;
  #next = 0;
  /** Records with a unit before this ordinal can no longer be corrected: positions there were forgotten. */
  #known = 0;
  /** Nonconforming units counted in the window whose positions were forgotten. */
  #forgotten = 0;
  /** Pairs of neighbouring nonconforming units that are one event: of those held, and of those forgotten with their next. */
  #near = 0;
  #forgottenNear = 0;
  /** Whether a unit has left since the last clear. */
  #rolled = false;

  /** @throws RangeError for a size, reach or gap that is not whole and 1 or more */
  constructor(settings: UnitWindowSettings = {}) {
    this.size = settings.size;
    this.#limit = wholeOrMore('size', settings.size ?? Infinity);
    this.#reach = wholeOrMore('reach', settings.reach ?? defaultReach);
    this.#gap = settings.gap === undefined ? 0 : wholeOrMore('gap', settings.gap);
    this.#runs = new RecordRuns(this.#reach);
  }

  /** Units in the window. */
  get inspected(): number {
    return this.#next - this.#start;
  }

  /** Nonconforming units in the window. */
  get nonconforming(): number {
    return this.#forgotten + this.#places.length;
  }

  /** Events in the window: nonconforming units, those within the gap of the one before not counted again. */
  get events(): number {
    return this.nonconforming - this.#near - this.#forgottenNear;
  }

  /** Whether the window holds its `size` units; a growing window is never full. */
  get full(): boolean {
    return this.inspected === this.#limit;
  }

  /** Bytes of all arrays. */
  get byteLength(): number {
    return this.#places.byteLength + this.#runs.byteLength;
  }

  /**
   * Announces records of one source whose units are admitted next, and before anything else.
   *
   * @param firstSequence above all earlier ones of the source
   * @param unitsPerRecord the same for all of them; 1 for verdicts
   */
  admitRun(source: number, firstSequence: number, records: number, unitsPerRecord = 1): void {
    this.#runs.announce(source, firstSequence, records, unitsPerRecord);
    this.#floors.note(source, firstSequence + records - 1);
  }

  /** Admits announced units that all conform; nonconforming ones may leave on the way (see `nextDeparture`). */
  admitConforming(units: number): void {
    this.#advance(units);
  }

  /** Admits one announced unit that does not conform. */
  admitNonconforming(): void {
    this.#places.push(this.#next);
    if (this.nextIsNear(this.#places.length - 1)) this.#near += 1;
    this.#advance(1);
    this.#forget();
  }

  /** Further units after which the oldest nonconforming unit has left, 1 or more; Infinity if none will leave. */
  nextDeparture(): number {
    return this.departureOf(1);
  }

  /** Further units after which the `d`-th oldest nonconforming unit (d 1 or more) has left; Infinity if none will. */
  departureOf(d: number): number {
    return d > this.#places.length ? Infinity : this.#places.get(0, d - 1) + this.#limit + 1 - this.#next;
  }

  /** Whether the `d`-th oldest nonconforming unit held (d 1 or more) and the one after it are one event. */
  nextIsNear(d: number): boolean {
    return this.#gap > 0 && d >= 1 && d < this.#places.length && this.#places.get(0, d) - this.#places.get(0, d - 1) <= this.#gap;
  }

  /**
   * Puts a re-inspected record right. If it now has another number of units, the units that left stay out, and the
   * window is short by the missing ones until new ones come.
   *
   * @param nonconforming nonconforming units the record has now, 0 to its units
   * @param inspected     units the record has now, if that changed; 1 or more
   * @returns its nonconforming units in the window before and now; 'not here' if the record is beyond the window or its reach
   */
  correct(source: number, sequence: number, nonconforming: number, inspected?: number): CorrectedCount | 'not here' {
    const place = this.#runs.find(source, sequence);
    if (place === undefined || place.end <= this.#start || place.end > this.#next || place.first < this.#known) return 'not here';
    const units = inspected ?? place.end - place.first;
    if (!(nonconforming >= 0 && nonconforming <= units)) {
      throw new RangeError(`nonconforming must be 0 to ${units} for the corrected record, not ${nonconforming}`);
    }
    const from = Math.max(place.first, this.#start);
    const row = this.#places.rowFrom(0, from);
    const before = this.#places.rowFrom(0, place.end) - row;
    this.#places.close(row, before);
    const end = Math.max(from, place.first + units);
    if (units !== place.end - place.first) this.#resize(place, row, sequence, units, end - place.end);
    const after = Math.min(nonconforming, end - from);
    this.#places.open(row, after);
    for (let k = 0; k < after; k += 1) this.#places.set(0, row + k, end - after + k);
    this.#recountNear();
    this.#depart();
    this.#forget();
    return { before, after: Math.min(after, end - Math.max(from, this.#start)) };
  }

  /**
   * Takes up records that fill a hole of their source: directly after the source's nearest lower sequence in the
   * window. If there is none, before everything, unless units have left since the last clear: then they are older than
   * the window and count nothing. Records from before the last clear count nothing either. Units that no longer fit
   * leave at the old end. None of the records may be in the window already.
   */
  insertLate(run: LateRun): LateUnits {
    const { source, sequence, records, unitsPerRecord, places } = run;
    if (this.#runs.end !== this.#next) throw new Error('late records come between announced records, not among them');
    const row = this.#runs.rowAfter(source, sequence) ?? (this.#rolled ? undefined : 0);
    if (row === undefined || this.#floors.covers(source, sequence)) return { inspected: 0, nonconforming: 0 };
    const units = records * unitsPerRecord;
    const at = this.#runs.insert(row, source, sequence, records, unitsPerRecord);
    const placeRow = this.#places.rowFrom(0, at);
    this.#places.shift(0, placeRow, units);
    this.#places.open(placeRow, places.length);
    for (let k = 0; k < places.length; k += 1) this.#places.set(0, placeRow + k, at + (places[k] as number));
    if (at < this.#known) this.#known += units;
    this.#next += units;
    this.#recountNear();
    this.#depart();
    const gone = Math.min(units, Math.max(0, this.#start - at));
    const nonconforming = Array.from(places).filter((place) => place >= gone).length;
    this.#forget();
    return { inspected: units - gone, nonconforming };
  }

  /** The newest nonconforming units, newest first, at most `most`. */
  newestNonconforming(most: number): NonconformingUnit[] {
    const held = this.#places.length;
    return Array.from({ length: Math.min(most, held) }, (_, k) => {
      const ordinal = this.#places.get(0, held - 1 - k);
      return { ago: this.#next - 1 - ordinal, record: this.#runs.identityAt(ordinal) };
    });
  }

  /** Records in the window, as far as they are indexed, source by source; a record counts while one of its units does. */
  ranges(): RecordRange[] {
    return this.#runs.ranges(this.#start, this.#next);
  }

  /**
   * Restarts the window: at a declared restart, a new lot, a new shift. All announced units must be admitted.
   *
   * @param seen highest sequence seen of each source, marks included; what the window itself saw is known to it
   */
  clear(seen: Iterable<readonly [source: number, sequence: number]> = []): void {
    if (this.#runs.end !== this.#next) throw new Error('a window is cleared between announced records, not among them');
    this.#floors.raise(seen);
    this.#runs.clear();
    this.#places.clear();
    this.#start = this.#next;
    this.#known = this.#next;
    this.#forgotten = 0;
    this.#near = 0;
    this.#forgottenNear = 0;
    this.#rolled = false;
  }

  snapshot(): UnitWindowSnapshot {
    return {
      start: this.#start,
      next: this.#next,
      known: this.#known,
      forgotten: this.#forgotten,
      ...(this.#gap > 0 && { forgottenNear: this.#forgottenNear }),
      rolled: this.#rolled,
      places: this.#places.snapshot()[0] as Float64Array,
      runs: this.#runs.snapshot(this.#start),
      floors: this.#floors.snapshot(),
    };
  }

  /** Takes over a snapshot; if it is of a larger window, its oldest units leave. */
  restore(snapshot: UnitWindowSnapshot): void {
    this.#start = snapshot.start;
    this.#next = snapshot.next;
    this.#known = snapshot.known;
    this.#forgotten = snapshot.forgotten;
    this.#forgottenNear = snapshot.forgottenNear ?? 0;
    this.#rolled = snapshot.rolled;
    this.#places.restore([snapshot.places]);
    this.#recountNear();
    this.#runs.restore(snapshot.runs);
    this.#floors.restore(snapshot.floors);
    this.#depart();
    this.#forget();
  }

  #advance(units: number): void {
    this.#next += units;
    if (!(this.#next <= this.#runs.end)) throw new Error(`${units} units admitted, but fewer announced`);
    this.#depart();
  }

  /** Lets the units go that stand more than the size behind the newest. */
  #depart(): void {
    const start = this.#next - this.#limit;
    if (start <= this.#start) return;
    this.#start = start;
    this.#rolled = true;
    let gone = 0;
    while (gone < this.#places.length && this.#places.get(0, gone) < start) gone += 1;
    if (gone > 0) {
      this.#near -= this.#nearAmong(gone);
      this.#places.dropOldest(gone);
    }
    this.#runs.dropBefore(start);
  }

  /** Keeps a growing window's positions within reach; the count stays. */
  #forget(): void {
    const over = this.#places.length - this.#reach;
    if (this.#limit !== Infinity || over <= 0) return;
    this.#known = Math.max(this.#known, this.#places.get(0, over - 1) + 1);
    const near = this.#nearAmong(over);
    this.#near -= near;
    this.#forgottenNear += near;
    this.#forgotten += over;
    this.#places.dropOldest(over);
  }

  /** Of the oldest `count` held, those that are one event with their next. */
  #nearAmong(count: number): number {
    if (this.#gap === 0) return 0;
    let near = 0;
    for (let d = 1; d <= count; d += 1) if (this.nextIsNear(d)) near += 1;
    return near;
  }

  #recountNear(): void {
    this.#near = this.#nearAmong(this.#places.length);
  }

  #resize(place: RecordPlace, row: number, sequence: number, units: number, shift: number): void {
    this.#runs.resize(place, sequence, units, shift);
    this.#runs.dropBefore(this.#start);
    this.#places.shift(0, row, shift);
    this.#next += shift;
  }
}

function wholeOrMore(what: string, value: number): number {
  if (!(value >= 1 && (value === Infinity || Number.isSafeInteger(value)))) {
    throw new RangeError(`${what} must be a whole number of units, 1 or more, not ${value}`);
  }
  return value;
}
