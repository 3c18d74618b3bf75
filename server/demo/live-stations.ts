import type { Frame } from '../../core/record/part.ts';
import { SourceClient } from '../feed/source-client.ts';
import { repeatEvery } from '../repeat-every.ts';
import { demoPlant, minuteAt } from './demo-plant.ts';
import { StationFeed } from './station-feed.ts';
import { minuteMs } from './station-minute.ts';
import { demoStations } from './stations.ts';

export interface LiveStationsSetting {
  /** Of the server, e.g. http://127.0.0.1:7317 */
  readonly address: string;
  /** By station. */
  readonly tokens: ReadonlyMap<string, string>;
  readonly seed: number;
  /** Plant seconds a wall second, as the server's clock goes. */
  readonly rate: number;
  /** A station cannot go on. */
  readonly onFailure: (cause: unknown) => void;
}

/** The stations of the demo plant at work. */
export interface LiveStations {
  /** Resolves when what they sent is acknowledged (or `mostMs` have passed) and their connections are closed. */
  stop(mostMs: number): Promise<void>;
}

/** Wall time between looks at the clock, ms. */
const lookMs = 100;

/** Connects every station over the protocol for sources; each sends a frame at the end of its minute from then on. */
export async function liveStations(setting: LiveStationsSetting): Promise<LiveStations> {
  const { address, tokens, seed, rate, onFailure } = setting;
  const plant = demoPlant(seed);
  const socket = new URL(address.replace(/^http/, 'ws'));
  const stations = demoStations.map((station, index) => {
    const client = new SourceClient({ address: socket, token: tokens.get(station.id) ?? '', giveUpMs: Infinity });
    // Their minutes end one after the other, so that the board moves evenly.
    return new LiveStation(new StationFeed(plant, station), client, (index / demoStations.length) * minuteMs);
  });
  const [first] = await Promise.all(stations.map(({ client }) => client.open()));
  const heard = performance.now();
  const plantNow = (): number => (first?.at ?? 0) + (performance.now() - heard) * rate;
  const stopLooking = repeatEvery(lookMs, () => {
    const now = plantNow();
    for (const station of stations) station.sendUntil(minuteAt(plant, now - station.offsetMs), onFailure);
  });
  return {
    async stop(mostMs) {
      stopLooking();
      const settled = Promise.allSettled(stations.map(({ client }) => client.settled()));
      await Promise.race([settled, new Promise((resolve) => setTimeout(resolve, mostMs).unref())]);
      for (const { client } of stations) client.close();
    },
  };
}

class LiveStation {
  readonly client: SourceClient;
  readonly offsetMs: number;
  readonly #feed: StationFeed;
  #minute = 0;

  constructor(feed: StationFeed, client: SourceClient, offsetMs: number) {
    this.#feed = feed;
    this.client = client;
    this.offsetMs = offsetMs;
  }

  /** Sends what the minutes before `minute` have brought and the server does not have, as far as it grants room. */
  sendUntil(minute: number, onFailure: (cause: unknown) => void): void {
    const room = this.client.welcome?.window ?? 1;
    while (this.#minute < minute && this.client.kept < room) {
      const frame = this.#feed.minute(this.#minute);
      this.#minute += 1;
      if (frame && this.#isNew(frame)) this.client.send(frame).catch(onFailure);
    }
  }

  #isNew({ first, records }: Frame): boolean {
    return first + records > this.client.next;
  }
}
