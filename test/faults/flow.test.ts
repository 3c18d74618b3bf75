import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { WebSocket, WebSocketServer } from 'ws';
import { sourceLimits } from '../../core/protocol/limits.ts';
import { sourceProtocol } from '../../core/protocol/source-messages.ts';
import { SourceConnection } from '../../server/ingest/source-connection.ts';
import { logOf } from '../../server/ops/log.ts';
import { Inbox } from '../../server/pipeline/inbox.ts';
import { plantFile } from '../../server/plant-file.ts';
import { serveFrom, type Served } from '../../server/serve.ts';
import { settle } from '../../server/settings/settings.ts';
import { openMemoryStore } from '../../server/store/memory-store.ts';
import type { Store } from '../../server/store/store.ts';
import { leakPlant } from '../server/plants.ts';
import { dataDirectory } from '../server/serving.ts';
import { connectedSource, eventually, heard } from './harness.ts';
import { beginningAt, unevenFrame } from './frames.ts';

const mebibyte = 1_048_576;

/** A memory store whose commits wait while it is `shut`. */
class SlowStore {
  waitingBytes = 0;
  shut = false;
  readonly store: Store;
  #before = Promise.resolve();

  constructor() {
    const inner = openMemoryStore();
    const commit: Store['commit'] = (group) => {
      const bytes = group.entries.reduce((sum, { body }) => sum + body.length, 0);
      this.waitingBytes += bytes;
      const done = this.#before.then(async () => {
        if (this.shut) await eventually('the disk', () => !this.shut || undefined, 60_000);
        await inner.commit(group);
        this.waitingBytes -= bytes;
      });
      this.#before = done.catch(() => undefined);
      return done;
    };
    this.store = new Proxy(inner, {
      get: (target, key) => {
        if (key === 'commit') return commit;
        if (key === 'waitingBytes') return this.waitingBytes;
        const value = Reflect.get(target, key, target) as unknown;
        return typeof value === 'function' ? (value.bind(target) as unknown) : value;
      },
    });
  }
}

describe('a disk that falls behind', () => {
  let data: ReturnType<typeof dataDirectory>;
  let slow: SlowStore;
  let served: Served;

  beforeEach(async () => {
    data = dataDirectory(leakPlant);
    slow = new SlowStore();
    const path = join(data.path, 'plant.yaml');
    const file = await plantFile(path);
    if (!file.ok) throw new Error(file.fault[0]);
    const settings = settle({ data: data.path, port: '0', access: 'open', 'frames-in-flight': '10000' }, {}, {});
    served = await serveFrom(slow.store, { settings, clock: { kind: 'records' }, demo: false, log: logOf('silent') }, path, file.value);
  });
  afterEach(async () => {
    slow.shut = false;
    await served.stop('test over');
    data.remove();
  });

  it('holds the sources: what waits stays bounded, people are still answered, and all is acknowledged in the end', async () => {
    const { token } = await slow.store.sources.add({ name: 'leak-tester', stations: ['A.leak-test'], at: 0 });
    const { talk } = await connectedSource(served.address, token);
    slow.shut = true;
    const frame = unevenFrame();
    const frames = Math.ceil((60 * mebibyte) / frame.length);
    for (let i = 0; i < frames; i += 1) talk.send(beginningAt(frame, 1 + i * 65_536));
    let newest = -1;
    let calm = 0;
    await eventually('the sources to be held', () => {
      calm = slow.waitingBytes === newest && newest > 32 * mebibyte ? calm + 1 : 0;
      newest = slow.waitingBytes;
      return calm > 20 || undefined;
    }, 20_000);
    expect(slow.waitingBytes).toBeLessThan(36 * mebibyte);
    expect(talk.socket.bufferedAmount).toBeGreaterThan(4 * mebibyte); // The rest waits at the source.
    expect((await fetch(`${served.address}/healthz`)).status).toBe(200);
    slow.shut = false;
    for (let next = 1; next < 1 + frames * 65_536; ) {
      const answer = await heard(talk);
      if (answer.type !== 'ack') throw new Error(JSON.stringify(answer));
      next = answer.next;
    }
    expect(slow.waitingBytes).toBe(0);
  });
});

describe('a source that takes no answers', () => {
  let http: Server;
  let ends: WebSocket[];

  beforeEach(async () => {
    http = createServer();
    ends = [];
    const upgrades = new WebSocketServer({ server: http, perMessageDeflate: false, handleProtocols: () => sourceProtocol });
    upgrades.on('connection', (socket) => {
      ends.push(socket);
      const host = { inbox: new Inbox(), limits: sourceLimits, nextOf: () => 1, now: () => 0, frameRead: () => undefined, frameRefused: () => undefined };
      new SourceConnection(socket, { id: 1, name: 'leak-tester', stations: ['*'] }, host);
    });
    await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  });
  afterEach(() => {
    for (const end of ends) end.terminate();
    http.close();
  });

  it('is not read any more until it takes them, so that refusals cannot pile up', async () => {
    const socket = new WebSocket(`ws://127.0.0.1:${(http.address() as AddressInfo).port}`, sourceProtocol);
    await new Promise((resolve) => socket.on('open', resolve));
    let answers = 0;
    socket.on('message', () => {
      answers += 1;
    });
    socket.pause();
    const bad = 80_000;
    const junk = 'no frame'.repeat(30);
    for (let i = 0; i < bad; i += 1) socket.send(junk);
    const end = ends[0] as WebSocket;
    let most = 0;
    await eventually('the server to stop reading', () => {
      most = Math.max(most, end.bufferedAmount);
      return end.isPaused || undefined;
    });
    expect(socket.bufferedAmount).toBeGreaterThan(0);
    socket.resume();
    await eventually('all answers', () => {
      most = Math.max(most, end.bufferedAmount);
      return answers === bad || undefined;
    }, 20_000);
    // The bound, and what one read of the socket can still hold of small frames.
    expect(most).toBeLessThan(262_144 + 4 * mebibyte);
    socket.terminate();
  });
});
