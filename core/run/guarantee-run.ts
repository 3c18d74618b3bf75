import type { Assessment } from '../evidence/assessment.ts';
import type { Batch } from '../evidence/evidence.ts';
import type { Moment, RecordMoment } from '../evidence/moment.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import { MarkedPath, type MarkedPathSnapshot } from './marked-path.ts';
import { RecordSpans, type RecordSpansSnapshot } from './record-spans.ts';
import type { RunCause } from './run-cause.ts';
import type { CountChange, RunEvidence } from './run-evidence.ts';
import { runOf } from './run-of.ts';

/** When the run first said something, and after how much. */
export interface FirstSaid extends Moment {
  /** Units, exposure or values since the run began. */
  readonly size: number;
}

export interface GuaranteeRunSnapshot {
  readonly number: number;
  readonly cause: RunCause;
  readonly detail: string;
  readonly begunAt: number;
  readonly evidence: unknown;
  readonly spans: RecordSpansSnapshot;
  readonly demonstrated: FirstSaid | undefined;
  readonly violated: FirstSaid | undefined;
  readonly path: MarkedPathSnapshot;
}

/**
 * The run of one guarantee since its declared beginning. It begins anew when a named person restarts the evidence, with
 * a new lot where the guarantee is about one, and with a changeover back to its product: never because of what it shows.
 */
export class GuaranteeRun {
  readonly evidence: RunEvidence | undefined;
  readonly spans = new RecordSpans();
  /** log10 of the evidence for and against the guarantee, since the run began. */
  readonly path = new MarkedPath('from the beginning', 2);
  #number = 1;
  #cause: RunCause = 'first';
  #detail = '';
  #begunAt = 0;
  #demonstrated: FirstSaid | undefined;
  #violated: FirstSaid | undefined;

  constructor(guarantee: Guarantee) {
    this.evidence = runOf(guarantee);
  }

  /** The first run is number 1. */
  get number(): number {
    return this.#number;
  }

  get cause(): RunCause {
    return this.#cause;
  }

  /** Of a restart who and why, of a lot or changeover which; empty of the first run. */
  get detail(): string {
    return this.#detail;
  }

  /** Plant time of its beginning, or of its first record, ms; 0 before. */
  get begunAt(): number {
    return this.#begunAt;
  }

  get demonstrated(): FirstSaid | undefined {
    return this.#demonstrated;
  }

  get violated(): FirstSaid | undefined {
    return this.#violated;
  }

  get assessment(): Assessment | undefined {
    return this.evidence?.assessment;
  }

  /** Whether nothing has been inspected since it began. */
  get empty(): boolean {
    return this.spans.ranges().length === 0;
  }

  /** Records of a batch come; taken step by step after this. */
  note({ source, firstSequence, from, to }: Batch, at: number): void {
    this.spans.note(source, firstSequence + from, firstSequence + to - 1);
    if (this.#begunAt === 0) this.#begunAt = at;
  }

  /** Takes records from place `from` on, up to the first at which the assessment changes. @returns the place behind the last */
  take(batch: Batch, from: number, moment: RecordMoment): number {
    const { evidence } = this;
    if (evidence === undefined) return batch.to;
    const before = evidence.assessment;
    const next = evidence.take(batch, from);
    if (evidence.assessment !== before) {
      moment.place = next - 1;
      this.#say(evidence, moment);
    }
    return next;
  }

  correct(change: CountChange, moment: Moment): void {
    this.evidence?.correct(change);
    if (this.evidence) this.#say(this.evidence, moment);
  }

  begin(cause: RunCause, detail: string, at: number): void {
    if (cause === 'restart' || !this.empty) this.#number += 1;
    this.#cause = cause;
    this.#detail = detail;
    this.#begunAt = at;
    this.path.clear();
    this.#demonstrated = undefined;
    this.#violated = undefined;
    this.spans.beginAnew();
    this.evidence?.clear();
  }

  /** Keeps where the evidence stands at a mark of the plant clock. */
  mark(at: number): void {
    if (this.evidence && this.evidence.size > 0) this.path.mark(at, [this.evidence.lnDemonstrated() / Math.LN10, this.evidence.lnViolated() / Math.LN10]);
  }

  snapshot(): GuaranteeRunSnapshot {
    return {
      number: this.#number,
      cause: this.#cause,
      detail: this.#detail,
      begunAt: this.#begunAt,
      evidence: this.evidence?.snapshot(),
      spans: this.spans.snapshot(),
      demonstrated: this.#demonstrated,
      violated: this.#violated,
      path: this.path.snapshot(),
    };
  }

  restore(from: GuaranteeRunSnapshot): void {
    this.#number = from.number;
    this.#cause = from.cause;
    this.#detail = from.detail;
    this.#begunAt = from.begunAt;
    this.path.restore(from.path);
    this.evidence?.restore(from.evidence as never);
    this.spans.restore(from.spans);
    this.#demonstrated = from.demonstrated;
    this.#violated = from.violated;
  }

  #say({ assessment, size }: RunEvidence, { at, source, sequence }: Moment): void {
    if (assessment.state === 'demonstrated') this.#demonstrated ??= { at, source, sequence, size };
    if (assessment.state === 'violated') this.#violated ??= { at, source, sequence, size };
  }
}
