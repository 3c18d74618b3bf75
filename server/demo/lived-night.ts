import type { Logger } from 'pino';
import type { EpochMs } from '../../core/units.ts';
import { PlantServer } from '../pipeline/plant-server.ts';
import { untold, type Sender } from '../pipeline/arrival.ts';
import { plantFile } from '../plant-file.ts';
import { BadPlantFile } from '../serve.ts';
import { openStore } from '../store/sqlite-store.ts';
import type { Store } from '../store/store.ts';
import type { DemoData } from './demo-data.ts';
import { demoPlant, joinMinute, momentOf } from './demo-plant.ts';
import { StationFeed } from './station-feed.ts';
import { demoStations } from './stations.ts';

/** What the demo goes on from. */
export interface LivedNight {
  /** Token of each station's source, by station. */
  readonly tokens: ReadonlyMap<string, string>;
  /** The plant clock: people join at this moment. */
  readonly at: EpochMs;
}

/**
 * Lets the demo plant live through its first night, fast, so that people find windows filled and a past on every
 * chart; the plant clock follows the records. Where the night (or more) was lived before, only tokens are made anew.
 *
 * @throws BadPlantFile, StoreError
 */
export async function livedNight(data: DemoData, log: Logger): Promise<LivedNight> {
  const plantText = await plantFile(data.plantFile);
  if (!plantText.ok) throw new BadPlantFile(plantText.fault.join('\n'));
  const store = await openStore(data.directory);
  try {
    const server = await PlantServer.start({
      store, plant: plantText.value, clock: undefined, snapshotEntries: Infinity, log, onOutcome: untold, onFailure: (cause) => log.fatal({ err: cause }, 'the night could not be stored'),
    });
    const plant = demoPlant(data.seed);
    const joined = momentOf(plant, joinMinute);
    const { senders, tokens } = await sourcesOf(store, joined);
    if (server.now < joined) await live(server, demoStations.map((station) => new StationFeed(plant, station)), senders);
    await acknowledgePast(server);
    await server.stop();
    return { tokens, at: Math.max(joined, server.now) as EpochMs };
  } finally {
    await store.close();
  }
}

/** A source for every station, with a token made now. */
async function sourcesOf({ sources }: Store, at: number): Promise<{ senders: ReadonlyMap<string, Sender>; tokens: ReadonlyMap<string, string> }> {
  const known = new Set((await sources.list()).map(({ name }) => name));
  const senders = new Map<string, Sender>();
  const tokens = new Map<string, string>();
  for (const { id: station } of demoStations) {
    const { source, token } = known.has(station) ? await sources.rotate({ name: station }) : await sources.add({ name: station, stations: [station], at });
    senders.set(station, { id: source.id, name: source.name, stations: source.stations });
    tokens.set(station, token);
  }
  return { senders, tokens };
}

/** Minutes of the plant that may wait for the disk. */
const minutesAhead = 30;

async function live(server: PlantServer, feeds: readonly StationFeed[], senders: ReadonlyMap<string, Sender>): Promise<void> {
  for (let minute = 0; minute < joinMinute; minute += 1) {
    for (const feed of feeds) {
      const frame = feed.minute(minute);
      const sender = senders.get(feed.station.id);
      if (frame && sender) server.inbox.put({ kind: 'frame', sender, frame, bytes: undefined, judged: untold, durable: untold });
    }
    if (minute % minutesAhead === 0) await server.settled();
  }
  await server.settled();
}

/** The night shift has seen its alarms: nobody joins a plant with a list of what is over. */
async function acknowledgePast(server: PlantServer): Promise<void> {
  for (const { id, state } of server.monitor.desk.standing()) {
    if (state.kind === 'returned') await server.act({ kind: 'acknowledge', alarm: id, by: 'Night shift', note: 'Windows were still filling after midnight' });
  }
}
