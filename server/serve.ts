import { randomUUID } from 'node:crypto';
import type { Server } from 'node:https';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { setImmediate } from 'node:timers/promises';
import type { Logger } from 'pino';
import type { Refusal } from '../core/record/refusal.ts';
import { sourceLimits } from '../core/protocol/limits.ts';
import { plantClock, type ClockSetting } from './clock/plant-clock.ts';
import { SourceRefusals } from './access/source-refusals.ts';
import { accessOf } from './access/access-of.ts';
import { directorySetting } from './access/directory-setting.ts';
import { checkOpenAccess, checkPlainHttp } from './access/open-access.ts';
import { changeRoutes } from './http/change-routes.ts';
import { hopsOf } from './http/hops.ts';
import { httpServer } from './http/http-server.ts';
import { mayReadMeasures, serveOperations } from './http/operations.ts';
import { openApiRoute } from './http/open-api.ts';
import { plantFileRoutes } from './http/plant-files.ts';
import { plantRoutes } from './http/plant-routes.ts';
import { serveRoutes } from './http/serve-routes.ts';
import { sourceRoutes } from './http/source-routes.ts';
import { serveSockets } from './http/sockets.ts';
import { tlsPair, tlsReload } from './http/tls.ts';
import { UploadDesk } from './http/upload-desk.ts';
import { serveUploads } from './http/upload.ts';
import { SourceDesk } from './ingest/source-desk.ts';
import { DashboardDesk } from './live/dashboard-desk.ts';
import { LiveBoard } from './live/live-board.ts';
import { measuresOf } from './ops/measures.ts';
import type { Sender } from './pipeline/arrival.ts';
import { PlantServer } from './pipeline/plant-server.ts';
import { PlantDesk } from './plant-desk.ts';
import { plantFile, type PlantFileText } from './plant-file.ts';
import { repeatEvery, repeatInTurn } from './repeat-every.ts';
import type { Settings } from './settings/settings.ts';
import { openStore } from './store/sqlite-store.ts';
import type { Store } from './store/store.ts';

/** A running server. */
export interface Served {
  /** Where it answers, e.g. http://127.0.0.1:7317 */
  readonly address: string;
  /** Where the first account is made; undefined where there is one, or where access is open. */
  readonly firstLink: string | undefined;
  /** Reads the plant file anew; an invalid one changes nothing. @returns what is wrong with it, empty if it is in force */
  reload(): Promise<readonly string[]>;
  /** Ends on purpose: clients are told, nothing accepted is lost. */
  stop(reason: string): Promise<void>;
}

export interface ServeSetting {
  readonly settings: Settings;
  readonly clock: ClockSetting;
  readonly demo: boolean;
  readonly log: Logger;
}

/** A plant file that cannot be used; its faults are the message, a line each. */
export class BadPlantFile extends Error {}

/** Wall time between ticks of the plant clock and between updates of the dashboards, ms. */
const tickMs = 250;
const updateMs = 100;

/**
 * Starts a server on its data directory: brings back its state, then listens.
 *
 * @throws BadPlantFile, BadSetting, StoreError, DamagedAccessItem, or why it cannot listen; nothing is held then
 */
export async function serve(setting: ServeSetting): Promise<Served> {
  const { settings, log } = setting;
  if (!setting.demo) {
    checkOpenAccess(settings);
    checkPlainHttp(settings);
  }
  const path = settings.plant ?? join(settings.data, 'plant.yaml');
  const read = await plantFile(path);
  if (!read.ok) throw new BadPlantFile(read.fault.join('\n'));
  const store = await openStore(settings.data, { onRefused: (error) => log.fatal({ err: error }, 'nothing can be made durable any more') });
  try {
    return await serveFrom(store, setting, path, read.value);
  } catch (cause) {
    await store.close();
    throw cause;
  }
}

/**
 * The same on an open store, which it closes when it stops.
 *
 * @param path of the plant file, to read it anew
 * @param file what stands in it now
 */
export async function serveFrom(store: Store, { settings, clock: clockSetting, demo, log }: ServeSetting, path: string, file: PlantFileText): Promise<Served> {
  const clock = plantClock(clockSetting);
  const board = new LiveBoard({ boot: randomUUID(), clockRate: clock?.rate ?? 1, demo });
  const dashboards = new DashboardDesk(board);
  let up = false;

  const measures = measuresOf({
    waitingBytes: () => store.waitingBytes,
    sources: () => sources.connected,
    dashboards: () => dashboards.connected,
    standingAlarms: () => plant.monitor.desk.standing().length,
    guaranteesByState: () => countedByState(plant),
  });

  const plant = await PlantServer.start({
    store,
    plant: file,
    clock,
    snapshotEntries: settings.snapshotEntries,
    log,
    onOutcome: ({ group }) => {
      measures.commits.inc();
      const alarming = board.note(group.happenings.map(({ happening }) => happening), group.entries.at(-1)?.at ?? 0);
      if (alarming) dashboards.update(Date.now()); // Views wait for the next update, alarms do not.
    },
    onFailure: (cause) => {
      log.fatal({ err: cause }, 'stopped taking records');
      if (up) {
        sources.end('not-stored');
        uploads.close('notStored');
      }
      dashboards.stop('The server cannot store records any more.');
    },
  });
  const limits = { ...sourceLimits, framesInFlight: settings.framesInFlight, frameBytes: settings.frameBytes };
  const frameRead = (records: number): void => {
    measures.frames.inc();
    measures.records.inc(records);
  };
  const refusals = new SourceRefusals(store.access, Date.now, (cause) => log.error({ err: cause }, 'a refusal was not kept'));
  const frameRefused = (sender: Sender, refusal: Refusal | undefined): void => {
    measures.refusedFrames.inc();
    if (refusal !== undefined) refusals.noteRefused(sender.name, refusal);
  };
  const sources = new SourceDesk({ plant, store, limits, frameRead, frameRefused });
  const uploads = new UploadDesk({
    monitor: () => plant.monitor,
    act: (act) => plant.act(act),
    isConnected: (sender) => sources.isConnected(sender),
    onError: (cause) => log.debug({ err: cause }, 'the end of an upload was not kept'),
  });
  await uploads.endCutOff();
  up = true;
  board.begin(plant.monitor);
  board.remember([...(await store.endedAlarms({ limit: 200 }))].reverse());

  const hops = hopsOf(settings.trustedHops);
  const tls = tlsPair(settings);
  const ownHostsOnly = settings.access === 'open';
  const http = await httpServer({ hops, tls, ownHostsOnly, requestsPerSecond: settings.requestsPerSecond });
  const desk = new PlantDesk(path, file, async (taken, who, why) => {
    await plant.usePlant(taken, who, why);
    board.begin(plant.monitor);
    log.info({ version: taken.version }, 'plant file in force');
  });
  const access = await accessOf({
    file: store.access,
    settings,
    directory: directorySetting(settings),
    plantName: () => plant.monitor.plant.name,
    lines: () => plant.monitor.plant.lines.map(({ id }) => id),
    log,
  });
  const { guard } = access;
  access.onEnded((by) => dashboards.end(by));
  serveOperations(http, { store, measures, maySeeMeasures: (request) => mayReadMeasures(guard, request) });
  const routes = [
    ...plantRoutes({ store, monitor: () => plant.monitor, act: (act) => plant.act(act) }),
    ...plantFileRoutes({ inForce: () => desk.inForce, put: (...asked) => desk.put(...asked) }),
    ...changeRoutes(store.access),
    ...sourceRoutes({ sources: store.sources, isConnected: (source) => sources.isConnected(source), endWithdrawn: () => sources.endWithdrawn() }),
    ...access.routes,
  ];
  serveRoutes(http, [...routes, openApiRoute(routes)], guard);
  const closedBecause = (): string | undefined => (store.condition.kind === 'open' ? undefined : 'not-stored');
  const senderOf = (token: string): Promise<Sender | undefined> => sources.senderOf(token);
  const tokenUnknown = (what: string, address: string): Promise<void> => refusals.noteUnknown(what, address);
  serveUploads(http, {
    desk: uploads,
    put: (arrival) => plant.inbox.put(arrival),
    ledgerOf: (source) => plant.monitor.sources.of(source).ledger,
    limits,
    frameRead,
    senderOf,
    closedBecause,
    rowRefused: (sender, refusal) => sources.noteRefused(sender, refusal),
    tokenUnknown,
  });
  const stopSockets = serveSockets(http.server, {
    frameBytes: limits.frameBytes,
    mostDashboards: settings.dashboards,
    senderOf,
    tokenUnknown,
    onSource: (socket, sender) => {
      uploads.interrupt(sender);
      sources.connect(socket, sender);
    },
    guard,
    hops,
    ownHostsOnly,
    upgradesPerSecond: settings.upgradesPerSecond,
    mostOfAddress: settings.socketsPerAddress,
    onDashboard: (socket, caller) => dashboards.connect(socket, caller),
    closedBecause,
    onError: (cause) => log.debug({ err: cause }, 'a socket failed'),
  });
  await http.listen({ host: settings.host, port: settings.port });
  const { port } = http.server.address() as AddressInfo;

  const stops = [
    repeatEvery(tickMs, () => {
      sources.reportRefused();
      if (store.condition.kind === 'refused') plant.giveUp(store.condition.error);
      if (clock) plant.inbox.put({ kind: 'tick' });
    }),
    repeatInTurn(updateMs, async () => {
      for (const _ of board.refreshing(plant.monitor, plant.now)) await setImmediate();
      dashboards.update(Date.now());
    }),
    ...(tls === undefined ? [] : [repeatEvery(10_000, tlsReload(http.server as unknown as Server, settings, log))]),
    repeatEvery(1_000, () => void sources.endWithdrawn().catch((cause: unknown) => log.debug({ err: cause }, 'tokens were not looked up'))),
    repeatEvery(60_000, () => dashboards.endWhere((by) => access.isOver(by))),
    repeatEvery(settings.snapshotMinutes * 60_000, () => {
      plant.keepSnapshot().catch((cause: unknown) => log.error({ err: cause }, 'a snapshot was not kept'));
    }),
  ];

  async function reload(): Promise<readonly string[]> {
    const faults = await desk.reload();
    if (faults.length > 0) log.error({ faults }, 'the plant file is not valid; the old one stays in force');
    return faults;
  }

  let stopping: Promise<void> | undefined;
  async function stopOnce(reason: string): Promise<void> {
    log.info({ reason }, 'stopping');
    for (const stop of stops) stop();
    stopSockets();
    uploads.close('stopping');
    await sources.stop(reason);
    await plant.stop();
    dashboards.stop(reason);
    await http.close();
    await store.close();
    log.info('stopped');
  }

  const address = `${tls === undefined ? 'http' : 'https'}://${settings.host.includes(':') ? `[${settings.host}]` : settings.host}:${port}`;
  log.info({ address, version: file.version }, 'listening');
  return { address, firstLink: access.firstCode === undefined ? undefined : `${address}/join#${access.firstCode}`, reload, stop: (reason) => (stopping ??= stopOnce(reason)) };
}

function countedByState(plant: PlantServer): Readonly<Record<string, number>> {
  const counted = { gathering: 0, demonstrated: 0, undecided: 0, violated: 0, unknown: 0 };
  for (const watch of plant.monitor.watches) counted[watch.standing.state] += 1;
  return counted;
}
