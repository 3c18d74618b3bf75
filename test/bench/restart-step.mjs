// One step of the restart benchmark in a fresh process, as a restart is: prints what it took as JSON.
import Database from 'better-sqlite3';
import { join } from 'node:path';
import { logOf } from '../../.build/server/ops/log.js';
import { untold } from '../../.build/server/pipeline/arrival.js';
import { PlantServer } from '../../.build/server/pipeline/plant-server.js';
import { recover } from '../../.build/server/pipeline/recover.js';
import { plantOfChecked, plantVersionOf } from '../../.build/server/plant-file.js';
import { openRegisterFile } from '../../.build/server/store/register-file.js';
import { openStore } from '../../.build/server/store/sqlite-store.js';
import { BinaryFrameReader } from '../../.build/core/protocol/binary-frame-reader.js';
import { storedLimits } from '../../.build/core/protocol/limits.js';
import { plantClock } from '../../.build/server/clock/plant-clock.js';
import { decodeBinary } from './bare-decode.mjs';
import { framesOf } from './frames.mjs';
import { processorTime } from './measure.mjs';
import { plantText, stationOf } from './plant-text.mjs';

const { step, data, streams, records, perFrame, shape } = JSON.parse(process.argv[2]);
const text = plantText(streams);
const version = plantVersionOf(text);
const plant = { text, version, plant: plantOfChecked(text, version) };
/** As the server does: the plant file it has read already is not read again. */
const readKnown = (stored, its) => (its === version ? plant.plant : plantOfChecked(stored, its));
const server = (store) => PlantServer.start({
  store, plant, clock: plantClock({ kind: 'wall' }), snapshotEntries: 1_000_000_000, log: logOf('silent'), onOutcome: untold, onFailure: (cause) => { throw cause; },
});

/** Wall and processor time from now until asked, ms. */
function taking() {
  const spent = processorTime();
  const begin = performance.now();
  return () => ({ ms: performance.now() - begin, cpuMs: spent() / 1_000 });
}

const steps = {
  /** Stores the records; a snapshot is kept at the end only where it is wanted. */
  async fill() {
    const register = openRegisterFile(data);
    await register.add({ name: 'gateway', stations: Array.from({ length: streams }, (_, stream) => stationOf(stream)), at: 0 });
    register.close();
    const store = await openStore(data);
    const running = await server(store);
    const pools = Array.from({ length: streams }, (_, stream) => framesOf({ shape, form: 'binary', stream, records: perFrame, variants: 4 }));
    const reader = new BinaryFrameReader(storedLimits);
    const sender = { id: 1, name: 'gateway', stations: [] };
    for (let frame = 0; frame * perFrame < records; frame += 1) {
      const bytes = Uint8Array.from(pools[frame % streams].numbered(Math.floor(frame / streams) % 4, 1 + frame * perFrame));
      running.inbox.put({ kind: 'frame', sender, frame: reader.read(bytes).value, bytes, judged: untold, durable: untold });
      if (frame % 500 === 499) await running.settled();
    }
    await running.settled();
    await store.close();
  },
  /** The ceiling: the same rows read in one loop by the same database driver, their columns decoded with nothing checked. */
  scan() {
    const database = new Database(join(data, 'vouchline.db'), { readonly: true });
    const took = taking();
    let seen = 0;
    for (const body of database.prepare('SELECT body FROM journal WHERE kind = 1 ORDER BY id').pluck().iterate()) {
      const { records: found, time, column } = decodeBinary(body, 'verdicts');
      seen += found + 0 * (time.length + column.length);
    }
    return { seen, ...took() };
  },
  async rebuild() {
    const store = await openStore(data); // its threads are started once, however much is stored: in the figure of the whole start
    const took = taking();
    const { records: seen } = await recover(store, readKnown);
    return { seen, ...took() };
  },
  /** What a start with a snapshot takes beside loading the program: the store opened, the plant file read, the state taken up. */
  async resume() {
    const took = taking();
    const store = await openStore(data);
    plantOfChecked(text, version);
    await server(store);
    return took();
  },
  /** Takes up the newest state and keeps a snapshot of it. */
  async snapshot() {
    const store = await openStore(data);
    const running = await server(store);
    await running.act({ kind: 'acknowledge', alarm: -1, by: 'bench', note: '' });
    running.inbox.put({ kind: 'refused', sender: { id: 1, name: 'gateway', stations: [stationOf(0)] }, frames: 1 });
    await running.stop();
    await store.close();
  },
};

console.log(JSON.stringify((await steps[step]()) ?? {}));
process.exit(0);
