import type { RecordIdentity, RecordRange } from './record-identity.ts';
import { RecordRing, type RecordRingSnapshot } from './record-ring.ts';
import type { CorrectedRecord, LateRecords, RecordSink } from './record-sink.ts';
import { SourceFloors, type SourceFloorsSnapshot } from './source-floors.ts';

/** Which records a record window covers. */
export interface RecordWindowSettings {
  /** The last `size` records, whole, 1 or more; undefined: all since the last clear (lot, shift, run). */
  readonly size?: number;
  /** Numbers a record: 1 for a value, 2 for a count with its exposure. */
  readonly width: 1 | 2;
  /** Newest records of a growing window that stay correctable; 1 or more. */
  readonly reach?: number;
}

/** A record in the window, for the strip. */
export interface RecordInWindow {
  /** Records since: 0 is the newest. */
  readonly ago: number;
  readonly record: RecordIdentity | undefined;
  readonly a: number;
  readonly b: number;
}

/** Plain copy of a record window, without its sink. */
export interface RecordWindowSnapshot {
  readonly records: number;
  /** Records dropped since the sink was last filled afresh. */
  readonly dropped: number;
  readonly ring: RecordRingSnapshot;
  readonly floors: SourceFloorsSnapshot;
}

/** Records of a growing window that stay correctable where the settings do not say. */
export const defaultRecordReach = 65_536;

/** Records dropped, in windows' lengths and at least, after which the sink is filled afresh: its rounding cannot pile up. */
const recountAfterWindows = 64;
const recountAfterRecords = 65_536;

/**
 * Measurements, or counts with exposure: the last N records, or all since the last clear. What they add up to is in
 * the sink, which the window feeds; whoever stores the window's snapshot stores the sink's beside it.
 */
export class RecordWindow {
  readonly size: number | undefined;
  readonly #limit: number;
  readonly #two: boolean;
  readonly #sink: RecordSink;
  readonly #ring: RecordRing;
  readonly #floors = new SourceFloors();
  #records = 0;
  #dropped = 0;

  /** @throws RangeError for a size or reach that is not whole and 1 or more */
  constructor(settings: RecordWindowSettings, sink: RecordSink) {
    this.size = settings.size;
    this.#limit = settings.size ?? settings.reach ?? defaultRecordReach;
    if (!(Number.isSafeInteger(this.#limit) && this.#limit >= 1)) {
      throw new RangeError(`size or reach must be a whole number of records, 1 or more, not ${this.#limit}`);
    }
    this.#two = settings.width === 2;
    this.#sink = sink;
    this.#ring = new RecordRing(settings.width, this.#limit);
  }

  /** Records in the window. */
  get records(): number {
    return this.#records;
  }

  /** Whether the window holds its `size` records; a growing window is never full. */
  get full(): boolean {
    return this.#records === this.size;
  }

  /** Announces records of one source that are admitted next; `firstSequence` above all earlier ones of the source. */
  admitRun(source: number, firstSequence: number, records: number): void {
    this.#ring.announce(source, firstSequence, records);
    this.#floors.note(source, firstSequence + records - 1);
  }

  /** Admits one announced record. */
  admit(a: number, b = 0): void {
    this.#ring.push(a, b, 0);
    this.#sink.admit(a, b);
    this.#records += 1;
    if (this.#ring.length > this.#limit) this.#depart(this.#ring.length - this.#limit);
  }

  /** Puts a re-inspected record right; 'not here' if it is beyond the window or its reach. */
  correct(source: number, sequence: number, a: number, b = 0): CorrectedRecord | 'not here' {
    const row = this.#ring.rowOf(source, sequence);
    if (row === undefined) return 'not here';
    const before = { a: this.#ring.get(0, row), b: this.#two ? this.#ring.get(1, row) : 0 };
    this.#write(row, a, b);
    this.#sink.drop(before.a, before.b);
    this.#sink.admit(a, b);
    return { before, after: { a, b } };
  }

  /**
   * Takes up records that fill a hole of their source: directly after the source's nearest lower sequence that is
   * still known; if there is none, before everything. The oldest that no longer fit leave, so that late records older than
   * a full window do not count. Records from before the last clear do not count either. None of them may be in the
   * window already.
   *
   * @returns how many of them count
   */
  insertLate({ source, sequence, a, b }: LateRecords): number {
    if (!this.#ring.settled) throw new Error('late records come between announced records, not among them');
    if (this.#floors.covers(source, sequence)) return 0;
    const place = this.#ring.placeAfter(source, sequence) ?? this.#ring.oldestPlace();
    const over = this.#ring.length + a.length - this.#limit;
    const gone = this.size === undefined ? 0 : Math.min(a.length, Math.max(0, over - place.row));
    const taken = a.length - gone;
    if (taken > 0) this.#ring.insert(place, source, sequence + gone, taken);
    for (let k = 0; k < taken; k += 1) {
      const [lateA, lateB] = [a[gone + k] as number, b?.[gone + k] ?? 0];
      if (place.row >= 0) this.#write(place.row + k, lateA, lateB);
      this.#sink.admit(lateA, lateB);
    }
    this.#records += taken;
    this.#depart(Math.max(0, this.#ring.length - this.#limit));
    return taken;
  }

  /** Shows the newest records that are still known, at most `most`, oldest first; of a growing window not all are known. */
  visit(see: (a: number, b: number) => void, most = Infinity): void {
    for (let row = Math.max(0, this.#ring.length - most); row < this.#ring.length; row += 1) see(this.#ring.get(0, row), this.#two ? this.#ring.get(1, row) : 0);
  }

  /** The newest records, newest first, at most `most`. */
  newest(most: number): RecordInWindow[] {
    const held = this.#ring.length;
    return Array.from({ length: Math.min(most, held) }, (_, ago) => {
      const row = held - 1 - ago;
      return { ago, record: this.#ring.identityOf(row), a: this.#ring.get(0, row), b: this.#two ? this.#ring.get(1, row) : 0 };
    });
  }

  /** Records in the window, as far as they are indexed, source by source. */
  ranges(): RecordRange[] {
    return this.#ring.ranges();
  }

  /** Restarts the window and its sink. @param seen highest sequence seen of each source, marks included */
  clear(seen: Iterable<readonly [source: number, sequence: number]> = []): void {
    if (!this.#ring.settled) throw new Error('a window is cleared between announced records, not among them');
    this.#floors.raise(seen);
    this.#ring.clear();
    this.#sink.clear();
    this.#records = 0;
    this.#dropped = 0;
  }

  snapshot(): RecordWindowSnapshot {
    return {
      records: this.#records,
      dropped: this.#dropped,
      ring: this.#ring.snapshot(),
      floors: this.#floors.snapshot(),
    };
  }

  /** Takes over a snapshot; the sink must have been restored before. If it is of a larger window, its oldest records leave. */
  restore(snapshot: RecordWindowSnapshot): void {
    this.#records = snapshot.records;
    this.#dropped = snapshot.dropped;
    this.#ring.restore(snapshot.ring);
    this.#floors.restore(snapshot.floors);
    this.#depart(Math.max(0, this.#ring.length - this.#limit));
  }

  #write(row: number, a: number, b: number): void {
    this.#ring.set(0, row, a);
    if (this.#two) this.#ring.set(1, row, b);
  }

  /** Lets the oldest known records go: out of the window, or out of a growing window's reach. */
  #depart(records: number): void {
    if (records === 0) return;
    if (this.size === undefined) {
      this.#ring.forgetOldest(records);
      return;
    }
    for (let row = 0; row < records; row += 1) this.#sink.drop(this.#ring.get(0, row), this.#two ? this.#ring.get(1, row) : 0);
    this.#records -= records;
    this.#dropped += records;
    this.#ring.dropOldest(records);
    if (this.#dropped >= Math.max(recountAfterRecords, recountAfterWindows * this.#limit)) this.recount();
  }

  /** Fills the sink afresh from the window's records; a growing window, which lets nothing go, keeps what it has. */
  recount(): void {
    if (this.size === undefined) return;
    this.#dropped = 0;
    this.#sink.clear();
    this.visit((a, b) => this.#sink.admit(a, b));
  }
}
