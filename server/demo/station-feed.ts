import { frameOf } from '../../core/record/frame-of.ts';
import type { Correction, Frame, InspectionPart, Part } from '../../core/record/part.ts';
import { Chance } from './chance.ts';
import { dayStart } from './roster.ts';
import { inspectionsOf, marksOf, minuteMs, type DemoPlant } from './station-minute.ts';
import type { DemoStation } from './stations.ts';

/** Minutes until a rejected hose has been looked at again. */
const secondLookMinutes = 12;

/** A reject that a second look will pass: the record to correct, and the minute in which that is told. */
interface SecondLook {
  readonly due: number;
  readonly origin: InspectionPart['origin'];
  readonly sequence: number;
}

/**
 * What one station sends, minute by minute from the first on: always the same, so that a source that starts again
 * comes to the same frames with the same sequences. It knows its buffer, and what is to be looked at again.
 */
export class StationFeed {
  readonly station: DemoStation;
  readonly #plant: DemoPlant;
  /** Sequence of the next record, and of the first one that waits in the buffer. */
  #next = 1;
  #first = 1;
  #waiting: Part[] = [];
  #secondLooks: SecondLook[] = [];

  constructor(plant: DemoPlant, station: DemoStation) {
    this.#plant = plant;
    this.station = station;
  }

  /**
   * The frame the station sends at the end of a minute; none while its line stands or it cannot reach the server.
   *
   * @param minute of the demo plant; ask for every one once, in order, from 0 on
   */
  minute(minute: number): Frame | undefined {
    const { id } = this.station;
    const day = this.#plant.roster.dayOf(minute);
    const ofDay = minute - dayStart(minute);
    if (this.station.leads) this.#put(marksOf(this.#plant, this.station, minute, minute === 0));
    const found = inspectionsOf(this.#plant, this.station, minute);
    if (day.losses.some(({ station, at }) => station === id && at === ofDay)) this.#lose(found, minute);
    else this.#inspect(found, minute);
    this.#put(this.#secondLooksDue(minute));
    if (day.silences.some(({ station, from, until }) => station === id && from <= ofDay && ofDay < until)) return undefined;
    return this.#sent();
  }

  #sent(): Frame | undefined {
    if (this.#waiting.length === 0) return undefined;
    const frame = frameOf(this.#first, this.#waiting);
    this.#waiting = [];
    this.#first = this.#next;
    return frame;
  }

  #inspect(parts: readonly InspectionPart[], minute: number): void {
    for (const part of parts) {
      const stream = this.station.streams.find(({ characteristic }) => characteristic === part.origin.characteristic);
      if (part.kind === 'verdicts' && stream?.kind === 'verdicts' && stream.passedLater !== undefined) this.#lookAgain(part, stream.passedLater, minute);
      this.#put([part]);
    }
  }

  #lookAgain(part: Extract<InspectionPart, { kind: 'verdicts' }>, passed: number, minute: number): void {
    const chance = new Chance(this.#plant.seed, this.station.id, 'second look', minute);
    for (const place of part.nonconforming) {
      if (chance.share() < passed) this.#secondLooks.push({ due: minute + secondLookMinutes, origin: part.origin, sequence: this.#next + place });
    }
  }

  #secondLooksDue(minute: number): Correction[] {
    const due = this.#secondLooks.filter((look) => look.due <= minute);
    if (due.length > 0) this.#secondLooks = this.#secondLooks.filter((look) => look.due > minute);
    return due.map(({ origin, sequence }) => ({
      kind: 'correction', records: 1, origin, at: this.#plant.midnight + minute * minuteMs, corrects: sequence,
      finding: { kind: 'verdict', nonconforming: false }, reason: 'Looked at again by hand: the label was smeared, the hose is in order',
    }));
  }

  #lose(parts: readonly InspectionPart[], minute: number): void {
    const records = parts.reduce((sum, part) => sum + part.records, 0);
    if (records === 0) return;
    this.#put([{ kind: 'lost', records, at: this.#plant.midnight + minute * minuteMs, station: this.station.id, reason: 'The buffer of the station ran over' }]);
  }

  #put(parts: readonly Part[]): void {
    for (const part of parts) {
      this.#waiting.push(part);
      this.#next += part.records;
    }
  }
}
