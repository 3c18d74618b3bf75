import WebSocket from 'ws';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { liveProtocol, type LiveMessage } from '../../../core/live/message.ts';
import type { Served } from '../../../server/serve.ts';
import { leakPlant } from '../plants.ts';
import { dataDirectory, servedOn, Talk } from '../serving.ts';
import { password } from './people.ts';

const twoLines = leakPlant.replace('lines:\n', 'lines:\n  - { id: B, name: Hose line B, stations: [{ id: B.leak-test, name: Leak test }] }\n') +
  '  - { id: leak-B, name: Leak B, station: B.leak-test, characteristic: tightness, quantity: nonconforming-fraction, at-most: 1 %, window: { units: 1000 } }\n';

let data: { path: string; remove: () => void };
let served: Served;
let administrator: string;

beforeEach(async () => {
  data = dataDirectory(twoLines);
  served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
  administrator = await accepted(served.firstLink!, 'olaf');
});
afterEach(async () => {
  await served.stop('the test is over');
  data.remove();
});

async function post(path: string, body: object, cookie = ''): Promise<Response> {
  return fetch(`${served.address}${path}`, { method: 'POST', headers: { 'content-type': 'application/json', origin: served.address, cookie }, body: JSON.stringify(body) });
}

async function accepted(link: string, name: string): Promise<string> {
  const answer = await post('/api/invitations/accept', { code: link.split('#')[1], name, shownAs: `${name} Holm`, password });
  expect(answer.status).toBe(200);
  return answer.headers.get('set-cookie')!.split(';')[0]!;
}

async function viewerOf(line: string | null): Promise<string> {
  const invited = (await (await post('/api/invitations', { grants: [{ role: 'viewer', line }] }, administrator)).json()) as { link: string };
  return accepted(invited.link, `viewer-${line ?? 'all'}`);
}

function live(cookie: string): Talk<LiveMessage> {
  const talk = new Talk<LiveMessage>(new WebSocket(`${served.address.replace('http', 'ws')}/live`, liveProtocol, { headers: { cookie } }));
  talk.socket.on('open', () => talk.send({ type: 'watch' }));
  return talk;
}

const refusal = (cookie: string): Promise<number> =>
  new Promise((resolve) => {
    const socket = new WebSocket(`${served.address.replace('http', 'ws')}/live`, liveProtocol, { headers: { cookie } });
    socket.on('unexpected-response', (_request, response) => {
      resolve(response.statusCode ?? 0);
      socket.terminate();
    });
    socket.on('error', () => undefined);
  });

describe('a server with accounts', () => {
  it('shows nothing to nobody, and says so to a socket before it opens', async () => {
    for (const path of ['/api/guarantees', '/api/alarms', '/api/alarms/standing', '/api/events', '/api/guarantees/leak-A/strip', '/api/guarantees/none/run']) {
      expect([path, (await fetch(`${served.address}${path}`)).status]).toEqual([path, 401]);
    }
    expect(await refusal('')).toBe(401);
    expect(await refusal('vouchline-session=vs_guess')).toBe(401);
    for (const path of ['/healthz', '/api/me', '/api/plant/schema']) expect((await fetch(`${served.address}${path}`)).status).toBe(200);
  });

  it('shows a viewer of one line that line alone, over HTTP and live', async () => {
    const cookie = await viewerOf('B');
    const asked = async <T>(path: string): Promise<T> => (await (await fetch(`${served.address}${path}`, { headers: { cookie } })).json()) as T;
    expect((await asked<{ card: { id: string } }[]>('/api/guarantees')).map(({ card }) => card.id)).toEqual(['leak-B']);
    expect((await fetch(`${served.address}/api/guarantees/leak-A/strip`, { headers: { cookie } })).status).toBe(403);
    const talk = live(cookie);
    const first = await talk.until((message) => message.type === 'snapshot');
    expect(first).toMatchObject({ cards: [{ id: 'leak-B' }], views: [{ id: 'leak-B' }] });
    talk.socket.terminate();
    const all = live(await viewerOf(null));
    const everything = await all.until((message) => message.type === 'snapshot');
    expect((everything as unknown as { cards: { id: string }[] }).cards.map(({ id }) => id)).toEqual(['leak-A', 'leak-B']);
    all.socket.terminate();
  });

  it('ends the live socket of a session that ends', async () => {
    const cookie = await viewerOf(null);
    const talk = live(cookie);
    await talk.until((message) => message.type === 'snapshot');
    expect((await post('/api/sign-out', {}, cookie)).status).toBe(204);
    expect(await talk.closed).toEqual({ code: 4401 });
    expect(await refusal(cookie)).toBe(401);
  });

  it('puts acts on record under the own name, and refuses another', async () => {
    const cookie = await viewerOf(null);
    expect((await post('/api/guarantees/leak-A/restart', { reason: 'new seal' }, cookie)).status).toBe(403);
    expect((await post('/api/guarantees/leak-A/restart', { reason: 'new seal', by: 'Somebody' }, administrator)).status).toBe(403);
    expect((await post('/api/guarantees/leak-A/restart', { reason: 'new seal' }, administrator)).status).toBe(200);
    const events = (await (await fetch(`${served.address}/api/events?kind=restart`, { headers: { cookie } })).json()) as { happening: object }[];
    expect(events).toMatchObject([{ happening: { by: 'olaf Holm', reason: 'new seal' } }]);
  });

  it('goes on with its sessions after a restart, and offers no first account any more', async () => {
    await served.stop('restart');
    served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
    expect(served.firstLink).toBeUndefined();
    expect((await fetch(`${served.address}/api/accounts`, { headers: { cookie: administrator } })).status).toBe(200);
  });
});

describe('a server without accounts', () => {
  it('does not start where others could reach it', async () => {
    const place = dataDirectory(leakPlant);
    await expect(servedOn(place.path, { kind: 'records' }, { access: 'open', host: '0.0.0.0' })).rejects.toThrow('access: open, with host 0.0.0.0');
    place.remove();
  });
});
