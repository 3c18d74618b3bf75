import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { ServerMessage } from '../../core/protocol/source-messages.ts';
import { leakPlant } from '../server/plants.ts';
import { dataDirectory, liveTalk, tokenFor, type Talk } from '../server/serving.ts';
import { connectedSource, ConnectionEnded, endAll, heard, ServerProcess, within } from './harness.ts';
import { leakFrame } from './frames.ts';

const records = 20;
const inFlight = 60;
let data: ReturnType<typeof dataDirectory>;
let token: string;

beforeEach(async () => {
  data = dataDirectory(leakPlant);
  token = await tokenFor(data.path, 'leak-tester', ['A.leak-test']);
});
afterEach(() => {
  endAll();
  data.remove();
});

/** Sends without pause, nearly as many frames in flight as are granted, until the server says goodbye. */
async function load(talk: Talk<ServerMessage>, next: number, onAcknowledged: (next: number) => void): Promise<{ acknowledged: number; said: string | undefined }> {
  let acknowledged = next;
  let sent = next;
  let said: string | undefined;
  try {
    for (;;) {
      for (; sent < acknowledged + inFlight * records; sent += records) talk.send(leakFrame(sent, records));
      const answer = await heard(talk);
      if (answer.type === 'ack') acknowledged = answer.next;
      else said = answer.type === 'stopping' ? answer.reason : JSON.stringify(answer);
      onAcknowledged(acknowledged);
    }
  } catch (cause) {
    if (!(cause instanceof ConnectionEnded)) throw cause;
    return { acknowledged, said };
  }
}

describe('a server told to stop under load', () => {
  it('answers what it took, tells sources and dashboards, ends with 0, and has every acknowledged record', async () => {
    const server = ServerProcess.start(data.path);
    const address = await server.address;
    const live = liveTalk(address);
    await live.until(({ type }) => type === 'snapshot');
    const { talk, next } = await connectedSource(address, token);
    let told = false;
    const loaded = load(talk, next, (acknowledged) => {
      if (told || acknowledged < 20_000) return;
      told = true;
      server.signal('SIGTERM');
    });
    expect(await within('the dashboard to be told', live.until(({ type }) => type === 'stopping'))).toEqual({ type: 'stopping', reason: 'SIGTERM' });
    const { acknowledged, said } = await within('the source to be told', loaded);
    expect(said).toBe('SIGTERM');
    expect((await talk.closed).code).toBe(1001);
    expect(await within('the server to end', server.ended)).toEqual({ code: 0, signal: null });
    expect(server.complaint).toBe('');
    const again = ServerProcess.start(data.path);
    const welcome = await connectedSource(await again.address, token);
    // Stopped in order, it answered all that it made durable: no more and no less is there.
    expect(welcome.next).toBe(acknowledged);
    welcome.talk.socket.terminate();
  });
});
