import { get } from 'node:http';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import WebSocket from 'ws';
import { liveProtocol } from '../../../core/live/message.ts';
import { sourceProtocol } from '../../../core/protocol/source-messages.ts';
import { examplePlant } from '../../../server/cli/plant-command.ts';
import { isForeignHost } from '../../../server/access/foreign-host.ts';
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

  it('is one without TLS where TLS was spoken', () => {
    const headers = { host: 'plant.example', origin: 'http://plant.example' };
    expect([hasForeignOrigin(headers, 'plant.example', true), hasForeignOrigin({ ...headers, origin: 'https://plant.example' }, 'plant.example', true)]).toEqual([true, false]);
  });
});

describe('a foreign host', () => {
  it.each([
    ['localhost:7317', false], ['LOCALHOST', false], ['127.0.0.1:7317', false], ['127.1.2.3', false], ['[::1]:7317', false],
    ['evil.example:7317', true], ['localhost.evil.example', true], ['127.0.0.1.evil.example', true], ['127.0.0.1@evil.example', true], ['10.0.0.1', true], ['', true], ['a b', true], [undefined, true],
  ])('%s: %s', (host, foreign) => {
    expect(isForeignHost(host)).toBe(foreign);
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
  const statusOf = (path: string, protocol: string, origin: string | undefined, host?: string): Promise<number> =>
    new Promise((resolve, reject) => {
      const headers = { authorization: `Bearer ${token}`, ...(origin === undefined ? {} : { origin }), ...(host === undefined ? {} : { host }) };
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

  it('whose name was made to lead to this machine is told nothing where access is open', async () => {
    const { port } = new URL(served.address);
    const rebound = { host: `evil.example:${port}`, origin: `http://evil.example:${port}` };
    const status = (path: string): Promise<number> =>
      new Promise((resolve, reject) => {
        get({ host: '127.0.0.1', port, path, headers: rebound }, (answer) => resolve(answer.resume().statusCode ?? 0)).on('error', reject);
      });
    expect([await status('/api/guarantees'), await status('/')]).toEqual([403, 403]);
    expect(await statusOf('/live', liveProtocol, rebound.origin, rebound.host)).toBe(403);
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
