import type { RecordRange } from './record-identity.ts';
import { RecordRing, type RecordRingSnapshot } from './record-ring.ts';
import type { CorrectedRecord, LateRecords, StoredSink } from './record-sink.ts';
import { defaultRecordReach } from './record-window.ts';
import { SourceFloors, type SourceFloorsSnapshot } from './source-floors.ts';
import { wholeSteps, type TimeSpan } from './time-steps.ts';

export interface RecordTimeWindowSettings extends TimeSpan {
  /** Newest records that stay correctable; whole, 1 or more. */
  readonly reach?: number;
}

/** Late records with their times of inspection, ms. */
export interface LateTimedRecords extends LateRecords {
  readonly at: ArrayLike<number>;
}

/** Plain copy of a time window of records; steps oldest first. */
export interface RecordTimeWindowSnapshot<T> {
  readonly present: number;
  readonly steps: ReadonlyArray<{ readonly step: number; readonly records: number; readonly sink: T }>;
  readonly ring: RecordRingSnapshot;
  readonly floors: SourceFloorsSnapshot;
}

/** The sum of one step and the records in it. */
interface StepSum<S> {
  records: number;
  readonly sink: S;
}

/**
 * Measurements, or counts with exposure, of the last span of time, by time of inspection: a sink for each of the
 * span's whole steps and the present one. The present step is that of the newest time told; it never goes back.
 */
export class RecordTimeWindow<T, S extends StoredSink<T> = StoredSink<T>> {
  readonly stepMs: number;
  readonly #whole: number;
  readonly #reach: number;
  readonly #emptySink: () => S;
  /** Step s at place s modulo the length; undefined where there are no records. */
  readonly #steps: (StepSum<S> | undefined)[];
  /** Columns a, b, step. */
  readonly #ring: RecordRing;
  readonly #floors = new SourceFloors();
  #present = 0;
  #records = 0;

  /** @throws RangeError for a span that is no multiple of its step, too many steps, or a reach not whole and 1 or more */
  constructor(settings: RecordTimeWindowSettings, emptySink: () => S) {
    this.stepMs = settings.stepMs;
    this.#whole = wholeSteps(settings);
    this.#reach = settings.reach ?? defaultRecordReach;
    if (!(Number.isSafeInteger(this.#reach) && this.#reach >= 1)) {
      throw new RangeError(`reach must be a whole number of records, 1 or more, not ${this.#reach}`);
    }
    this.#emptySink = emptySink;
    this.#steps = Array.from({ length: this.#whole + 1 }, () => undefined);
    this.#ring = new RecordRing(3, this.#reach);
  }

  /** Records in the window. */
  get records(): number {
    return this.#records;
  }

  /** Start of the oldest step covered, ms. */
  get since(): number {
    return (this.#present - this.#whole) * this.stepMs;
  }

  /** Moves the window on to the step of the time `to` (ms); steps that leave are dropped whole. */
  advance(to: number): void {
    const step = Math.floor(to / this.stepMs);
    if (!(step > this.#present)) return;
    for (let entering = Math.max(this.#present + 1, step - this.#whole); entering <= step; entering += 1) {
      const place = entering % this.#steps.length;
      this.#records -= this.#steps[place]?.records ?? 0;
      this.#steps[place] = undefined;
    }
    this.#present = step;
    let left = 0;
    while (left < this.#ring.length && !this.#covers(this.#ring.get(2, left))) left += 1;
    if (left > 0) this.#ring.dropOldest(left);
  }

  /** Announces records of one source that are admitted next; `firstSequence` above all earlier ones of the source. */
  admitRun(source: number, firstSequence: number, records: number): void {
    this.#ring.announce(source, firstSequence, records);
    this.#floors.note(source, firstSequence + records - 1);
  }

  /**
   * Admits one announced record.
   *
   * @param at time of inspection, ms; the window moves on to it
   * @returns whether it counts: false if its step has left
   */
  admit(at: number, a: number, b = 0): boolean {
    this.advance(at);
    const step = Math.floor(at / this.stepMs);
    this.#ring.push(a, b, step);
    this.#forget();
    return this.#sum(step, a, b);
  }

  /** Puts a re-inspected record right in its own step; 'not here' if that has left or the record is beyond reach. */
  correct(source: number, sequence: number, a: number, b = 0): CorrectedRecord | 'not here' {
    const row = this.#ring.rowOf(source, sequence);
    if (row === undefined) return 'not here';
    const step = this.#ring.get(2, row);
    const sum = this.#covers(step) ? this.#steps[step % this.#steps.length] : undefined;
    if (sum === undefined) return 'not here';
    const before = { a: this.#ring.get(0, row), b: this.#ring.get(1, row) };
    this.#write(row, a, b, step);
    sum.sink.drop(before.a, before.b);
    sum.sink.admit(a, b);
    return { before, after: { a, b } };
  }

  /**
   * Takes up records that fill a hole of their source, each in its own step while that is inside. Records from before
   * the last clear do not count. None of them may be in the window already.
   *
   * @returns how many of them count
   */
  insertLate({ source, sequence, at, a, b }: LateTimedRecords): number {
    if (!this.#ring.settled) throw new Error('late records come between announced records, not among them');
    if (this.#floors.covers(source, sequence)) return 0;
    for (let k = 0; k < a.length; k += 1) this.advance(at[k] as number);
    const place = this.#ring.placeAfter(source, sequence) ?? this.#ring.oldestPlace();
    this.#ring.insert(place, source, sequence, a.length);
    let counted = 0;
    for (let k = 0; k < a.length; k += 1) {
      const [lateA, lateB, step] = [a[k] as number, b?.[k] ?? 0, Math.floor((at[k] as number) / this.stepMs)];
      this.#write(place.row + k, lateA, lateB, step);
      if (this.#sum(step, lateA, lateB)) counted += 1;
    }
    this.#forget();
    return counted;
  }

  /** The sinks of the steps with records, oldest first; to be read and added up, not changed. */
  sinks(): S[] {
    return [...this.#covered()].map(([, sum]) => sum.sink);
  }

  /** Shows the newest records that are still known, at most `most`, in the order they came. */
  visit(see: (a: number, b: number) => void, most = Infinity): void {
    for (let row = Math.max(0, this.#ring.length - most); row < this.#ring.length; row += 1) {
      if (this.#covers(this.#ring.get(2, row))) see(this.#ring.get(0, row), this.#ring.get(1, row));
    }
  }

  /** Records in the window, as far as they are known, source by source. */
  ranges(): RecordRange[] {
    return this.#ring.ranges();
  }

  /** Restarts the window. @param seen highest sequence seen of each source, marks included */
  clear(seen: Iterable<readonly [source: number, sequence: number]> = []): void {
    if (!this.#ring.settled) throw new Error('a window is cleared between announced records, not among them');
    this.#floors.raise(seen);
    this.#ring.clear();
    this.#steps.fill(undefined);
    this.#records = 0;
  }

  snapshot(): RecordTimeWindowSnapshot<T> {
    const steps = [...this.#covered()].map(([step, { records, sink }]) => ({ step, records, sink: sink.snapshot() }));
    return { present: this.#present, steps, ring: this.#ring.snapshot(), floors: this.#floors.snapshot() };
  }

  /** Takes over a snapshot of a window with the same step; steps outside this span leave. */
  restore(snapshot: RecordTimeWindowSnapshot<T>): void {
    this.#present = snapshot.present;
    this.#ring.restore(snapshot.ring);
    this.#floors.restore(snapshot.floors);
    this.#steps.fill(undefined);
    this.#records = 0;
    for (const { step, records, sink: stored } of snapshot.steps) {
      if (!this.#covers(step)) continue;
      const sink = this.#emptySink();
      sink.restore(stored);
      this.#steps[step % this.#steps.length] = { records, sink };
      this.#records += records;
    }
    this.#forget();
  }

  #write(row: number, a: number, b: number, step: number): void {
    this.#ring.set(0, row, a);
    this.#ring.set(1, row, b);
    this.#ring.set(2, row, step);
  }

  #sum(step: number, a: number, b: number): boolean {
    if (!this.#covers(step)) return false;
    const sum = (this.#steps[step % this.#steps.length] ??= { records: 0, sink: this.#emptySink() });
    sum.sink.admit(a, b);
    sum.records += 1;
    this.#records += 1;
    return true;
  }

  #covers(step: number): boolean {
    return step >= this.#present - this.#whole;
  }

  #forget(): void {
    if (this.#ring.length > this.#reach) this.#ring.dropOldest(this.#ring.length - this.#reach);
  }

  /** Steps with records, oldest first. */
  *#covered(): Generator<[step: number, sum: StepSum<S>]> {
    for (let step = Math.max(0, this.#present - this.#whole); step <= this.#present; step += 1) {
      const sum = this.#steps[step % this.#steps.length];
      if (sum !== undefined) yield [step, sum];
    }
  }
}
