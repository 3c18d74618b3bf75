import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import WebSocket from 'ws';
import { liveProtocol } from '../../../core/live/message.ts';
import { sourceProtocol } from '../../../core/protocol/source-messages.ts';
import { examplePlant } from '../../../server/cli/plant-command.ts';
import { hasForeignOrigin } from '../../../server/access/foreign-origin.ts';
import type { Served } from '../../../server/serve.ts';
import { dataDirectory, servedOn, tokenFor } from '../serving.ts';

describe('a foreign origin', () => {
  it.each([
    [{ host: 'plant:7317', origin: 'http://plant:7317' }, false],
    [{ host: 'Plant.example', origin: 'https://plant.example' }, false],
    [{ host: 'plant:7317' }, false],
    [{ host: 'plant:7317', 'sec-fetch-site': 'same-origin' }, false],
    [{ host: 'plant:7317', 'sec-fetch-site': 'cross-site' }, true],
    [{ host: 'plant:7317', origin: 'http://plant:7318' }, true],
    [{ host: 'plant:7317', origin: 'http://plant:7317.evil.example' }, true],
    [{ host: 'plant', origin: 'http://plant@evil.example' }, true],
    [{ host: 'plant:7317', origin: 'null' }, true],
    [{ host: '', origin: 'file:///x' }, true],
    [{ origin: 'http://plant' }, true],
  ] as const)('%j: %s', (headers, foreign) => {
    expect(hasForeignOrigin(headers)).toBe(foreign);
  });
});

describe('a server asked by a page of another place', () => {
  let data: ReturnType<typeof dataDirectory>;
  let served: Served;
  let token: string;
  beforeAll(async () => {
    data = dataDirectory(examplePlant());
    token = await tokenFor(data.path, 'leak-tester', ['*']);
    served = await servedOn(data.path);
  });
  afterAll(async () => {
    await served.stop('the test is over');
    data.remove();
  });

  /** 101 if the socket was opened. */
  const statusOf = (path: string, protocol: string, origin: string | undefined): Promise<number> =>
    new Promise((resolve, reject) => {
      const headers = { authorization: `Bearer ${token}`, ...(origin === undefined ? {} : { origin }) };
      const socket = new WebSocket(`${served.address.replace('http', 'ws')}${path}`, protocol, { headers });
      socket.on('open', () => {
        socket.terminate();
        resolve(101);
      });
      socket.on('unexpected-response', (request, response) => {
        request.destroy();
        resolve(response.statusCode ?? 0);
      });
      socket.on('error', reject);
    });

  it.each([['/live', liveProtocol], ['/source', sourceProtocol]])('opens no socket on %s', async (path, protocol) => {
    expect(await statusOf(path, protocol, 'http://evil.example')).toBe(403);
    expect(await statusOf(path, protocol, 'null')).toBe(403);
    expect(await statusOf(path, protocol, served.address)).toBe(101);
    expect(await statusOf(path, protocol, undefined)).toBe(101);
  });

  it('changes nothing, whatever the form of the request', async () => {
    const [first] = (await (await fetch(`${served.address}/api/guarantees`)).json()) as { card: { id: string } }[];
    const restart = (origin: string): Promise<Response> =>
      fetch(`${served.address}/api/guarantees/${first?.card.id ?? ''}/restart`, { method: 'POST', headers: { origin, 'content-type': 'application/json' }, body: JSON.stringify({ by: 'Ines', reason: 'new die' }) });
    expect((await restart('http://evil.example')).status).toBe(403);
    const events = async (): Promise<readonly unknown[]> => (await (await fetch(`${served.address}/api/events`)).json()) as unknown[];
    const before = (await events()).length;
    expect((await restart(served.address)).status).toBe(200);
    expect((await events()).length).toBeGreaterThan(before);
    expect(before).toBe(0);
  });
});
