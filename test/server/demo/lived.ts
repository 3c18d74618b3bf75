import { readFileSync } from 'node:fs';
import type { Happening } from '../../../core/monitor/happening.ts';
import { Monitor } from '../../../core/monitor/monitor.ts';
import { readPlant } from '../../../core/plant/read-plant.ts';
import type { Frame } from '../../../core/record/part.ts';
import { demoPlant, joinMinute, momentOf } from '../../../server/demo/demo-plant.ts';
import { StationFeed } from '../../../server/demo/station-feed.ts';
import { demoStations } from '../../../server/demo/stations.ts';

const plantText = readFileSync(new URL('../../../server/demo/hose-works.yaml', import.meta.url), 'utf8');

/** The demo plant under watch, without server: as people would see it, minute by minute. */
export class Lived {
  readonly monitor: Monitor;
  readonly happenings: Happening[] = [];
  readonly frames: { readonly station: string; readonly minute: number; readonly frame: Frame }[] = [];
  readonly #plant;
  readonly #feeds: readonly StationFeed[];
  #minute = 0;

  constructor(seed: number) {
    const read = readPlant(plantText, 'demo');
    if (!read.ok) throw new Error(read.fault.map(({ sentence }) => sentence).join('\n'));
    this.monitor = new Monitor(read.value.plant, 'demo');
    this.#plant = demoPlant(seed);
    this.#feeds = demoStations.map((station) => new StationFeed(this.#plant, station));
  }

  /** Lives until a minute of the plant; at the join the night shift acknowledges what is over. */
  until(minute: number): this {
    for (; this.#minute < minute; this.#minute += 1) {
      if (this.#minute === joinMinute) this.#acknowledgePast();
      const end = momentOf(this.#plant, this.#minute + 1);
      for (const feed of this.#feeds) {
        const frame = feed.minute(this.#minute);
        if (frame === undefined) continue;
        this.frames.push({ station: feed.station.id, minute: this.#minute, frame });
        this.monitor.takeFrame(feed.station.id, frame, end);
      }
      this.monitor.advance(end);
      this.happenings.push(...this.monitor.decisions().happenings);
    }
    return this;
  }

  /** Changes of one alarm with the seconds after the join at which people see them, one second a minute. */
  alarm(guarantee: string, rule: string): readonly (readonly [change: string, second: number])[] {
    return this.happenings.flatMap((one) =>
      one.kind === 'alarm' && one.alarm.guarantee === guarantee && one.alarm.rule === rule && this.#second(one.at) > 0
        ? [[one.change, this.#second(one.at)] as const]
        : []);
  }

  /** States of one guarantee after the join. */
  states(guarantee: string): readonly (readonly [state: string, second: number])[] {
    return this.happenings.flatMap((one) =>
      one.kind === 'evidence' && one.guarantee === guarantee && this.#second(one.at) > 0 ? [[one.to, this.#second(one.at)] as const] : []);
  }

  #second(at: number): number {
    return (at - momentOf(this.#plant, joinMinute)) / 60_000;
  }

  #acknowledgePast(): void {
    for (const { id, state } of this.monitor.desk.standing()) {
      if (state.kind === 'returned') this.monitor.act({ kind: 'acknowledge', alarm: id, by: 'Night shift', note: '' }, this.monitor.now);
    }
    this.monitor.decisions();
  }
}
