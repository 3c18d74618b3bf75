import { parentPort, workerData } from 'node:worker_threads';
import { liveStations, type LiveStationsSetting } from './live-stations.ts';

/** What the stations' thread is started with. */
export type StationsStart = Omit<LiveStationsSetting, 'onFailure'>;

/** Wait for the last acknowledgements at most, ms. */
const lastWordMs = 3_000;

const fail = (cause: unknown): void => {
  // An error that nobody catches ends the thread and reaches whoever started it.
  setImmediate(() => {
    throw cause;
  });
};

const stations = await liveStations({ ...(workerData as StationsStart), onFailure: fail });
parentPort?.once('message', () => {
  stations.stop(lastWordMs).then(() => parentPort?.close(), fail);
});
