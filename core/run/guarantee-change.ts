import type { Moment, RecordMoment } from '../evidence/moment.ts';
import { changeBaseline } from '../plant/change-baseline.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { ChangeWatch } from './change-watch.ts';
import { changeWatchOf, type DeteriorationRule } from './change-watch-of.ts';
import type { DetectorView } from './detector-view.ts';
import { EventSieve } from './event-sieve.ts';
import { MarkedPath, type MarkedPathSnapshot } from './marked-path.ts';
import { RecordSpans, type RecordSpansSnapshot } from './record-spans.ts';
import type { Batch } from '../evidence/evidence.ts';

const clusterDoubt =
  'Nonconforming units come in clusters now, so the distance between false calls no longer holds: it calls falsely more often. Find the common cause, or count events (clusters: merge-within) in the plant file.';

export interface GuaranteeChangeSnapshot {
  /** What the state depends on: another setting begins anew. */
  readonly settings: string;
  readonly watch: unknown;
  readonly spans: RecordSpansSnapshot;
  /** Units since the newest nonconforming one, where events are counted. */
  readonly sinceFound: number;
  readonly path: MarkedPathSnapshot;
}

/** Whom the detector of a guarantee tells. */
export interface ChangeListener {
  readonly raised: (rule: DeteriorationRule, moment: Moment, figures: Readonly<Record<string, number>>) => void;
  readonly returned: (rule: DeteriorationRule, moment: Moment) => void;
}

/** The deterioration rule of one guarantee at work: its detector and the records it has lived on since it last began anew. */
export class GuaranteeChange {
  readonly rule: DeteriorationRule;
  readonly watch: ChangeWatch;
  /** What it takes as well: nonconforming units per unit, nonconformities per unit of exposure, or a mean. */
  readonly baseline: number;
  readonly spans = new RecordSpans();
  /** Where its gauge stood lately. */
  readonly path = new MarkedPath('lately', 1);
  readonly #sieve: EventSieve | undefined;
  readonly #listener: ChangeListener;

  constructor(guarantee: Guarantee, rule: DeteriorationRule, watch: ChangeWatch, listener: ChangeListener) {
    this.rule = rule;
    this.baseline = changeBaseline(guarantee, rule.baseline === 'normal-rate' ? guarantee.normalRate : undefined);
    this.watch = watch;
    const { clusters } = guarantee;
    this.#sieve = clusters?.kind === 'events' ? new EventSieve(clusters.gap) : undefined;
    this.#listener = listener;
  }

  take(records: Batch, moment: RecordMoment): void {
    const batch = this.#sieve?.batch(records) ?? records;
    const { source, firstSequence, to } = batch;
    for (let place = batch.from; place < to; ) {
      const before = this.watch.alarmed;
      const next = this.watch.take(batch, place);
      this.spans.note(source, firstSequence + place, firstSequence + next - 1);
      place = next;
      if (this.watch.alarmed === before) continue;
      moment.place = next - 1;
      if (before) this.#listener.returned(this.rule, moment);
      else {
        const { seen, found } = this.watch.figures();
        const counts = found === undefined ? { seen } : { seen, found };
        this.#listener.raised(this.rule, moment, { ...counts, baseline: this.baseline, betweenFalseCalls: this.rule.unitsBetweenFalseCalls });
        this.spans.beginAnew();
      }
    }
  }

  /** A named person restarted the evidence: what was seen before says nothing of the line any more. */
  beginAnew(moment: Moment): void {
    const { alarmed } = this.watch;
    this.watch.beginAnew();
    this.#sieve?.beginAnew();
    this.spans.beginAnew();
    if (alarmed) this.#listener.returned(this.rule, moment);
  }

  /** Keeps where the gauge stands at a mark of the plant clock. */
  mark(at: number): void {
    this.path.mark(at, [this.watch.gauge()]);
  }

  /** @param clustered nonconforming units come in clusters, as the diagnostics of the window say */
  view(clustered: boolean): DetectorView {
    return {
      kind: this.rule.detector,
      gauge: this.watch.gauge(),
      alarmed: this.watch.alarmed,
      inARowToAlarm: this.watch.inARowToAlarm(),
      conformingToHalfWay: this.watch.conformingToHalfWay(),
      toReturn: this.watch.toReturn(),
      betweenFalseCalls: this.rule.unitsBetweenFalseCalls,
      baseline: this.baseline,
      against: this.rule.baseline,
      doubt: clustered ? clusterDoubt : undefined,
    };
  }

  snapshot(): GuaranteeChangeSnapshot {
    return { settings: settingsOf(this.rule, this.baseline), watch: this.watch.snapshot(), spans: this.spans.snapshot(), sinceFound: this.#sieve?.since ?? Infinity, path: this.path.snapshot() };
  }

  /** Takes over a snapshot of the same settings; of others nothing. */
  restore(from: GuaranteeChangeSnapshot | undefined): void {
    if (from?.settings !== settingsOf(this.rule, this.baseline)) return;
    this.watch.restore(from.watch as never);
    this.spans.restore(from.spans);
    this.#sieve?.restore(from.sinceFound);
    this.path.restore(from.path);
  }
}

/** The detector of a guarantee, where its rules ask for one and its quantity has one. */
export function guaranteeChangeOf(guarantee: Guarantee, listener: ChangeListener): GuaranteeChange | undefined {
  const rule = guarantee.rules.find((one): one is DeteriorationRule => one.kind === 'deterioration');
  const watch = rule && changeWatchOf(guarantee, rule);
  return rule && watch && new GuaranteeChange(guarantee, rule, watch, listener);
}

function settingsOf({ unitsBetweenFalseCalls, detector }: DeteriorationRule, baseline: number): string {
  return JSON.stringify([unitsBetweenFalseCalls, detector, baseline]);
}
