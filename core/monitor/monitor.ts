import { AlarmDesk } from '../alarm/alarm-desk.ts';
import { clockMoment, RecordMoment } from '../evidence/moment.ts';
import type { Plant } from '../plant/plant.ts';
import type { RefusalCode } from '../protocol/refusals.ts';
import type { Correction, Frame, InspectionPart, LineMark, Lost, Part } from '../record/part.ts';
import { timeAt } from '../record/time-column.ts';
import { ShiftCalendar } from '../shift/shift-calendar.ts';
import type { EpochMs } from '../units.ts';
import type { Act, ActFault } from './act.ts';
import type { ClosedMinute } from './closed-minute.ts';
import { Clockwork } from './clockwork.ts';
import type { Happening } from './happening.ts';
import { piecesOf } from './pieces-of.ts';
import { inRecordOrder } from './record-order.ts';
import type { NotCounted, Receipt } from './receipt.ts';
import { Routes, type KnownRoute } from './routes.ts';
import type { SourceLedger } from './source-ledger.ts';
import { SourceList } from './source-list.ts';
import { cutByMinute, oneByOne, type Stretch } from './stretches.ts';
import { StreamList } from './stream-list.ts';
import { Watch } from './watch.ts';

/** How far ahead of the plant clock a time of inspection may lie: clocks differ, but not by more. */
export const believedAheadMs = 5 * 60_000;

/** What the monitor decided since it was last asked. */
export interface Decisions {
  readonly happenings: readonly Happening[];
  readonly minutes: readonly ClosedMinute[];
}

/**
 * The whole plant under watch: takes frames, people's acts and the clock in one order, and decides. The same inputs
 * in the same order give the same decisions, on the server, after a restart, and in a replay.
 */
export class Monitor {
  readonly plant: Plant;
  readonly plantVersion: string;
  readonly desk: AlarmDesk;
  readonly watches: readonly Watch[];
  readonly sources = new SourceList();
  readonly streams: StreamList;
  readonly calendar: ShiftCalendar;
  readonly #clockwork: Clockwork;
  readonly #routes: Routes;
  readonly #moment = new RecordMoment();
  /** Whether the plant clock follows the records of the frame in hand. */
  #follows = false;
  #happenings: Happening[] = [];
  /** Sequence of the record in hand when each happening was told. */
  #sequences: number[] = [];
  #minutes: ClosedMinute[] = [];

  constructor(plant: Plant, plantVersion: string) {
    this.plant = plant;
    this.plantVersion = plantVersion;
    const tell = (happening: Happening): void => this.#tell(happening);
    this.desk = new AlarmDesk(tell);
    this.calendar = new ShiftCalendar(plant.shifts, plant.timeZone);
    this.streams = new StreamList(plant.lines.map(({ id }) => id));
    const stationNames = new Map(plant.lines.flatMap(({ stations }) => stations.map(({ id, name }) => [id, name] as const)));
    this.watches = plant.guarantees.map(
      (guarantee) =>
        new Watch(guarantee, {
          tell,
          desk: this.desk,
          calendar: this.calendar,
          line: this.streams.line(guarantee.line),
          streams: guarantee.stations.map((station, index) => ({ station, activity: this.streams.activity(station, guarantee.characteristics[index] ?? '') })),
          badData: guarantee.stations.map((station) => this.streams.badData(station)),
          now: () => this.now,
          mayBeDue: (at) => this.#clockwork.mayBeDue(at),
          plantVersion: () => this.plantVersion,
          sourceName: (index) => this.sources.nameOf(index),
          stationName: (id) => stationNames.get(id) ?? id,
        }),
    );
    this.#routes = new Routes(plant, this.watches, this.streams);
    this.#clockwork = new Clockwork(this.watches, (minute) => this.#minutes.push(minute));
  }

  /** The plant clock as the monitor knows it: it never goes back. */
  get now(): EpochMs {
    return this.#clockwork.now;
  }

  /** Takes out what was decided since the last call, in order. */
  decisions(): Decisions {
    const decided = { happenings: this.#happenings, minutes: this.#minutes };
    if (this.#happenings.length > 0) {
      this.#happenings = [];
      this.#sequences = [];
    }
    if (this.#minutes.length > 0) this.#minutes = [];
    return decided;
  }

  /**
   * Takes a frame of a source. A frame that is not taken changes nothing but the clock.
   *
   * @param at plant clock; undefined where the clock follows the records: it then goes on record by record, so that
   *           how records were cut into frames decides nothing
   */
  takeFrame(source: string, frame: Frame, at: EpochMs | undefined): Receipt {
    if (at !== undefined) this.advance(at);
    this.#follows = at === undefined;
    const { index, ledger } = this.sources.of(source);
    const { kind } = ledger.place(frame.first, frame.records);
    const notCounted: NotCounted[] = [];
    if (kind === 'gap') return { kind: 'gap', next: ledger.next };
    if (kind === 'new') {
      this.#take(source, index, ledger, frame, false, notCounted);
      return { kind: 'taken', frame, next: ledger.next, notCounted };
    }
    const pieces = piecesOf(ledger, frame).filter((piece) => piece.kind !== 'repeat');
    for (const piece of pieces) this.#take(source, index, ledger, piece.frame, piece.kind === 'late', notCounted);
    const [only] = pieces;
    if (only === undefined) return { kind: 'repeated', next: ledger.next };
    return { kind: 'taken', frame: pieces.length === 1 ? only.frame : frame, next: ledger.next, notCounted };
  }

  /** The plant clock has come to `at`: everything that fell due until then happens, each at its own moment. */
  advance(at: EpochMs): void {
    this.#clockwork.advance(at);
  }

  /** Takes up the clock of a snapshot. */
  resumeClock(now: number): void {
    this.#clockwork.restore(now);
  }

  /** When the clock alone will change something next, ms; may be too early, never too late. */
  get nextDue(): number {
    return this.#clockwork.nextDue;
  }

  /** @returns undefined if the act took effect, else why it changed nothing */
  act(act: Act, at: EpochMs): ActFault | undefined {
    this.advance(at);
    switch (act.kind) {
      case 'acknowledge': {
        const known = this.desk.standing().find(({ id }) => id === act.alarm);
        if (!known) return 'no-such-alarm';
        if (!this.desk.acknowledge(act.alarm, act.by, act.note, this.now)) return 'already-acknowledged';
        this.#markChanged(known.guarantee);
        return undefined;
      }
      case 'restart': {
        const watch = this.watches.find(({ guarantee }) => guarantee.id === act.guarantee);
        if (!watch) return 'no-such-guarantee';
        this.#tell({ kind: 'restart', at: this.now, guarantee: act.guarantee, by: act.by, reason: act.reason, run: watch.run.number + 1 });
        watch.restart(act.by, act.reason, clockMoment(this.now));
        return undefined;
      }
      case 'upload-begun':
        this.sources.of(act.source).ledger.beginUpload(act.key, act.mark);
        return undefined;
      case 'upload-ended':
        this.sources.of(act.source).ledger.endUpload();
        return undefined;
    }
  }

  /** Frames of a source were refused: they count as bad data at every station it sends for. */
  noteRefused(stations: readonly string[], frames: number, at: EpochMs): void {
    this.advance(at);
    for (const station of stations) this.#noteBad(station, frames);
  }

  #tell(happening: Happening): void {
    this.#happenings.push(happening);
    this.#sequences.push(this.#moment.sequence);
  }

  #take(name: string, source: number, ledger: SourceLedger, frame: Frame, late: boolean, notCounted: NotCounted[]): void {
    let sequence = frame.first;
    for (const part of frame.parts) {
      if (this.#follows && !('time' in part)) this.advance(part.at as EpochMs);
      const known = notCounted.length;
      this.#takePart(part, source, sequence, late, notCounted, ledger);
      for (const { sequence: first, records, code } of notCounted.slice(known)) {
        this.#tell({ kind: 'set-aside', at: this.now, source: name, sequence: first, records, reason: code });
      }
      sequence += part.records;
    }
    if (late) ledger.fill(frame.first, frame.records);
    else ledger.advance(sequence);
  }

  #takePart(part: Part, source: number, sequence: number, late: boolean, notCounted: NotCounted[], ledger: SourceLedger): void {
    switch (part.kind) {
      case 'verdicts':
      case 'tallies':
      case 'exposures':
      case 'measurements':
        this.#takeInspections(part, source, sequence, late, notCounted);
        return;
      case 'correction':
        this.#correct(part, source, sequence, notCounted);
        return;
      case 'lost':
        this.#lose(part, source, sequence, ledger);
        return;
      default:
        this.#markLine(part, sequence, notCounted);
    }
  }

  #takeInspections(part: InspectionPart, source: number, sequence: number, late: boolean, notCounted: NotCounted[]): void {
    const route = this.#routes.of(part.origin);
    if (route.kind !== 'known') {
      this.#setAside(notCounted, sequence, part.records, route.kind, route.kind === 'unknown-product' ? part.origin.station : undefined);
      return;
    }
    const { stretches, implausible } = cutByMinute(part.time, part.records, this.#follows ? Infinity : this.now + believedAheadMs);
    for (const { from, to } of implausible) this.#setAside(notCounted, sequence + from, to - from, 'time-implausible', part.origin.station);
    if (stretches.length === 0) return;
    this.#moment.begin(this.sources.nameOf(source), sequence, part.time);
    if (this.#follows) for (const single of oneByOne(stretches)) this.#takeStretches(route, part, [single], source, sequence, late);
    else this.#takeStretches(route, part, stretches, source, sequence, late);
  }

  #takeStretches(route: KnownRoute, part: InspectionPart, stretches: readonly Stretch[], source: number, sequence: number, late: boolean): void {
    const heardUntil = this.#follows ? timeAt(part.time, (stretches[0] as Stretch).to - 1) : this.now;
    if (this.#follows) this.advance(timeAt(part.time, (stretches[0] as Stretch).from) as EpochMs);
    route.activity.at = Math.max(this.now, heardUntil);
    route.activity.product = part.origin.product;
    const told = this.#happenings.length;
    for (const { watch, station } of route.watches) {
      watch.take(part, stretches, { source, firstSequence: sequence, station }, this.#moment, late);
      if (late) watch.fillLost(source, sequence, part.records, this.#moment);
    }
    if (this.#happenings.length > told + 1) this.#putInRecordOrder(told);
    this.advance(heardUntil as EpochMs);
    if (route.watches.length > 0) this.#clockwork.minuteOpen();
  }

  /** What lives on the same records (guarantees, windows, detectors) decides in the order of the records, not one after the other. */
  #putInRecordOrder(from: number): void {
    const { happenings, alarmIds } = inRecordOrder(this.#happenings.slice(from), this.#sequences.slice(from));
    this.#happenings.splice(from, happenings.length, ...happenings);
    this.#sequences.splice(from, happenings.length, ...this.#sequences.slice(from).sort((a, b) => a - b));
    if (alarmIds.size > 0) this.desk.renumber(alarmIds);
  }

  #correct(part: Correction, source: number, sequence: number, notCounted: NotCounted[]): void {
    const route = this.#routes.of(part.origin);
    if (route.kind !== 'known') {
      this.#setAside(notCounted, sequence, 1, route.kind, route.kind === 'unknown-product' ? part.origin.station : undefined);
      return;
    }
    const moment = { at: part.at as EpochMs, source: this.sources.nameOf(source), sequence };
    const fates = route.watches.map(({ watch, station }) => watch.correct(part, source, station, moment));
    if (fates.includes('corrected') || fates.length === 0) return;
    this.#setAside(notCounted, sequence, 1, 'correction-unmatched', fates.includes('another kind') ? part.origin.station : undefined);
  }

  #lose(part: Lost, source: number, sequence: number, ledger: SourceLedger): void {
    ledger.declareLost(sequence, part.records);
    const moment = clockMoment(this.now);
    for (const watch of this.watches) {
      if (watch.guarantee.stations.includes(part.station)) watch.lose(source, sequence, part.records, moment);
    }
    this.#noteBad(part.station, part.records);
  }

  #markLine(mark: LineMark, sequence: number, notCounted: NotCounted[]): void {
    const known = this.streams.knownLine(mark.line);
    if (!known) {
      this.#setAside(notCounted, sequence, 1, 'unknown-line', undefined);
      return;
    }
    this.#tell(this.streams.mark(known, mark, this.now));
    for (const watch of this.watches) if (watch.guarantee.line === mark.line) watch.lineMarked(mark, clockMoment(this.now));
  }

  #setAside(notCounted: NotCounted[], sequence: number, records: number, code: RefusalCode, station: string | undefined): void {
    notCounted.push({ sequence, records, code });
    if (station !== undefined) this.#noteBad(station, records);
  }

  #noteBad(station: string, records: number): void {
    this.streams.badData(station).note(this.now, records);
    for (const watch of this.watches) if (watch.guarantee.stations.includes(station)) watch.weighBadData(this.now);
  }

  #markChanged(guarantee: string): void {
    for (const watch of this.watches) if (watch.guarantee.id === guarantee) watch.changed = true;
  }
}
