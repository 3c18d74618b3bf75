import type { Correction, InspectionPart, Part } from '../../core/record/part.ts';
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

/** What one station sends, minute by minute. It knows its sequence, its buffer, and what it has looked at again. */
export class StationFeed {
  readonly station: DemoStation;
  readonly #plant: DemoPlant;
  #next: number;
  #opening: boolean;
  #waiting: Part[] = [];
  #secondLooks: SecondLook[] = [];

  /**
   * @param next    sequence of its first record
   * @param opening nobody has been told the line's product and lot yet
   */
  constructor(plant: DemoPlant, station: DemoStation, next: number, opening: boolean) {
    this.#plant = plant;
    this.station = station;
    this.#next = next;
    this.#opening = opening;
  }

  /** What the station sends at the end of a minute, in order; empty while its line stands or it cannot reach the server. Ask for each minute once, in order. */
  minute(minute: number): readonly Part[] {
    const { id } = this.station;
    const day = this.#plant.roster.dayOf(minute);
    const ofDay = minute - dayStart(minute);
    if (this.station.leads) this.#put(marksOf(this.#plant, this.station, minute, this.#opening));
    this.#opening = false;
    const found = inspectionsOf(this.#plant, this.station, minute);
    if (day.losses.some(({ station, at }) => station === id && at === ofDay)) this.#lose(found, minute);
    else this.#inspect(found, minute);
    this.#put(this.#secondLooksDue(minute));
    if (day.silences.some(({ station, from, until }) => station === id && from <= ofDay && ofDay < until)) return [];
    const sent = this.#waiting;
    this.#waiting = [];
    return sent;
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
