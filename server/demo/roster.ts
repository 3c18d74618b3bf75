import type { LineId, LotId, ProductId } from '../../core/record/part.ts';
import { dayMinutes, plantDay, type PlantDay } from './plant-day.ts';
import { usualProduct } from './stations.ts';

/** A line stands for `minutes` from minute `from` on. */
export interface Stop {
  readonly from: number;
  readonly minutes: number;
  readonly reason: string;
}

const lotMinutes = 120;
/** Lots end at odd hours, so that none ends at the handover of a shift. */
const lotOffset = 60;
const handovers = [6 * 60, 14 * 60, 22 * 60];
const breaks = [90, 9 * 60 + 30, 17 * 60 + 30];
/** Lines stand one after the other, never all at once. */
const delays: Readonly<Record<LineId, number>> = { A: 0, B: 8, K: 16 };

/** Time of the demo plant in whole minutes since midnight of its first day, which may be negative: what every line does in each. */
export class Roster {
  readonly #seed: number;
  readonly #days = new Map<number, PlantDay>();

  constructor(seed: number) {
    this.#seed = seed;
  }

  /** What happens on the day of a minute; before the first day nothing does. */
  dayOf(minute: number): PlantDay {
    const day = Math.floor(minute / dayMinutes);
    let known = this.#days.get(day);
    if (known === undefined) {
      known = day < 0 ? quietDay : plantDay(this.#seed, day);
      this.#days.set(day, known);
      this.#days.delete(day - 2); // Nobody asks for the day before yesterday.
    }
    return known;
  }

  /** The stop a line stands in during a minute, if it does. */
  stopAt(line: LineId, minute: number): Stop | undefined {
    return this.#stops(line, minute).find(({ from, minutes }) => from <= minute && minute < from + minutes);
  }

  productAt(line: LineId, minute: number): ProductId {
    const ofDay = minute - dayStart(minute);
    let product = usualProduct(line);
    for (const change of this.dayOf(minute).changeovers) if (change.line === line && change.at <= ofDay) product = change.product;
    return product;
  }

  /** Minute in which the lot of a minute began. */
  lotStart(minute: number): number {
    return Math.floor((minute - lotOffset) / lotMinutes) * lotMinutes + lotOffset;
  }

  /** Named after line, day and hour: A-3-0700. */
  lotAt(line: LineId, minute: number): LotId {
    const start = this.lotStart(minute);
    const hour = (start - dayStart(start)) / 60;
    return `${line}-${Math.floor(start / dayMinutes) + 1}-${String(hour).padStart(2, '0')}00`;
  }

  /** Minutes of the lot of a minute in which the line runs. */
  lotRunningMinutes(line: LineId, minute: number): number {
    const start = this.lotStart(minute);
    let running = 0;
    for (let at = start; at < start + lotMinutes; at += 1) if (this.stopAt(line, at) === undefined) running += 1;
    return running;
  }

  #stops(line: LineId, minute: number): Stop[] {
    const start = dayStart(minute);
    const delay = start + (delays[line] ?? 0);
    return [
      ...handovers.map((at) => ({ from: delay + at, minutes: 4, reason: 'Handover of the shift' })),
      ...breaks.map((at) => ({ from: delay + at, minutes: 15, reason: 'Break' })),
      ...this.dayOf(minute).changeovers.filter((change) => change.line === line)
        .map(({ at, product }) => ({ from: start + at, minutes: 12, reason: `Changeover to ${product}` })),
    ];
  }
}

const quietDay: PlantDay = { troubles: [], silences: [], losses: [], changeovers: [] };

/** Midnight before a minute. */
export const dayStart = (minute: number): number => Math.floor(minute / dayMinutes) * dayMinutes;
