import type { AlarmGrounds } from '../alarm/alarm.ts';
import { allowanceUsed } from '../evidence/allowance.ts';
import type { Batch, Evidence } from '../evidence/evidence.ts';
import { evidenceOf } from '../evidence/evidence-of.ts';
import { clockMoment, type Moment, type RecordMoment } from '../evidence/moment.ts';
import { Standing, type StandingSnapshot, type Surroundings } from '../evidence/standing.ts';
import { TipTrail, type TipTrailSnapshot } from '../evidence/tip-trail.ts';
import { ChangeWatch, type ChangeWatchSnapshot } from '../run/change-watch.ts';
import { changeSettingOf } from '../run/change-setting.ts';
import { guaranteeLineOf } from '../plant/guarantee-line.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import type { Correction, InspectionPart, LineMark } from '../record/part.ts';
import type { ShiftCalendar } from '../shift/shift-calendar.ts';
import type { EpochMs } from '../units.ts';
import type { BadDataLog } from './bad-data-log.ts';
import { BadDataWatch, type BadDataRule } from './bad-data-watch.ts';
import { groundsOf } from './grounds-of.ts';
import { LostRecords, type LostRecordsSnapshot } from './lost-records.ts';
import { MinuteTally, type MinuteCount } from './minute-tally.ts';
import { noteMinutes } from './note-minutes.ts';
import { Period, type PeriodSnapshot } from './period.ts';
import { silentFrom, type LineCondition, type WatchedStream } from './silence-watch.ts';
import type { Stretch } from './stretches.ts';

/** What a watch needs from its monitor. */
export interface WatchSurroundings extends Surroundings {
  readonly calendar: ShiftCalendar;
  readonly line: LineCondition;
  /** One per station of the guarantee, in line order. */
  readonly streams: readonly WatchedStream[];
  readonly badData: readonly BadDataLog[];
  /** The plant clock, ms. */
  readonly now: () => EpochMs;
  /** Something falls due at this moment that may not have been foreseen. */
  readonly mayBeDue: (at: number) => void;
  readonly plantVersion: () => string;
  readonly sourceName: (index: number) => string;
}

export interface WatchSnapshot {
  readonly evidence: unknown;
  readonly standing: StandingSnapshot;
  readonly period: PeriodSnapshot;
  readonly lost: LostRecordsSnapshot;
  readonly trail: TipTrailSnapshot;
  readonly minutes: readonly MinuteCount[];
  readonly newest: number;
  readonly badData: boolean;
  readonly change: ChangeWatchSnapshot | undefined;
}

type SilenceRule = Extract<AlarmRule, { kind: 'silence' }>;

/** Watches one guarantee: its evidence, its standing, and the rules that need no bound. */
export class Watch {
  readonly guarantee: Guarantee;
  readonly around: WatchSurroundings;
  readonly standing: Standing;
  readonly evidence: Evidence;
  readonly lost = new LostRecords();
  readonly trail = new TipTrail();
  readonly minutes = new MinuteTally();
  /** Set by everything that changes what a screen shows; whoever shows it resets it. */
  changed = true;
  /** Newest time of inspection, ms; 0 before the first record. */
  newest = 0;
  readonly #period: Period;
  readonly #silence: SilenceRule | undefined;
  readonly #badData: BadDataWatch | undefined;
  /** Watches for a rate that has risen, where the plant file asks for it. */
  readonly change: ChangeWatch | undefined;
  /** Nothing falls due before this; records only move it on, but for windows that go by time. */
  #dueKnown = Infinity;
  readonly #dueMovesWithRecords: boolean;

  constructor(guarantee: Guarantee, around: WatchSurroundings) {
    this.guarantee = guarantee;
    this.around = around;
    this.#dueMovesWithRecords = guarantee.window.kind === 'time' || guarantee.window.kind === 'shift';
    this.#period = new Period(guarantee.window.kind, around.calendar);
    this.#silence = guarantee.rules.find((rule): rule is SilenceRule => rule.kind === 'silence');
    const badData = guarantee.rules.find((rule): rule is BadDataRule => rule.kind === 'bad-data');
    this.#badData = badData && new BadDataWatch(badData, around.badData);
    this.standing = new Standing(guarantee, around, {
      figures: () => this.evidence.figures(),
      grounds: (rule, moment) => this.#grounds(rule, moment, this.evidence.figures()),
    });
    this.evidence = evidenceOf(guarantee, this.standing);
    const change = changeSettingOf(guarantee);
    this.change = change && new ChangeWatch(change, around.desk, (moment, figures) => this.#grounds('deterioration', moment, { ...this.evidence.figures(), ...figures }));
  }

  /** Takes a part's records in order. `late`: they fill a hole declared lost before. */
  take(part: InspectionPart, stretches: readonly Stretch[], base: Omit<Batch, 'from' | 'to' | 'part'>, moment: RecordMoment, late: boolean): void {
    this.changed = true;
    const { source, firstSequence, station } = base; // spreading it into each batch costs more than all the rest
    const lot = part.origin.lot ?? this.around.line.lot;
    for (const { from, to, minute } of stretches) {
      noteMinutes(this.minutes, this.guarantee, part, from, to, minute);
      moment.place = from;
      if (moment.at > this.newest) this.newest = moment.at;
      const belonging = this.#period.of(minute, lot);
      if (belonging === 'past') continue;
      if (belonging === 'begins anew') {
        if (this.guarantee.window.kind === 'lot') this.evidence.setLotSize?.(lot === this.around.line.lot ? this.around.line.lotSize : undefined);
        this.#beginAnew(moment);
      }
      this.#heard(moment);
      const batch: Batch = { part, from, to, source, firstSequence, station };
      if (late) this.evidence.fill(batch, moment);
      else if (this.lost.none) this.evidence.take(batch, moment);
      else this.#takeSingly(batch, moment);
      if (!late && this.change) this.change.take(batch, moment);
      if (moment.at > this.newest) this.newest = moment.at;
    }
    this.trail.wake(this.around.now());
    if (this.#dueKnown === Infinity || this.#dueMovesWithRecords) this.#refreshDue();
  }

  correct(correction: Correction, source: number, station: number, moment: Moment): ReturnType<Evidence['correct']> {
    this.changed = true;
    return this.evidence.correct({ source, sequence: correction.corrects }, station, correction.finding, moment);
  }

  /** Records of one of its stations are gone. */
  lose(source: number, first: number, records: number, moment: Moment): void {
    this.changed = true;
    this.lost.declare(source, first, records, this.evidence.position, moment.at);
    this.#settleLost(moment);
    this.#refreshDue();
  }

  fillLost(source: number, first: number, records: number, moment: Moment): void {
    this.lost.fill(source, first, records);
    this.#settleLost(moment);
  }

  /** A named person restarts the evidence after a declared event. */
  restart(moment: Moment): void {
    this.changed = true;
    this.#beginAnew(moment);
    this.change?.beginAnew();
  }

  /** The next moment at which the clock alone changes something; Infinity where nothing waits. */
  due(): number {
    let due = Math.min(this.#period.until, this.evidence.nextDue(), this.trail.due);
    if (this.#silence && !this.standing.isBlockedBy('silence')) due = Math.min(due, this.#silentFrom(this.#silence));
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
    if (this.#silence && !this.standing.isBlockedBy('silence') && this.#silentFrom(this.#silence) <= at) this.#fallSilent(this.#silence, moment);
    this.weighBadData(at);
    this.#settleLost(moment);
    if (this.trail.due <= at) this.trail.mark(at, this.tip());
  }

  /** Its line said something of itself. A line that stands is not silent; a lot that starts begins a lot's window. */
  lineMarked(mark: LineMark, moment: Moment): void {
    this.changed = true;
    const movedOn = mark.kind === 'changeover' && this.guarantee.product !== undefined && mark.product !== this.guarantee.product;
    if (mark.kind === 'line-stopped' || movedOn) this.#heard(moment);
    if (mark.kind === 'lot-start' && this.guarantee.window.kind === 'lot') this.#startLot(mark.lot, mark.size, moment);
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

  /** Allowance used by the bound now. */
  tip(): number | undefined {
    const { line, target } = guaranteeLineOf(this.guarantee.promise);
    return allowanceUsed(this.evidence.bounds().bound, line, target);
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
      change: this.change?.snapshot(),
    };
  }

  restore(from: WatchSnapshot): void {
    this.standing.restore(from.standing);
    this.evidence.restore(from.evidence);
    this.#period.restore(from.period);
    this.lost.restore(from.lost);
    this.trail.restore(from.trail);
    this.minutes.restore(from.minutes);
    if (from.change !== undefined) this.change?.restore(from.change);
    this.newest = from.newest;
    if (this.#badData) this.#badData.active = from.badData;
    this.changed = true;
  }

  #startLot(lot: string, size: number | undefined, moment: Moment): void {
    const belonging = this.#period.of(moment.at, lot);
    if (belonging === 'past') return;
    this.evidence.setLotSize?.(size);
    if (belonging === 'begins anew') this.#beginAnew(moment);
    else this.evidence.weigh(moment);
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
    this.evidence.clear(moment);
  }

  /** Lifts the silence once none of its stations is silent; that is when it was heard, whenever the record was inspected. */
  #heard(moment: Moment): void {
    if (!this.#silence || !this.standing.isBlockedBy('silence')) return;
    const now = this.around.now();
    if (this.#silentFrom(this.#silence) <= now) return;
    const heard: Moment = { source: moment.source, sequence: moment.sequence, at: moment.at > now ? moment.at : now };
    this.standing.lift('silence');
    this.evidence.weigh(heard);
    this.around.desk.returned(this.guarantee.id, 'silence', heard.at);
    this.#refreshDue();
  }

  #silentFrom(rule: SilenceRule): number {
    return silentFrom(this.around.streams, this.around.line, this.guarantee.product, rule.afterMs);
  }

  #fallSilent(rule: SilenceRule, moment: Moment): void {
    this.standing.block('silence', 'No record comes although the line is said to run.');
    this.evidence.weigh(moment);
    this.around.desk.raise(this.guarantee, rule, moment.at, () => this.#grounds('silence', moment, { silentMs: rule.afterMs }));
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
    return groundsOf(this.guarantee, rule, moment, { figures, ranges: this.evidence.ranges(), ...this.around });
  }
}
