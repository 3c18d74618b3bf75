import type { AlarmGrounds } from '../alarm/alarm.ts';
import type { Batch, Evidence } from '../evidence/evidence.ts';
import { evidenceOf } from '../evidence/evidence-of.ts';
import { clockMoment, type Moment, type RecordMoment } from '../evidence/moment.ts';
import { nonconformingPlaces, type Limit } from '../evidence/nonconforming-places.ts';
import { Standing } from '../evidence/standing.ts';
import { TipTrail } from '../evidence/tip-trail.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import type { Correction, InspectionPart, LineMark } from '../record/part.ts';
import { guaranteeChangeOf, type GuaranteeChange } from '../run/guarantee-change.ts';
import { GuaranteeRun } from '../run/guarantee-run.ts';
import { isDecidedByRun } from '../run/method-of-rule.ts';
import { RecordSteps } from '../run/record-steps.ts';
import { RunStarts } from '../run/run-starts.ts';
import type { EpochMs } from '../units.ts';
import { BadDataWatch, type BadDataRule } from './bad-data-watch.ts';
import { decidingFigures, decidingTip } from './decision.ts';
import { groundsOf } from './grounds-of.ts';
import { LostRecords } from './lost-records.ts';
import { MinuteTally } from './minute-tally.ts';
import { noteMinutes } from './note-minutes.ts';
import { Period } from './period.ts';
import { silenceOf, type Silence } from './silence.ts';
import type { Stretch } from './stretches.ts';
import type { WatchSnapshot } from './watch-snapshot.ts';
import type { WatchSurroundings } from './watch-surroundings.ts';

/** Watches one guarantee: its evidence, its standing, and the rules that need no bound. */
export class Watch {
  readonly guarantee: Guarantee;
  readonly around: WatchSurroundings;
  readonly standing: Standing;
  readonly evidence: Evidence;
  readonly lost = new LostRecords();
  /** The run since its declared beginning, and the detector of a change, beside the window. */
  readonly run: GuaranteeRun;
  readonly change: GuaranteeChange | undefined;
  readonly trail = new TipTrail();
  readonly minutes = new MinuteTally();
  /** Set by everything that changes what a screen shows; whoever shows it resets it. */
  changed = true;
  /** Newest time of inspection, ms; 0 before the first record. */
  newest = 0;
  /** Judges measurements, where values beyond a limit are counted. */
  readonly #limit: Limit | undefined;
  readonly #period: Period;
  readonly #steps: RecordSteps;
  readonly #starts: RunStarts;
  readonly #silence: Silence | undefined;
  readonly #badData: BadDataWatch | undefined;
  /** Nothing falls due before this; records only move it on, but for windows that go by time. */
  #dueKnown = Infinity;
  readonly #dueMovesWithRecords: boolean;

  constructor(guarantee: Guarantee, around: WatchSurroundings) {
    this.guarantee = guarantee;
    this.around = around;
    this.#limit = guarantee.promise.quantity === 'fraction-beyond-limit' ? guarantee.promise.limit : undefined;
    this.#dueMovesWithRecords = guarantee.window.kind === 'time' || guarantee.window.kind === 'shift';
    this.#period = new Period(guarantee.window.kind, around.calendar);
    const badData = guarantee.rules.find((rule): rule is BadDataRule => rule.kind === 'bad-data');
    this.#badData = badData && new BadDataWatch(badData, around.badData);
    this.standing = new Standing(guarantee, around, {
      figures: () => decidingFigures(this),
      grounds: (rule, moment) => this.#grounds(rule, moment, decidingFigures(this)),
    });
    this.evidence = evidenceOf(guarantee, this.standing, around.stationName);
    this.run = new GuaranteeRun(guarantee);
    this.change = guaranteeChangeOf(guarantee, {
      raised: (rule, moment, figures) => around.desk.raise(guarantee, rule, moment.at, () => this.#grounds(rule.kind, moment, figures)),
      returned: (rule, moment) => around.desk.returned(guarantee.id, rule.kind, moment.at),
    });
    this.#silence = silenceOf(this, (moment, figures) => this.#grounds('silence', moment, figures));
    this.#steps = new RecordSteps(this);
    this.#starts = new RunStarts(this, around.tell);
  }

  /** Takes a part's records in order. `late`: they fill a hole declared lost before. */
  take(part: InspectionPart, stretches: readonly Stretch[], base: Pick<Batch, 'source' | 'firstSequence' | 'station'>, moment: RecordMoment, late: boolean): void {
    this.changed = true;
    const { source, firstSequence, station } = base; // spreading it into each batch costs more than all the rest
    const lot = part.origin.lot ?? this.around.line.lot;
    for (const { from, to, minute } of stretches) {
      const batch: Batch = { part, from, to, places: nonconformingPlaces(part, from, to, this.#limit), source, firstSequence, station, lot };
      noteMinutes(this.minutes, batch, minute);
      moment.place = from;
      if (moment.at > this.newest) this.newest = moment.at;
      const belonging = this.#period.of(minute, lot);
      if (belonging === 'past') continue;
      if (belonging === 'begins anew') {
        if (this.guarantee.window.kind === 'lot') this.#setLotSize(lot === this.around.line.lot ? this.around.line.lotSize : undefined);
        if (this.guarantee.window.kind === 'lot') this.#starts.begin('lot', lot ?? '', moment);
        this.#beginAnew(moment);
      }
      this.#heard(moment);
      if (late) this.#steps.fill(batch, moment);
      else this.#steps.take(batch, moment, (first, end) => this.#giveWindow(batch, first, end, moment));
      if (moment.at > this.newest) this.newest = moment.at;
    }
    this.trail.wake(this.around.now());
    if (this.#dueKnown === Infinity || this.#dueMovesWithRecords) this.#refreshDue();
  }

  correct(correction: Correction, source: number, station: number, moment: Moment): ReturnType<Evidence['correct']> {
    this.changed = true;
    return this.#steps.correct(correction, source, station, moment);
  }

  /** Records of one of its stations are gone. */
  lose(source: number, first: number, records: number, moment: Moment): void {
    this.changed = true;
    this.run.spans.noteLost(source, first + records - 1);
    this.lost.declare(source, first, records, this.evidence.position, moment.at);
    this.#settleLost(moment);
    this.#refreshDue();
  }

  fillLost(source: number, first: number, records: number, moment: Moment): void {
    this.lost.fill(source, first, records);
    this.#settleLost(moment);
  }

  /** A named person restarts the evidence after a declared event. */
  restart(by: string, reason: string, moment: Moment): void {
    this.changed = true;
    this.run.begin('restart', `${reason} (${by})`, moment.at);
    this.change?.beginAnew(moment);
    this.#beginAnew(moment);
  }

  /** The next moment at which the clock alone changes something; Infinity where nothing waits. */
  due(): number {
    let due = Math.min(this.#period.until, this.evidence.nextDue(), this.trail.due);
    if (this.#silence) due = Math.min(due, this.#silence.due);
    if (this.#badData) due = Math.min(due, this.#badData.due(this.around.now()));
    if (this.guarantee.window.kind === 'time') due = Math.min(due, this.lost.oldestAt + this.guarantee.window.spanMs);
    this.#dueKnown = due;
    return due;
  }

  /** The plant clock has come to `at`, a moment that `due` named (or later). */
  moveClock(at: EpochMs): void {
    this.changed = true;
    const moment = clockMoment(at);
    if (this.#period.until <= at) {
      this.#period.end();
      this.#beginAnew(moment);
    }
    if (this.evidence.nextDue() <= at) this.evidence.moveClock(moment);
    this.#silence?.fall(moment);
    this.weighBadData(at);
    this.#settleLost(moment);
    if (this.trail.due <= at) {
      this.trail.mark(at, decidingTip(this));
      this.run.mark(at);
      this.change?.mark(at);
    }
  }

  /** Its line said something of itself. A line that stands is not silent; a lot that starts begins a lot's window. */
  lineMarked(mark: LineMark, moment: Moment): void {
    this.changed = true;
    const movedOn = mark.kind === 'changeover' && this.guarantee.product !== undefined && mark.product !== this.guarantee.product;
    if (mark.kind === 'line-stopped' || movedOn) this.#heard(moment);
    if (mark.kind === 'changeover' || mark.kind === 'lot-start') this.#productRuns(mark.product, moment);
    if (mark.kind === 'lot-start' && this.guarantee.window.kind === 'lot') this.#startLot(mark.lot, mark.size, moment);
    if (mark.kind === 'lot-end') this.evidence.endLot?.(mark.lot, moment);
    this.#refreshDue();
  }

  /** Weighs the bad-data rule after something was noted, or fell out, at one of its stations. */
  weighBadData(at: EpochMs): void {
    const change = this.#badData?.weigh(at);
    if (!this.#badData || change === undefined) return;
    this.changed = true;
    const { rule } = this.#badData;
    if (change === 'ends') this.around.desk.returned(this.guarantee.id, rule.kind, at);
    else {
      const { moreThan, withinMs } = rule;
      this.around.desk.raise(this.guarantee, rule, at, () => this.#grounds(rule.kind, clockMoment(at), { moreThan, withinMs }));
      this.#refreshDue();
    }
  }

  snapshot(): WatchSnapshot {
    return {
      evidence: this.evidence.snapshot(),
      standing: this.standing.snapshot(),
      period: this.#period.snapshot(),
      lost: this.lost.snapshot(),
      trail: this.trail.snapshot(),
      minutes: this.minutes.snapshot(),
      newest: this.newest,
      badData: this.#badData?.active ?? false,
      run: this.run.snapshot(),
      change: this.change?.snapshot(),
      away: this.#starts.away,
    };
  }

  restore(from: WatchSnapshot): void {
    this.standing.restore(from.standing);
    this.run.restore(from.run);
    this.#steps.tellRun();
    this.change?.restore(from.change);
    this.#starts.away = from.away;
    this.evidence.restore(from.evidence);
    this.#period.restore(from.period);
    this.lost.restore(from.lost);
    this.trail.restore(from.trail);
    this.minutes.restore(from.minutes);
    this.newest = from.newest;
    if (this.#badData) this.#badData.active = from.badData;
    this.changed = true;
  }

  #startLot(lot: string, size: number | undefined, moment: Moment): void {
    const belonging = this.#period.of(moment.at, lot);
    if (belonging === 'past') return;
    this.#setLotSize(size);
    if (belonging === 'begins anew') {
      this.#starts.begin('lot', lot, moment);
      this.#beginAnew(moment);
    }
    else this.evidence.weigh(moment);
  }

  #setLotSize(size: number | undefined): void {
    this.evidence.setLotSize?.(size);
    this.run.evidence?.setLotSize?.(size);
    this.#steps.tellRun();
  }

  #giveWindow(batch: Batch, from: number, to: number, moment: RecordMoment): void {
    const given = from === batch.from && to === batch.to ? batch : { ...batch, from, to };
    if (this.lost.none) this.evidence.take(given, moment);
    else this.#takeSingly(given, moment);
  }

  #productRuns(product: string, moment: Moment): void {
    if (!this.#starts.productRuns(product, moment)) return;
    this.#steps.tellRun();
    if (this.guarantee.looks === 'all looks') this.standing.beginAnew();
    this.evidence.weigh(moment);
  }

  #refreshDue(): void {
    this.around.mayBeDue(this.due());
  }

  /** While losses are in the window, each record may be the one that pushes the last of them out. */
  #takeSingly(batch: Batch, moment: RecordMoment): void {
    for (let place = batch.from; place < batch.to; place += 1) {
      this.evidence.take({ ...batch, from: place, to: place + 1 }, moment);
      this.#settleLost(moment);
    }
  }

  #beginAnew(moment: Moment): void {
    this.lost.clear();
    this.standing.lift('lost');
    this.#steps.tellRun();
    this.evidence.clear(moment);
  }

  #heard(moment: Moment): void {
    if (this.#silence?.hear(moment) === true) this.#refreshDue();
  }

  /** Lost data counts as trouble where people can be hurt: the state is unknown while they would be in the window. */
  #settleLost(moment: Moment): void {
    const { window } = this.guarantee;
    if (window.kind === 'units') this.lost.forget(this.evidence.position - window.units, -1);
    if (window.kind === 'time') this.lost.forget(-1, moment.at - window.spanMs);
    if (!this.guarantee.safetyRelevant) return;
    const { records } = this.lost;
    const blocked = this.standing.isBlockedBy('lost');
    if (records > 0) this.standing.block('lost', `${records} records of this window were lost.`);
    else this.standing.lift('lost');
    if (records > 0 !== blocked) this.evidence.weigh(moment);
  }

  #grounds(rule: AlarmRule['kind'], moment: Moment, figures: Readonly<Record<string, number>>): AlarmGrounds {
    const spans = rule === 'deterioration' ? this.change?.spans : isDecidedByRun(this.guarantee, rule) ? this.run.spans : undefined;
    return groundsOf(this.guarantee, rule, moment, { figures, ranges: spans?.ranges() ?? this.evidence.ranges(), ...this.around });
  }
}
