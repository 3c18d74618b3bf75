import { createServer } from 'node:net';
import { Worker } from 'node:worker_threads';
import type { Logger } from 'pino';
import { serve, type Served } from '../serve.ts';
import type { Settings } from '../settings/settings.ts';
import { workerUrl } from '../store/worker-url.ts';
import type { DemoData } from './demo-data.ts';
import { livedNight } from './lived-night.ts';
import type { StationsStart } from './stations-thread.ts';

export interface DemoSetting {
  readonly settings: Settings;
  readonly data: DemoData;
  /** Plant seconds a wall second. */
  readonly rate: number;
  readonly log: Logger;
}

/** A running demo: a real server, and its plant beside it. */
export interface Demo {
  readonly served: Served;
  /** Rejects if the plant's stations cannot go on. */
  readonly failed: Promise<never>;
  /** The stations first, then the server. */
  stop(reason: string): Promise<void>;
}

/** Lives through the first night, then starts the server and, in a thread of their own, the stations. */
export async function runDemo({ settings, data, rate, log }: DemoSetting): Promise<Demo> {
  const { tokens, at } = await livedNight(data, log);
  const port = (await isFree(settings.host, settings.port)) ? settings.port : 0;
  const served = await serve({
    settings: { ...settings, access: 'open', data: data.directory, plant: data.plantFile, port },
    clock: { kind: 'fast', rate, start: at }, demo: true, log,
  });
  const start: StationsStart = { address: served.address, tokens, seed: data.seed, rate };
  const thread = new Worker(workerUrl('stations-thread', import.meta.url), { workerData: start });
  const ended = new Promise<void>((resolve) => thread.once('exit', () => resolve()));
  const failed = new Promise<never>((_resolve, reject) => thread.once('error', reject));
  failed.catch(() => undefined); // Whoever waits for it is told; stopping does not need to be.
  return {
    served,
    failed,
    async stop(reason) {
      thread.postMessage('stop');
      await ended;
      await served.stop(reason);
    },
  };
}

function isFree(host: string, port: number): Promise<boolean> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', (cause: NodeJS.ErrnoException) => (cause.code === 'EADDRINUSE' ? resolve(false) : reject(cause)));
    probe.listen({ host, port }, () => probe.close(() => resolve(true)));
  });
}
