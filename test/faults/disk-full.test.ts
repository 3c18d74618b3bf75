import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { ServerMessage } from '../../core/protocol/source-messages.ts';
import { leakPlant } from '../server/plants.ts';
import { dataDirectory, liveTalk, tokenFor, type Talk } from '../server/serving.ts';
import { connectedSource, ConnectionEnded, endAll, getJson, heard, mainFile, postJson, serveFlags, ServerProcess, within } from './harness.ts';
import { leakFrame } from './frames.ts';

const records = 4_000;
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

/** Every third unit listed: frames that take room. */
const fat = (first: number): Uint8Array => leakFrame(first, records, Array.from({ length: Math.floor(records / 3) }, (_, i) => i * 3));

async function loadUntilRefused(talk: Talk<ServerMessage>, next: number): Promise<{ acknowledged: number; refused: readonly ServerMessage[]; acknowledgedAfter: number }> {
  let acknowledged = next;
  let acknowledgedAfter = 0;
  const refused: ServerMessage[] = [];
  try {
    for (let sent = next; ; ) {
      for (; sent < acknowledged + 6 * records; sent += records) talk.send(fat(sent));
      const answer = await heard(talk);
      if (answer.type !== 'ack') refused.push(answer);
      else if (refused.length > 0) acknowledgedAfter += 1;
      else acknowledged = answer.next;
    }
  } catch (cause) {
    if (!(cause instanceof ConnectionEnded)) throw cause;
    return { acknowledged, refused, acknowledgedAfter };
  }
}

describe('a full disk', () => {
  it('[D1] ends the sources with not-stored, acknowledges nothing more, is not ready, and goes on after a restart with space', async () => {
    // A shell that lets no file grow beyond 1 MiB (in blocks of 1,024 bytes) stands in for the full disk.
    const words = [process.execPath, mainFile, ...serveFlags(data.path)].map((word) => `'${word}'`).join(' ');
    const server = ServerProcess.run('bash', ['-c', `ulimit -f 1024 && exec ${words}`]);
    const address = await server.address;
    const live = liveTalk(address);
    await live.until(({ type }) => type === 'snapshot');
    const { talk, next } = await connectedSource(address, token);
    const { acknowledged, refused, acknowledgedAfter } = await within('the source to be refused', loadUntilRefused(talk, next), 30_000);
    expect(refused).toMatchObject([{ type: 'refused', code: 'not-stored' }]);
    expect(acknowledgedAfter).toBe(0);
    expect(acknowledged).toBeGreaterThan(records);
    expect((await talk.closed).code).toBe(4004);

    const ready = await fetch(`${address}/readyz`);
    expect(ready.status).toBe(503);
    expect(await ready.json()).toMatchObject({ status: 'not ready' });
    expect((await fetch(`${address}/healthz`)).status).toBe(200);
    expect(await within('the dashboard to be told', live.until(({ type }) => type === 'stopping'))).toMatchObject({ reason: expect.stringContaining('cannot store') as string });
    // What is in memory may be ahead of the disk: no dashboard is let in to see it as live, no act is confirmed.
    expect((await within('a new dashboard to be refused', liveTalk(address).closed)).code).toBe(1006);
    await expect(connectedSource(address, token)).rejects.toThrow(ConnectionEnded);
    expect((await postJson(`${address}/api/guarantees/leak-A/restart`, { by: 'Mette', reason: 'try' })).status).toBe(500);
    expect(server.complaint).toMatch(/nothing can be made durable any more/);

    server.signal('SIGTERM');
    expect(await within('the server to end', server.ended)).toMatchObject({ signal: null });

    const again = ServerProcess.start(data.path);
    const resumed = await connectedSource(await again.address, token);
    // Here a group may have become durable without its answer; nothing acknowledged is missing.
    expect(resumed.next).toBeGreaterThanOrEqual(acknowledged);
    expect((resumed.next - 1) % records).toBe(0);
    resumed.talk.send(fat(resumed.next));
    expect(await heard(resumed.talk)).toMatchObject({ type: 'ack', next: resumed.next + records });
    const views = await getJson<readonly { readonly view: { readonly figures: { readonly inspected: number } } }[]>(`${await again.address}/api/guarantees`);
    expect(views[0]?.view.figures.inspected).toBe(1_000);
    resumed.talk.socket.terminate();
  });
});
