import type { Change } from '../../core/access/change.ts';
import { limitChanges } from '../../core/access/limit-changes.ts';
import { changeOfAct } from '../../core/access/change-of-act.ts';
import type { Decisions, Monitor } from '../../core/monitor/monitor.ts';
import { monitorFrom, snapshotOf } from '../../core/monitor/monitor-snapshot.ts';
import { binaryOfFrame } from '../../core/protocol/binary-frame-writer.ts';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { Plant } from '../../core/plant/plant.ts';
import type { EpochMs } from '../../core/units.ts';
import type { PlantClock } from '../clock/plant-clock.ts';
import type { Entry } from '../store/entry.ts';
import type { Group, KeptHappening } from '../store/group.ts';
import { untold, type Arrival } from './arrival.ts';
import { noteBody, tickBody } from './journal-form.ts';

/** What came of some arrivals: what has to become durable, and whom to tell then. */
export interface Outcome {
  readonly group: Group;
  /** Calls to make once the group is durable, in order. */
  readonly afterwards: readonly (() => void)[];
}

/** Reads a plant file that was checked before it was let in. */
export type PlantReader = (text: string, version: string) => Plant;

/** Lets arrivals through the monitor one by one and writes down what each of them was and did. */
export class Judge {
  readonly #clock: PlantClock | undefined;
  readonly #readPlant: PlantReader;
  #monitor: Monitor;
  #lastId: number;

  constructor(monitor: Monitor, lastId: number, clock: PlantClock | undefined, readPlant: PlantReader) {
    this.#monitor = monitor;
    this.#lastId = lastId;
    this.#clock = clock;
    this.#readPlant = readPlant;
  }

  /** The plant clock now. */
  get now(): EpochMs {
    return this.#clock?.now() ?? this.#monitor.now;
  }

  get monitor(): Monitor {
    return this.#monitor;
  }

  /** Id of the newest journal entry made. */
  get lastId(): number {
    return this.#lastId;
  }

  /** Judges arrivals in order; never throws for what came from outside. */
  judge(arrivals: readonly Arrival[]): Outcome {
    const sheet = new Sheet();
    for (const arrival of arrivals) this.#one(arrival, sheet);
    return { group: sheet.group(), afterwards: sheet.afterwards };
  }

  #one(arrival: Arrival, sheet: Sheet): void {
    switch (arrival.kind) {
      case 'frame':
        this.#frame(arrival, sheet);
        return;
      case 'barrier':
        sheet.afterwards.push(arrival.done);
        return;
      case 'tick':
        this.#monitor.advance(this.now);
        this.#keepIfDecided(sheet);
        return;
      case 'refused': {
        const { sender, frames } = arrival;
        this.#monitor.noteRefused(sender.stations, frames, this.now);
        this.#keep(sheet, { kind: 'refused', sourceId: sender.id, body: noteBody({ stations: sender.stations, frames }) });
        return;
      }
      case 'act': {
        const fault = this.#monitor.act(arrival.act, this.now);
        if (fault === undefined) {
          this.#keep(sheet, { kind: 'act', body: noteBody(arrival.act) });
          sheet.record(changeOfAct(arrival.act, this.#lastId));
        } else this.#keepIfDecided(sheet);
        sheet.afterwards.push(() => arrival.done(fault));
        return;
      }
      case 'plant': {
        const { text, version, who, why } = arrival;
        this.#monitor.advance(this.now);
        this.#keepIfDecided(sheet);
        const { plantVersion, plant } = this.#monitor;
        this.#monitor = monitorFrom(this.#readPlant(text, version), version, snapshotOf(this.#monitor));
        this.#keep(sheet, { kind: 'plant', body: noteBody({ text, version, clock: this.#clock ? 'time' : 'records' }) });
        const limits = limitChanges(plant.guarantees, this.#monitor.plant.guarantees);
        sheet.record({ kind: 'plant', who, what: 'plant file', before: { version: plantVersion, guarantees: limits.before }, after: { version, guarantees: limits.after }, why, entry: this.#lastId });
        sheet.afterwards.push(arrival.done);
      }
    }
  }

  #frame({ sender, frame, bytes, judged, durable }: Extract<Arrival, { kind: 'frame' }>, sheet: Sheet): void {
    const receipt = this.#monitor.takeFrame(sender.name, frame, this.#clock?.now());
    judged(receipt, frame);
    if (receipt.kind === 'taken') {
      const body = receipt.frame === frame && bytes !== undefined ? bytes : binaryOfFrame(receipt.frame);
      this.#keep(sheet, { kind: 'frame', sourceId: sender.id, firstSequence: receipt.frame.first, records: receipt.frame.records, body });
    } else this.#keepIfDecided(sheet);
    if (durable !== untold) sheet.afterwards.push(() => durable(receipt));
  }

  /** The clock alone decided something: that is an entry of its own, so that a replay decides it too. */
  #keepIfDecided(sheet: Sheet): void {
    const decisions = this.#monitor.decisions();
    if (decisions.happenings.length === 0 && decisions.minutes.length === 0) return;
    this.#write(sheet, { kind: 'tick', body: tickBody }, decisions);
  }

  #keep(sheet: Sheet, entry: NewEntry): void {
    this.#write(sheet, entry, this.#monitor.decisions());
  }

  #write(sheet: Sheet, { kind, sourceId, firstSequence, records, body }: NewEntry, decisions: Decisions): void {
    this.#lastId += 1;
    sheet.write({ id: this.#lastId, at: this.#monitor.now, kind, sourceId, firstSequence, records: records ?? 0, body }, decisions);
  }
}

interface NewEntry {
  readonly kind: Entry['kind'];
  readonly sourceId?: number;
  readonly firstSequence?: number;
  readonly records?: number;
  readonly body: Uint8Array;
}

/** Collects what one group has to make durable. */
class Sheet {
  readonly afterwards: (() => void)[] = [];
  readonly #entries: Entry[] = [];
  readonly #happenings: KeptHappening[] = [];
  readonly #alarms = new Map<number, Alarm>();
  readonly #minutes: Decisions['minutes'][number][] = [];
  readonly #changes: Change[] = [];

  write(entry: Entry, { happenings, minutes }: Decisions): void {
    this.#entries.push(entry);
    for (const happening of happenings) {
      this.#happenings.push({ journalId: entry.id, happening });
      if (happening.kind === 'alarm') this.#alarms.set(happening.alarm.id, happening.alarm);
    }
    for (const minute of minutes) this.#minutes.push(minute);
  }

  record(change: Change | undefined): void {
    if (change !== undefined) this.#changes.push(change);
  }

  group(): Group {
    return { entries: this.#entries, happenings: this.#happenings, alarms: [...this.#alarms.values()], minutes: this.#minutes, changes: this.#changes };
  }
}
