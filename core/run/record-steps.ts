import type { Batch, CorrectionFate, Evidence } from '../evidence/evidence.ts';
import type { Moment, RecordMoment } from '../evidence/moment.ts';
import type { Standing } from '../evidence/standing.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Correction } from '../record/part.ts';
import type { GuaranteeChange } from './guarantee-change.ts';
import type { GuaranteeRun } from './guarantee-run.ts';

/** What lives on the records of one guarantee. */
export interface Living {
  readonly guarantee: Guarantee;
  readonly standing: Standing;
  readonly evidence: Evidence;
  readonly run: GuaranteeRun;
  readonly change: GuaranteeChange | undefined;
}

/**
 * Gives records to a guarantee's run, window and detector. Where the run takes part in the decision, run and window go
 * in step: what the run says changes for the window at the very record, however the records were cut.
 */
export class RecordSteps {
  readonly #living: Living;
  readonly #runDecides: boolean;

  constructor(living: Living) {
    this.#living = living;
    this.#runDecides = living.guarantee.looks !== 'one look' && living.run.evidence !== undefined;
    this.tellRun();
  }

  /** Tells the standing what the run says now; weigh afterwards. */
  tellRun(): void {
    if (this.#runDecides) this.#living.standing.runSays(this.#living.run.assessment);
  }

  /** @param window gives the window the records from one place to another */
  take(batch: Batch, moment: RecordMoment, window: (from: number, to: number) => void): void {
    const { run, change, evidence } = this.#living;
    moment.place = batch.from;
    run.note(batch, moment.at);
    for (let place = batch.from; place < batch.to; ) {
      const before = run.assessment;
      const next = run.take(batch, place, moment);
      if (this.#runDecides && run.assessment !== before) {
        if (next - 1 > place) window(place, next - 1);
        this.tellRun();
        window(next - 1, next);
        evidence.weigh(moment);
      } else if (this.#runDecides) window(place, next);
      place = next;
    }
    if (!this.#runDecides) window(batch.from, batch.to);
    change?.take(batch, moment); // Last, so that at the same unit the crossing is told before the change.
    moment.place = batch.to - 1;
  }

  /** Late records: the run counts those that belong to it; a detector judges what happens now, and not them. */
  fill(batch: Batch, moment: RecordMoment): void {
    const { run, evidence } = this.#living;
    if (!run.spans.isBefore(batch.source, batch.firstSequence + batch.from)) {
      moment.place = batch.from;
      run.note(batch, moment.at);
      for (let place = batch.from; place < batch.to; ) place = run.take(batch, place, moment);
      this.tellRun();
    }
    evidence.fill(batch, moment);
  }

  /** A correction changes the window, and the run by as much where the record came in it. */
  correct(correction: Correction, source: number, station: number, moment: Moment): CorrectionFate {
    const { run, evidence } = this.#living;
    const identity = { source, sequence: correction.corrects };
    const before = evidence.figures();
    const fate = evidence.correct(identity, station, correction.finding, moment);
    if (fate !== 'corrected' || run.evidence === undefined || !run.spans.holds(source, correction.corrects)) return fate;
    const after = evidence.figures();
    const changeOf = (name: string): number => (after[name] ?? 0) - (before[name] ?? 0);
    run.correct({ size: changeOf('inspected') + changeOf('exposure'), count: changeOf('nonconforming') + changeOf('count') }, moment);
    if (this.#runDecides) {
      this.tellRun();
      evidence.weigh(moment);
    }
    return fate;
  }
}
