import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import WebSocket from 'ws';
import type { LiveMessage } from '../../core/live/message.ts';
import { liveProtocol } from '../../core/live/message.ts';
import { sourceProtocol, type ServerMessage } from '../../core/protocol/source-messages.ts';
import type { ClockSetting } from '../../server/clock/plant-clock.ts';
import { logOf } from '../../server/ops/log.ts';
import { serve, type Served } from '../../server/serve.ts';
import { settle } from '../../server/settings/settings.ts';
import { openRegisterFile } from '../../server/store/register-file.ts';

/** A data directory of its own for one test, gone afterwards. */
export function dataDirectory(plant: string): { path: string; remove: () => void } {
  const path = mkdtempSync(join(tmpdir(), 'vouchline-'));
  writeFileSync(join(path, 'plant.yaml'), plant);
  return { path, remove: () => rmSync(path, { recursive: true, force: true }) };
}

export async function tokenFor(data: string, name: string, stations: readonly string[]): Promise<string> {
  const register = openRegisterFile(data);
  const { token } = await register.add({ name: name, stations: stations, at: 0 });
  register.close();
  return token;
}

/** A real server in this process, on a free port of 127.0.0.1. */
export function servedOn(data: string, clock: ClockSetting = { kind: 'records' }, told: Readonly<Record<string, string>> = {}): Promise<Served> {
  const settings = settle({ data, port: '0', 'log-level': 'silent', access: 'open', ...told }, {}, {});
  return serve({ settings, clock, demo: false, log: logOf('silent') });
}

/** A WebSocket whose messages are awaited one by one. */
export class Talk<M> {
  readonly socket: WebSocket;
  readonly #heard: M[] = [];
  readonly #waiting: ((message: M) => void)[] = [];
  readonly closed: Promise<{ code: number }>;

  constructor(socket: WebSocket) {
    this.socket = socket;
    socket.on('message', (data) => {
      const message = JSON.parse((data as Buffer).toString('utf8')) as M;
      const next = this.#waiting.shift();
      if (next) next(message);
      else this.#heard.push(message);
    });
    this.closed = new Promise((resolve) => socket.on('close', (code) => resolve({ code })));
    socket.on('error', () => undefined);
  }

  next(): Promise<M> {
    const heard = this.#heard.shift();
    return heard === undefined ? new Promise((resolve) => this.#waiting.push(resolve)) : Promise.resolve(heard);
  }

  /** The next message that fits; others are passed over. */
  async until<N extends M>(fits: (message: M) => message is N): Promise<N>;
  async until(fits: (message: M) => boolean): Promise<M>;
  async until(fits: (message: M) => boolean): Promise<M> {
    for (;;) {
      const message = await this.next();
      if (fits(message)) return message;
    }
  }

  send(message: unknown): void {
    this.socket.send(message instanceof Uint8Array ? message : JSON.stringify(message));
  }
}

export function sourceTalk(address: string, token: string): Talk<ServerMessage> {
  return new Talk(new WebSocket(`${address.replace('http', 'ws')}/source`, sourceProtocol, { headers: { authorization: `Bearer ${token}` } }));
}

export function liveTalk(address: string): Talk<LiveMessage> {
  const talk = new Talk<LiveMessage>(new WebSocket(`${address.replace('http', 'ws')}/live`, liveProtocol));
  talk.socket.on('open', () => talk.send({ type: 'watch' }));
  return talk;
}
