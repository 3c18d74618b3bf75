import { connect, type Socket } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { WebSocket } from 'ws';
import { sourceProtocol } from '../../core/protocol/source-messages.ts';
import { Chance } from '../../server/demo/chance.ts';
import { leakPlant } from '../server/plants.ts';
import { dataDirectory, sourceTalk, tokenFor } from '../server/serving.ts';
import { connectedSource, endAll, eventually, heard, within } from './harness.ts';
import { leakFrame } from './frames.ts';
import { hostileMessage } from './hostile.ts';
import { measuredServer, type MeasuredServer } from './measured-server.ts';

const seed = 20_260_602;
const mebibyte = 1_048_576;
let data: ReturnType<typeof dataDirectory>;
let server: MeasuredServer;
let port: number;
const tokens = new Map<string, string>();
let good: Awaited<ReturnType<typeof connectedSource>>;
let goodNext = 1;

const token = (name: string): string => tokens.get(name) ?? '';

beforeAll(async () => {
  data = dataDirectory(leakPlant);
  for (const name of ['good', 'hostile']) tokens.set(name, await tokenFor(data.path, name, ['A.leak-test']));
  server = await measuredServer(data.path);
  port = Number(new URL(server.address).port);
  good = await connectedSource(server.address, token('good'));
});
afterAll(() => {
  server.end();
  endAll();
  data.remove();
});

/** The server answers, and the good source goes on where it was. */
async function expectHealthy(): Promise<void> {
  expect(server.alive()).toBe(true);
  expect((await fetch(`${server.address}/healthz`)).status).toBe(200);
  good.talk.send(leakFrame(goodNext, 10));
  goodNext += 10;
  expect(await heard(good.talk)).toEqual({ type: 'ack', next: goodNext });
}

/** Sends hostile messages one by one, each of which is answered, and counts the answers. */
async function storm(chance: Chance, messages: number): Promise<{ refused: number; acknowledged: number; codes: Set<string> }> {
  const { talk } = await connectedSource(server.address, token('hostile'));
  const met = { refused: 0, acknowledged: 0, codes: new Set<string>() };
  for (let sent = 0; sent < messages; sent += 1) {
    talk.socket.send(hostileMessage(chance));
    const answer = await heard(talk);
    if (answer.type === 'refused') {
      met.codes.add(answer.code);
      met.refused += 1;
    } else if (answer.type === 'ack') met.acknowledged += 1; // A flipped bit may leave a frame good.
  }
  talk.socket.terminate();
  return met;
}

/** @param allowHalfOpen whether it stays open on this side when the server has ended */
function rawSocket(allowHalfOpen: boolean): Promise<Socket> {
  return new Promise((resolve) => {
    const socket = connect({ port, host: '127.0.0.1', allowHalfOpen }, () => resolve(socket));
    socket.on('error', () => undefined);
  });
}

const handshake = (path: string, headers: string): string =>
  `GET ${path} HTTP/1.1\r\nHost: localhost\r\nConnection: Upgrade\r\nUpgrade: websocket\r\nSec-WebSocket-Version: 13\r\nSec-WebSocket-Key: dGhlIHNhbXBsZSBub25jZQ==\r\n${headers}\r\n`;

/** Opens many connections with broken beginnings, a few at a time; their peers never close them by themselves. */
async function handshakes(chance: Chance, count: number): Promise<void> {
  const beginnings: readonly [string, ...string[]] = [
    handshake('/source', ''),
    handshake('/source', 'Sec-WebSocket-Protocol: vouchline-source.9\r\n'),
    handshake('/source', `Sec-WebSocket-Protocol: ${sourceProtocol}\r\n`),
    handshake('/source', `Sec-WebSocket-Protocol: ${sourceProtocol}\r\nAuthorization: Bearer nobody\r\n`),
    handshake('/source', `Sec-WebSocket-Protocol: ${sourceProtocol}\r\nAuthorization: Bearer ${'x'.repeat(600)}\r\n`),
    handshake('/live', 'Sec-WebSocket-Protocol: other\r\n'),
    handshake('/nothing', ''),
    handshake('/source?token=x', 'Sec-WebSocket-Protocol: ,,,\r\n').replace('Version: 13', 'Version: 99'),
    handshake('//', '').replace('websocket', 'h2c'),
    handshake('/live', 'Sec-WebSocket-Protocol: vouchline-live.1\r\n').replace(/Sec-WebSocket-Key.*\r\n/, ''),
    'GET / HTTP/9.9\r\n\r\n',
    `GET /${'a'.repeat(20_000)} HTTP/1.1\r\n\r\n`,
    '\u0000\u0001\u0002garbage\r\n\r\n',
  ];
  const one = async (): Promise<void> => {
    const socket = connect({ port, host: '127.0.0.1', allowHalfOpen: true });
    socket.on('error', () => undefined);
    socket.resume();
    socket.on('connect', () => socket.write(chance.oneOf(beginnings)));
    await within('a refused connection to end', new Promise<void>((resolve) => {
      socket.on('end', resolve);
      socket.on('close', () => resolve());
    }), 20_000);
    socket.destroy();
  };
  for (let done = 0; done < count; done += 50) await Promise.all(Array.from({ length: 50 }, one));
}

describe('a server under hostile input', () => {
  it('refuses 12,000 bad messages and handshakes, holds no more memory afterwards, and a good source notices nothing', async () => {
    const chance = new Chance('hostile', seed);
    await storm(chance, 1_500); // Code is compiled and caches are filled before the first look.
    await handshakes(chance, 500);
    await expectHealthy();
    const before = await server.held();
    const { refused, codes } = await storm(chance, 8_000);
    await handshakes(chance, 4_000);
    await expectHealthy();
    expect(refused).toBeGreaterThan(7_000);
    expect(codes.size).toBeGreaterThan(15);
    const after = await eventually('the connections to be let go', async () => {
      const held = await server.held();
      return held.handles <= before.handles + 1 ? held : undefined;
    });
    expect(after.bytes - before.bytes).toBeLessThan(4 * mebibyte);
  }, 90_000);

  it('takes 3,000 messages from dashboards that mean nothing, and ends those that are too long', async () => {
    const chance = new Chance('dashboards', seed);
    const beginnings = ['{"type":"watch"}', '{"type":"watch","boot":1,"revision":{}}', '[', 'null', '\u0000', '{"__proto__":{"boot":"b"}}', '{"boot":"b","revision":-1}', '{"boot":"b","revision":1e300}', 'x'.repeat(1_000)];
    for (let dashboard = 0; dashboard < 30; dashboard += 1) {
      const socket = new WebSocket(`${server.address.replace('http', 'ws')}/live`, 'vouchline-live.1');
      await new Promise((resolve) => socket.on('open', resolve));
      for (let sent = 0; sent < 100; sent += 1) socket.send(chance.oneOf(beginnings as [string, ...string[]]));
      socket.send('x'.repeat(2_000));
      expect((await within('the close', new Promise<{ code: number }>((resolve) => socket.on('close', (code) => resolve({ code }))))).code).toBe(1009);
    }
    await expectHealthy();
  });

  it('lets go of a refused connection whose peer never closes its side', async () => {
    const before = await server.held();
    const peers = await Promise.all(Array.from({ length: 40 }, () => rawSocket(true)));
    const ends = peers.map((peer) => new Promise((resolve) => peer.on('end', resolve)));
    for (const peer of peers) peer.resume().write(handshake('/source', 'Sec-WebSocket-Protocol: other\r\n'));
    await within('all to be refused', Promise.all(ends));
    await eventually('the connections to be let go', async () => ((await server.held()).handles <= before.handles ? true : undefined));
    for (const peer of peers) peer.destroy();
  });

  it('ends a connection whose message is too large with 1009, and one with too many frames in flight with 4002', async () => {
    const large = await connectedSource(server.address, token('hostile'));
    large.talk.socket.send(new Uint8Array(mebibyte + 1));
    expect((await within('the close', large.talk.closed)).code).toBe(1009);
    const eager = await connectedSource(server.address, token('hostile'));
    let next = eager.next;
    for (let i = 0; i < 3_000; i += 1, next += 1) eager.talk.send(leakFrame(next, 1));
    expect((await within('the close', eager.talk.closed)).code).toBe(4002);
    await expectHealthy();
  });

  it('takes a frame that comes in slow small fragments, pings between them, and ends what is no WebSocket', async () => {
    const talk = sourceTalk(server.address, token('hostile'));
    const welcome = await heard(talk);
    const next = welcome.type === 'welcome' ? welcome.next : 0;
    const frame = leakFrame(next, 40, [7]);
    for (let at = 0; at < frame.length; at += 1) {
      talk.socket.send(frame.subarray(at, at + 1), { binary: true, fin: at === frame.length - 1 });
      if (at % 16 === 0) talk.socket.ping('still here');
      await new Promise((resolve) => setImmediate(resolve));
    }
    expect(await heard(talk)).toEqual({ type: 'ack', next: next + 40 });
    const raw = await rawSocket(false);
    raw.write(handshake('/source', `Sec-WebSocket-Protocol: ${sourceProtocol}\r\nAuthorization: Bearer ${token('hostile')}\r\n`));
    const closed = new Promise((resolve) => raw.on('close', resolve));
    raw.resume();
    raw.write(Buffer.from([0xff, 0x00, 0xff, 0x7f, 0x13, 0x37])); // Reserved bits, not masked.
    await within('the broken connection to end', closed);
    await expectHealthy();
  });

  it('does not pile up answers to a flood of pings that nobody reads', async () => {
    const before = await server.held();
    const flood = new WebSocket(`${server.address.replace('http', 'ws')}/source`, sourceProtocol, { headers: { authorization: `Bearer ${token('hostile')}` } });
    flood.on('error', () => undefined);
    await new Promise((resolve) => flood.on('open', resolve));
    flood.pause();
    const ended = new Promise((resolve) => flood.on('close', resolve));
    const payload = Buffer.alloc(125);
    for (let i = 0; i < 100_000 && flood.readyState === flood.OPEN; i += 1) {
      flood.ping(payload);
      if (i % 1_000 === 0) await new Promise((resolve) => setImmediate(resolve));
    }
    const held = await server.held();
    expect(held.bytes - before.bytes).toBeLessThan(8 * mebibyte);
    flood.terminate();
    await ended;
    await expectHealthy();
  });
});
