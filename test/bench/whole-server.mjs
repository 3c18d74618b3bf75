// The real server in a process of its own, on a data directory made for it, and what it says of itself while it works.
import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { monitorEventLoopDelay } from 'node:perf_hooks';
import { logOf } from '../../.build/server/ops/log.js';
import { plantFile } from '../../.build/server/plant-file.js';
import { serveFrom } from '../../.build/server/serve.js';
import { settle } from '../../.build/server/settings/settings.js';
import { openRegisterFile } from '../../.build/server/store/register-file.js';
import { openStore } from '../../.build/server/store/sqlite-store.js';
import { answering } from './forked.mjs';
import { processorTime } from './measure.mjs';
import { plantText, probeStation, stationOf } from './plant-text.mjs';

const { data, streams, kind, probes, sources, groupEntries } = JSON.parse(process.argv[2]);
/** Each source has its share of the streams; the last one sends for the probes only, if there are any. */
function stationsOf(index) {
  if (probes > 0 && index === sources - 1) return Array.from({ length: probes }, (_, probe) => probeStation(probe));
  const sharing = probes > 0 ? sources - 1 : sources;
  return Array.from({ length: streams }, (_, stream) => stream).filter((stream) => sources === 1 || stream % sharing === index).map(stationOf);
}

rmSync(data, { recursive: true, force: true });
mkdirSync(data, { recursive: true });
const path = join(data, 'plant.yaml');
writeFileSync(path, plantText(streams, kind, probes));
const register = openRegisterFile(data);
const tokens = [];
for (let index = 0; index < sources; index += 1) tokens.push((await register.add({ name: `source-${index}`, stations: stationsOf(index), at: 0 })).token);
register.close();

const file = await plantFile(path);
if (!file.ok) throw new Error(file.fault.join('\n'));
const store = await openStore(data, groupEntries === undefined ? {} : { groupEntries });
const settings = settle({ data, port: '0', access: 'open', 'log-level': 'silent' }, {}, {});
const served = await serveFrom(store, { settings, clock: { kind: 'wall' }, demo: false, log: logOf('silent') }, path, file.value);

const delay = monitorEventLoopDelay({ resolution: 1 });
let spent = () => 0;

function heap() {
  globalThis.gc();
  const { heapUsed, arrayBuffers } = process.memoryUsage();
  return { heapUsed, arrayBuffers };
}

answering({
  heap,
  begin: () => {
    delay.reset();
    delay.enable();
    spent = processorTime();
  },
  end: () => {
    delay.disable();
    return { p50: delay.percentile(50) / 1e6, p99: delay.percentile(99) / 1e6, most: delay.max / 1e6, microseconds: spent() };
  },
}, { port: Number(new URL(served.address).port), tokens, heap: heap() }, async () => {
  await served.stop('the benchmark is over');
  rmSync(data, { recursive: true, force: true });
});
