import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { request as plain } from 'node:http';
import { request as secure } from 'node:https';
import { connect, type Socket } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { TLSSocket } from 'node:tls';
import WebSocket from 'ws';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkOpenAccess, checkPlainHttp } from '../../../server/access/open-access.ts';
import { hopsOf } from '../../../server/http/hops.ts';
import { httpServer } from '../../../server/http/http-server.ts';
import { RateLimit } from '../../../server/http/rate-limit.ts';
import { tlsPair, tlsReload } from '../../../server/http/tls.ts';
import { liveProtocol } from '../../../core/live/message.ts';
import { logOf } from '../../../server/ops/log.ts';
import type { Served } from '../../../server/serve.ts';
import { leakPlant } from '../plants.ts';
import { dataDirectory, servedOn } from '../serving.ts';
import { firstPair, secondPair } from './tls-pairs.ts';

let folder: string;
let files: { tlsCert: string; tlsKey: string };
const write = (pair: { cert: string; key: string }): void => {
  writeFileSync(files.tlsCert, pair.cert);
  writeFileSync(files.tlsKey, pair.key);
};
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'vouchline-tls-'));
  files = { tlsCert: join(folder, 'cert.pem'), tlsKey: join(folder, 'key.pem') };
  write(firstPair);
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

/** Name on the certificate, and what was answered. */
function asked(address: string, headers: Record<string, string> = {}): Promise<{ name: string; status: number; headers: Record<string, unknown> }> {
  return new Promise((resolve, reject) => {
    secure(`${address}/api/me`, { rejectUnauthorized: false, agent: false, headers }, (answer) => {
      const name = String((answer.socket as TLSSocket).getPeerCertificate().subject.CN);
      answer.resume().on('end', () => resolve({ name, status: answer.statusCode ?? 0, headers: answer.headers }));
    }).on('error', reject).end();
  });
}

describe('TLS', () => {
  let data: ReturnType<typeof dataDirectory>;
  let served: Served;
  beforeEach(async () => {
    data = dataDirectory(leakPlant);
    served = await servedOn(data.path, { kind: 'records' }, { 'tls-cert': files.tlsCert, 'tls-key': files.tlsKey });
  });
  afterEach(async () => {
    await served.stop('the test is over');
    data.remove();
  });

  it('is spoken over HTTP and by sockets, and browsers are told to stay with it', async () => {
    expect(served.address).toMatch(/^https:/);
    const answer = await asked(served.address);
    expect([answer.name, answer.status, answer.headers['strict-transport-security']]).toEqual(['first', 200, 'max-age=31536000']);
    const opened = new WebSocket(`${served.address.replace('https', 'wss')}/live`, liveProtocol, { rejectUnauthorized: false });
    await new Promise((resolve) => opened.on('open', resolve));
    opened.terminate();
  });
});

describe('sockets of one address', () => {
  it('are bounded, and told when to come again', async () => {
    const data = dataDirectory(leakPlant);
    const served = await servedOn(data.path, { kind: 'records' }, { 'sockets-per-address': '2' });
    const dial = (): Promise<WebSocket | { status: number; retry: string | undefined }> =>
      new Promise((resolve) => {
        const socket = new WebSocket(`${served.address.replace('http', 'ws')}/live`, liveProtocol);
        socket.on('open', () => resolve(socket));
        socket.on('unexpected-response', (_request, answer) => resolve({ status: answer.statusCode ?? 0, retry: answer.headers['retry-after'] }));
        socket.on('error', () => undefined);
      });
    const [first] = [(await dial()) as WebSocket, await dial()];
    expect(await dial()).toEqual({ status: 503, retry: '10' });
    first.terminate();
    await expect.poll(async () => (await dial()) instanceof WebSocket).toBe(true);
    await served.stop('the test is over');
    data.remove();
  });
});

describe('the measures', () => {
  it('are for this machine, but not for whoever comes through a proxy on it that nobody named', async () => {
    const data = dataDirectory(leakPlant);
    const served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
    const status = async (headers: Record<string, string>): Promise<number> => (await fetch(`${served.address}/metrics`, { headers })).status;
    expect([await status({}), await status({ 'x-forwarded-for': '203.0.113.9' }), await status({ forwarded: 'for=203.0.113.9' })]).toEqual([200, 401, 401]);
    await served.stop('the test is over');
    data.remove();
  });
});

describe('a certificate', () => {
  it('is taken up anew when its files change, and one that cannot be used changes nothing', async () => {
    const http = await httpServer({ hops: hopsOf(''), tls: tlsPair(files), requestsPerSecond: 1000 });
    const address = await http.listen({ host: '127.0.0.1', port: 0 });
    const name = async (): Promise<string> => (await asked(address)).name;
    const look = tlsReload(http.server as never, files, logOf('silent'));
    expect(await name()).toBe('first');
    writeFileSync(files.tlsCert, 'no certificate');
    look();
    expect(await name()).toBe('first');
    write(secondPair);
    look();
    expect(await name()).toBe('second');
    await http.close();
  });

  it.each([
    [{ tlsCert: 'cert.pem', tlsKey: undefined }, 'tls-key: is missing'],
    [{ tlsCert: undefined, tlsKey: 'key.pem' }, 'tls-cert: is missing'],
    [{ tlsCert: '/nowhere/cert.pem', tlsKey: '/nowhere/key.pem' }, 'tls-cert: /nowhere/cert.pem cannot be read'],
  ])('%o is refused: %s', (pair, says) => {
    expect(() => tlsPair(pair)).toThrow(says);
  });

  it('and a key of another one are refused', () => {
    writeFileSync(files.tlsKey, secondPair.key);
    expect(() => tlsPair(files)).toThrow('do not fit together');
    expect(tlsPair({ tlsCert: undefined, tlsKey: undefined })).toBeUndefined();
  });
});

describe('listening beyond this machine', () => {
  it('takes TLS, or to be told in words that it needs none', () => {
    expect(() => checkPlainHttp({ host: '0.0.0.0', tlsCert: undefined, plainHttp: 'refused' })).toThrow('plain-http: refused, with host 0.0.0.0');
    for (const host of ['127.0.0.1', '127.3.2.1', '::1', 'localhost']) expect(() => checkPlainHttp({ host, tlsCert: undefined, plainHttp: 'refused' })).not.toThrow();
    expect(() => checkPlainHttp({ host: '::', tlsCert: undefined, plainHttp: 'allowed' })).not.toThrow();
    expect(() => checkPlainHttp({ host: '10.0.0.1', tlsCert: 'c', plainHttp: 'refused' })).not.toThrow();
    expect(() => checkOpenAccess({ host: '10.0.0.1', access: 'open' })).toThrow('access: open');
    expect(() => checkOpenAccess({ host: '10.0.0.1', access: 'accounts' })).not.toThrow();
  });
});

describe('a proxy in front', () => {
  const request = (remoteAddress: string, headers: Record<string, string>): never => ({ socket: { remoteAddress }, connection: { remoteAddress }, headers }) as never;
  const forwarded = { host: 'inside:7317', 'x-forwarded-for': '203.0.113.9, 10.0.0.4', 'x-forwarded-proto': 'https', 'x-forwarded-host': 'plant.example' };

  it('is believed where it was named, hop by hop, and nobody else is', () => {
    const hops = hopsOf('127.0.0.1, 10.0.0.0/8');
    expect([hops.addressOf(request('127.0.0.1', forwarded)), hops.hostOf(request('127.0.0.1', forwarded)), hops.isSecure(request('127.0.0.1', forwarded))]).toEqual(['203.0.113.9', 'plant.example', true]);
    expect([hops.addressOf(request('192.0.2.1', forwarded)), hops.hostOf(request('192.0.2.1', forwarded)), hops.isSecure(request('192.0.2.1', forwarded))]).toEqual(['192.0.2.1', 'inside:7317', false]);
    const none = hopsOf('');
    expect([none.addressOf(request('127.0.0.1', forwarded)), none.hostOf(request('127.0.0.1', forwarded)), none.isSecure(request('127.0.0.1', forwarded))]).toEqual(['127.0.0.1', 'inside:7317', false]);
    expect(hopsOf('127.0.0.1').addressOf(request('127.0.0.1', { ...forwarded, 'x-forwarded-for': 'evil, 203.0.113.9, 198.51.100.7' }))).toBe('198.51.100.7');
  });

  it('has to be named by its address', () => {
    expect(() => hopsOf('proxy.example')).toThrow('trusted-hops');
  });

  it('may say by which host a page came, so that its own requests are not foreign', async () => {
    const http = await httpServer({ hops: hopsOf('127.0.0.1'), tls: undefined, requestsPerSecond: 1000 });
    http.post('/api/something', () => ({}));
    const post = (headers: Record<string, string>): Promise<number> => http.inject({ method: 'POST', url: '/api/something', headers, remoteAddress: '127.0.0.1' }).then(({ statusCode }) => statusCode);
    expect(await post({ ...forwarded, origin: 'https://plant.example' })).toBe(200);
    expect(await post({ ...forwarded, origin: 'https://inside:7317' })).toBe(403);
    await http.close();
  });
});

describe('too many requests', () => {
  it('from one address are told when to come again; others notice nothing', () => {
    let now = 0;
    const limit = new RateLimit(10, 20, () => now);
    for (let k = 0; k < 20; k += 1) expect(limit.take('a')).toBe(0);
    expect([limit.take('a'), limit.take('b')]).toEqual([100, 0]);
    now = 100;
    expect([limit.take('a'), limit.take('a')]).toEqual([0, 100]);
  });

  it('are refused with 429 and Retry-After, uploads of sources are not', async () => {
    const http = await httpServer({ hops: hopsOf(''), tls: undefined, requestsPerSecond: 1 });
    http.post('/source/records', () => ({}));
    const status = async (url: string, method: 'GET' | 'POST' = 'GET'): Promise<number> => (await http.inject({ url, method })).statusCode;
    for (let k = 0; k < 10; k += 1) await status('/nothing');
    const refused = await http.inject('/nothing');
    expect([refused.statusCode, refused.headers['retry-after'], await status('/source/records', 'POST')]).toEqual([429, '1', 200]);
    await http.close();
  });
});

describe('a request that is no good', () => {
  let close: () => Promise<void>;
  let port: number;
  beforeEach(async () => {
    const http = await httpServer({ hops: hopsOf(''), tls: undefined, requestsPerSecond: 1000, arriveWithinMs: 300 });
    http.post('/api/something', (request) => ({ polluted: ({} as { admin?: boolean }).admin ?? null, body: request.body }));
    http.post('/source/records', () => ({}));
    port = Number(new URL(await http.listen({ host: '127.0.0.1', port: 0 })).port);
    close = () => http.close();
  });
  afterEach(() => close());

  const open = (text: string): Promise<{ socket: Socket; heard: () => string; ended: Promise<void> }> =>
    new Promise((resolve) => {
      let heard = '';
      const socket = connect({ port, host: '127.0.0.1' }, () => {
        socket.write(text);
        resolve({ socket, heard: () => heard, ended: new Promise((end) => socket.on('close', () => end())) });
      });
      socket.on('data', (bytes) => (heard += bytes.toString('latin1')));
      socket.on('error', () => undefined);
    });
  const head = (path: string, length: number, more = ''): string => `POST ${path} HTTP/1.1\r\nHost: a\r\nContent-Type: application/json\r\nContent-Length: ${length}\r\n${more}\r\n`;

  it('is let go where its body or its head does not arrive in time; an upload may take its time', async () => {
    const slow = await open(`${head('/api/something', 100)}{"a`);
    const slowHead = await open('GET /api/something HTTP/1.1\r\nHost: a\r\nX-One: ');
    await Promise.all([slow.ended, slowHead.ended]);
    expect(slowHead.heard()).toContain(' 408 ');
    const upload = await open(`${head('/source/records', 3).replace('application/json', 'application/json')}{}`);
    await new Promise((resolve) => setTimeout(resolve, 700));
    upload.socket.write(' ');
    await new Promise((resolve) => setTimeout(resolve, 100));
    expect(upload.heard()).toContain('200 OK');
    upload.socket.destroy();
  });

  it('is let go where it was answered long ago and still sends, an upload too', async () => {
    const refused = await open(head('/source/records', 1000).replace('application/json', 'application/nothing'));
    const dribble = setInterval(() => refused.socket.write('a'), 50);
    await refused.ended;
    clearInterval(dribble);
    expect(refused.heard()).toContain(' 415 ');
  });

  const post = (body: string, headers: Record<string, string> = {}): Promise<{ status: number; text: string }> =>
    new Promise((resolve, reject) => {
      const request = plain({ port, host: '127.0.0.1', path: '/api/something', method: 'POST', headers: { 'content-type': 'application/json', ...headers } }, (answer) => {
        let text = '';
        answer.on('data', (bytes: Buffer) => (text += bytes.toString()));
        answer.on('end', () => resolve({ status: answer.statusCode ?? 0, text }));
      });
      request.on('error', reject);
      request.end(body);
    });

  it('pollutes no prototype, is not too large, and is JSON', async () => {
    expect((await post('{"__proto__": {"admin": true}}')).status).toBe(400);
    expect((await post('{"constructor": {"prototype": {"admin": true}}}')).status).toBe(400);
    expect(await post('{"a": 1}')).toEqual({ status: 200, text: '{"polluted":null,"body":{"a":1}}' });
    expect((await post(JSON.stringify({ a: 'x'.repeat(70_000) }))).status).toBe(413);
    expect((await post('{"a": ')).status).toBe(400);
    expect((await post('[' .repeat(50_000))).status).toBe(400);
  });

  it.each(['/../../etc/passwd', '/..%2f..%2fetc/passwd', '/%2e%2e/%2e%2e/etc/passwd', '/assets/..%5c..%5cpackage.json', '/assets/%00', '//etc/passwd', '/%c0%ae%c0%ae/etc/passwd'])('finds nothing outside the pages: %s', async (path) => {
    const one = await open(`GET ${path} HTTP/1.1\r\nHost: a\r\nConnection: close\r\n\r\n`);
    await one.ended;
    expect(one.heard()).toMatch(/^HTTP\/1\.1 (400|403|404) /);
    expect(one.heard()).not.toContain('root:');
  });

  it('has a head of a bounded length', async () => {
    const long = await open(`GET /api/nothing HTTP/1.1\r\nHost: a\r\nX-Long: ${'x'.repeat(20_000)}\r\n\r\n`);
    await long.ended;
    expect(long.heard()).toContain(' 431 ');
  });

  it('puts no header of its own into an answer', async () => {
    const one = await open('GET /api/x%0d%0aSet-Cookie:%20a=b HTTP/1.1\r\nHost: a\r\nConnection: close\r\n\r\n');
    await one.ended;
    expect(one.heard().split('\r\n\r\n')[0]).not.toMatch(/set-cookie/i);
    const folded = await open('GET / HTTP/1.1\r\nHost: a\r\nX: a\r\n Set-Cookie: b\r\nConnection: close\r\n\r\n');
    await folded.ended;
    expect(folded.heard().split('\r\n\r\n')[0]).not.toMatch(/set-cookie/i);
  });

  it.each(['/api/nothing', '/%61pi/nothing', '/source/nothing'])('is answered with headers that keep a browser in bounds: %s', async (path) => {
    const one = await open(`GET ${path} HTTP/1.1\r\nHost: a\r\nConnection: close\r\n\r\n`);
    await one.ended;
    for (const header of ["script-src 'self'", 'x-content-type-options: nosniff', 'referrer-policy: no-referrer', 'cache-control: no-store', 'permissions-policy: ', "frame-ancestors 'none'"]) expect(one.heard()).toContain(header);
    expect(one.heard()).not.toContain('unsafe-inline');
  });
});
