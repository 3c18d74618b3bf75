import { chainedYieldLower, type StationCount } from '../bound/chained-yield.ts';
import type { Finding } from '../record/part.ts';
import type { EpochMs } from '../units.ts';
import type { Picture } from '../view/history.ts';
import type { Margin } from '../view/guarantee-view.ts';
import { joinedRanges, type RecordIdentity, type RecordRange } from '../window/record-identity.ts';
import type { ChainRule } from './chain-rule.ts';
import type { Batch, Bounds, CorrectionFate, Evidence } from './evidence.ts';
import { clockMoment, type Moment, type RecordMoment } from './moment.ts';
import type { Standing } from './standing.ts';
import { StationLink } from './station-link.ts';
import type { TimedUnitEvidence } from './timed-unit-evidence.ts';
import type { UnitEvidence } from './unit-evidence.ts';
import type { Weighing } from './weighing.ts';

/** Evidence on one station of a chain. */
export type StationEvidence = UnitEvidence | TimedUnitEvidence;

export interface ChainSettings {
  /** Ids of the stations in line order, two or more. */
  readonly stations: readonly string[];
  /** How people call them. */
  readonly stationName: (id: string) => string;
  readonly tail: Parameters<typeof chainedYieldLower>[1];
  /** The window of one station, which reports to the weighing. */
  readonly stationOf: (weighing: Weighing) => StationEvidence;
}

const none: Bounds = { estimate: undefined, bound: undefined, opposite: undefined };

/**
 * Evidence on the chained yield: a window for each station, one bound for all. It is weighed at each nonconforming unit
 * that comes or leaves, and at every 64th unit of a station: a demonstration may be told up to 63 conforming units late,
 * never early.
 */
export class ChainEvidence implements Evidence {
  readonly #settings: ChainSettings;
  readonly #rule: ChainRule;
  readonly #standing: Standing;
  readonly #windows: readonly StationEvidence[];
  /** While all windows change together the chain is not weighed. */
  #changing = false;

  constructor(settings: ChainSettings, rule: ChainRule, standing: Standing) {
    this.#settings = settings;
    this.#rule = rule;
    this.#standing = standing;
    this.#windows = settings.stations.map(() => settings.stationOf(new StationLink((moment) => this.weigh(moment), (at) => this.#leaveUntil(at))));
  }

  /** Units that every station has admitted: what has gone through the whole chain. */
  get position(): number {
    return this.#windows.reduce((least, { position }) => Math.min(least, position), Infinity);
  }

  take(batch: Batch, moment: RecordMoment): void {
    this.#windows[batch.station]?.take(batch, moment);
  }

  fill(batch: Batch, moment: RecordMoment): void {
    this.#windows[batch.station]?.fill(batch, moment);
  }

  correct(identity: RecordIdentity, station: number, finding: Finding, moment: Moment): CorrectionFate {
    return this.#windows[station]?.correct(identity, station, finding, moment) ?? 'not here';
  }

  clear(moment: Moment): void {
    this.#standing.beginAnew();
    this.#together(moment, (window) => window.clear(moment));
  }

  moveClock(moment: Moment): void {
    this.#leaveUntil(moment.at);
  }

  nextDue(): number {
    return this.#windows.reduce((due, window) => Math.min(due, window.nextDue()), Infinity);
  }

  weigh(moment: Moment): void {
    if (this.#changing) return;
    const ripe = this.#windows.every((window) => window.ripe);
    this.#standing.weigh(this.#rule.assess(this.#counts(), ripe, this.#standing.waiting), this.position, moment);
  }

  figures(): Readonly<Record<string, number>> {
    const counts = this.#counts();
    const total = { inspected: sumOf(counts, 'inspected'), nonconforming: sumOf(counts, 'nonconforming') };
    const each: Record<string, number> = {};
    for (const { station, inspected, nonconforming } of counts) {
      each[`inspected at ${station}`] = inspected;
      each[`nonconforming at ${station}`] = nonconforming;
    }
    const filled = Math.min(...counts.map(({ inspected }) => inspected)) / this.#rule.least;
    const limiting = this.#limiting();
    return {
      ...total,
      ...each,
      ...(filled < 1 ? { filled } : {}),
      ...(limiting === undefined ? {} : { limitingStation: this.#settings.stations.indexOf(limiting) + 1 }),
    };
  }

  ranges(): readonly RecordRange[] {
    const ranges = this.#windows.flatMap((window) => window.ranges());
    return joinedRanges(ranges.sort((a, b) => a.source - b.source || a.first - b.first));
  }

  bounds(): Bounds {
    const counts = this.#counts();
    if (counts.some(({ inspected }) => inspected === 0)) return none;
    const { estimate } = chainedYieldLower(counts, this.#settings.tail);
    return { estimate, bound: this.#rule.lower(counts), opposite: this.#rule.upper(counts) };
  }

  margin(): Margin {
    const fewest = Math.min(...this.#counts().map(({ inspected }) => inspected));
    return fewest < this.#rule.least ? { unitsToGather: this.#rule.least - fewest } : {};
  }

  warnings(): readonly string[] {
    const limiting = this.#limiting();
    const clusters = this.#windows.flatMap((window, index) => window.warnings().map((text) => `${this.#nameOf(this.#settings.stations[index] ?? '')}: ${text}`));
    return limiting === undefined ? clusters : [`${this.#nameOf(limiting)} holds the bound down most.`, ...clusters];
  }

  picture(): Picture {
    const limiting = this.#limiting();
    return {
      kind: 'stations',
      stations: this.#counts().map(({ station, inspected, nonconforming }) => ({
        id: station,
        name: this.#nameOf(station),
        inspected,
        nonconforming,
        yield: inspected === 0 ? 0 : (inspected - nonconforming) / inspected,
        limiting: station === limiting,
      })),
    };
  }

  snapshot(): unknown {
    return this.#windows.map((window) => window.snapshot());
  }

  restore(from: readonly never[]): void {
    this.#windows.forEach((window, index) => window.restore(from[index] as never));
  }

  /** Lets every step of time go that is over by `at`, for all stations at once, each at its own moment. */
  #leaveUntil(at: number): void {
    for (let due = this.nextDue(); due <= at; due = this.nextDue()) {
      const moment = clockMoment(due as EpochMs);
      this.#together(moment, (window) => {
        if (window.nextDue() <= due) window.moveClock(moment);
      });
    }
  }

  #together(moment: Moment, change: (window: StationEvidence) => void): void {
    this.#changing = true;
    for (const window of this.#windows) change(window);
    this.#changing = false;
    this.weigh(moment);
  }

  #nameOf(station: string): string {
    return this.#settings.stationName(station);
  }

  /** Station without which the bound would stand highest; undefined while one has seen nothing, or none has lost a unit. */
  #limiting(): string | undefined {
    const counts = this.#counts();
    if (counts.some(({ inspected }) => inspected === 0) || sumOf(counts, 'nonconforming') === 0) return undefined;
    return chainedYieldLower(counts, this.#settings.tail).limiting;
  }

  #counts(): StationCount[] {
    return this.#windows.map(({ window: { inspected, nonconforming } }, index) => ({
      station: this.#settings.stations[index] as string,
      inspected,
      nonconforming,
    }));
  }
}

function sumOf(counts: readonly StationCount[], column: 'inspected' | 'nonconforming'): number {
  return counts.reduce((sum, count) => sum + count[column], 0);
}
