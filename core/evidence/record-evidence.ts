import type { Finding } from '../record/part.ts';
import { timeAt } from '../record/time-column.ts';
import type { EpochMs } from '../units.ts';
import type { Picture } from '../view/history.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { RecordIdentity, RecordRange } from '../window/record-identity.ts';
import type { Batch, Bounds, CorrectionFate, Evidence } from './evidence.ts';
import type { HeldRecords } from './held-records.ts';
import type { ModelCheckSnapshot } from './model-check.ts';
import { clockMoment, type Moment, type RecordMoment } from './moment.ts';
import type { RecordReader } from './record-columns.ts';
import type { RecordRule } from './record-rule.ts';
import type { Standing } from './standing.ts';

interface RecordEvidenceSnapshot {
  readonly position: number;
  readonly held: unknown;
  readonly check: ModelCheckSnapshot | undefined;
}

/** Evidence on what is measured or counted over an exposure: each record costs a step, and is weighed. Positions are records. */
export class RecordEvidence<S> implements Evidence {
  readonly #reader: RecordReader;
  readonly #held: HeldRecords<S>;
  readonly #rule: RecordRule<S>;
  readonly #standing: Standing;
  #position = 0;

  constructor(reader: RecordReader, held: HeldRecords<S>, rule: RecordRule<S>, standing: Standing) {
    this.#reader = reader;
    this.#held = held;
    this.#rule = rule;
    this.#standing = standing;
  }

  get position(): number {
    return this.#position;
  }

  take({ part, from, to, source, firstSequence }: Batch, moment: RecordMoment): void {
    const columns = this.#reader.columns(part, from, to);
    if (columns === undefined) return;
    const { a, b } = columns;
    this.#held.announce(source, firstSequence + from, to - from);
    for (let place = from; place < to; place += 1) {
      const at = timeAt(part.time, place);
      if (this.#held.nextDue() <= at) this.#leaveUntil(at);
      moment.place = place;
      if (!this.#held.admit(at, a[place - from] as number, b === undefined ? 0 : (b[place - from] as number))) continue;
      this.#position += 1;
      this.#rule.check?.seen(this.#held);
      this.weigh(moment);
    }
  }

  fill({ part, from, to, source, firstSequence }: Batch, moment: RecordMoment): void {
    const columns = this.#reader.columns(part, from, to);
    if (columns === undefined) return;
    this.#held.fill({ ...columns, source, sequence: firstSequence + from, timeOf: (index) => timeAt(part.time, from + index) });
    moment.place = to - 1;
    this.#changed(moment);
  }

  correct(identity: RecordIdentity, _station: number, finding: Finding, moment: Moment): CorrectionFate {
    const found = this.#reader.finding(finding);
    if (found === undefined) return 'another kind';
    if (!this.#held.correct(identity.source, identity.sequence, found.a, found.b)) return 'not here';
    this.#changed(moment);
    return 'corrected';
  }

  clear(moment: Moment): void {
    this.#held.clear();
    this.#rule.check?.clear();
    this.#standing.beginAnew();
    this.weigh(moment);
  }

  moveClock(moment: Moment): void {
    this.#leaveUntil(moment.at);
  }

  nextDue(): number {
    return this.#held.nextDue();
  }

  weigh(moment: Moment): void {
    const { sum, ripe } = this.#held;
    const doubt = this.#rule.doubt(sum);
    if (doubt !== undefined) this.#standing.block('model', doubt);
    else this.#standing.lift('model');
    this.#standing.weigh(this.#rule.assess(sum, ripe, this.#standing.waiting), this.#position, moment);
  }

  figures(): Readonly<Record<string, number>> {
    const { size } = this.#held;
    return { ...this.#rule.figures(this.#held.sum), ...(size === undefined ? {} : { windowRecords: size }) };
  }

  ranges(): readonly RecordRange[] {
    return this.#held.ranges();
  }

  bounds(): Bounds {
    return this.#rule.bounds(this.#held.sum);
  }

  margin(): Margin {
    return this.#rule.margin(this.#held);
  }

  warnings(): readonly string[] {
    return this.#rule.warnings(this.#held.sum);
  }

  picture(): Picture {
    return this.#rule.picture?.(this.#held) ?? { kind: 'none' };
  }

  snapshot(): RecordEvidenceSnapshot {
    return { position: this.#position, held: this.#held.snapshot(), check: this.#rule.check?.snapshot() };
  }

  restore(from: RecordEvidenceSnapshot): void {
    this.#position = from.position;
    this.#held.restore(from.held);
    if (from.check !== undefined) this.#rule.check?.restore(from.check);
  }

  /** Lets every step of time go that is over by `at`, each at its own moment. */
  #leaveUntil(at: number): void {
    for (let due = this.nextDue(); due <= at; due = this.nextDue()) {
      this.#held.advance(due);
      this.#changed(clockMoment(due as EpochMs));
    }
  }

  #changed(moment: Moment): void {
    this.#rule.check?.look(this.#held);
    this.weigh(moment);
  }
}
