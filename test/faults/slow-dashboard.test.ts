import { anybody } from '../../server/access/caller.ts';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { WebSocket, WebSocketServer } from 'ws';
import { liveProtocol, type LiveMessage } from '../../core/live/message.ts';
import { Monitor } from '../../core/monitor/monitor.ts';
import { readPlant } from '../../core/plant/read-plant.ts';
import { frameOf } from '../../core/record/frame-of.ts';
import { DashboardDesk } from '../../server/live/dashboard-desk.ts';
import { LiveBoard } from '../../server/live/live-board.ts';
import { leakPlant } from '../server/plants.ts';
import { eventually } from './harness.ts';
import { monday } from './frames.ts';

const guarantees = 80;
let http: Server;
let sockets: WebSocket[];
let monitor: Monitor;
let board: LiveBoard;
let desk: DashboardDesk;
let wallNow = 0;
let next = 1;

/** Many guarantees on one leak test, so that every record changes much that dashboards show. */
function manyGuarantees(): Monitor {
  const one = leakPlant.slice(leakPlant.indexOf('  - id: leak-A'));
  const more = Array.from({ length: guarantees - 1 }, (_, i) => one.replace('leak-A', `leak-${i}`)).join('');
  const reading = readPlant(leakPlant + more, 'v');
  if (!reading.ok) throw new Error(reading.fault[0]?.sentence);
  return new Monitor(reading.value.plant, 'v');
}

beforeEach(async () => {
  [wallNow, next, sockets] = [0, 1, []];
  monitor = manyGuarantees();
  board = new LiveBoard({ boot: 'b', clockRate: 1, demo: false });
  board.begin(monitor);
  desk = new DashboardDesk(board);
  http = createServer();
  const upgrades = new WebSocketServer({ server: http, perMessageDeflate: false, handleProtocols: () => liveProtocol });
  upgrades.on('connection', (socket) => {
    sockets.push(socket);
    desk.connect(socket, anybody);
  });
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
});
afterEach(() => {
  for (const socket of sockets) socket.terminate();
  http.close();
});

/** A dashboard that keeps nothing of what it is told, and tells what it has if it is not `mute`. */
function dashboard(mute = false): WebSocket {
  const socket = new WebSocket(`ws://127.0.0.1:${(http.address() as AddressInfo).port}`, liveProtocol);
  socket.on('error', () => undefined);
  if (!mute) socket.on('open', () => socket.send('{"type":"watch"}'));
  return socket;
}

/** Ten more units, judged, told and sent: what the server does ten times a second. */
async function beat(nonconforming: readonly number[]): Promise<void> {
  const origin = { station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', lot: undefined };
  const time = { kind: 'steady', start: monday + next * 1_000, step: 1_000 } as const;
  monitor.takeFrame('leak-tester', frameOf(next, [{ kind: 'verdicts', origin, records: 10, time, nonconforming: Uint32Array.from(nonconforming) }]), undefined);
  next += 10;
  board.note(monitor.decisions().happenings, monitor.now);
  for (const _ of board.refreshing(monitor, monitor.now));
  wallNow += 100;
  desk.update(wallNow);
  await new Promise((resolve) => setImmediate(resolve));
}

/** Bytes held, after everything that can be let go is let go. */
function held(): number {
  setFlagsFromString('--expose-gc');
  (runInNewContext('gc') as () => void)();
  const { heapUsed, external } = process.memoryUsage();
  return heapUsed + external;
}

/** Keeps what a dashboard has seen of alarms and how far it has come. */
function watching(client: WebSocket): { revision: number; messages: number; readonly alarms: Map<number, string> } {
  const seen = { revision: 0, messages: 0, alarms: new Map<number, string>() };
  client.on('message', (data: Buffer) => {
    const message = JSON.parse(data.toString()) as LiveMessage;
    seen.messages += 1;
    if (message.type !== 'stopping') seen.revision = message.revision;
    if (message.type === 'snapshot' || message.type === 'change') for (const alarm of message.alarms) seen.alarms.set(alarm.id, alarm.state.kind);
  });
  return seen;
}

async function connected(): Promise<{ client: WebSocket; seen: ReturnType<typeof watching>; socket: WebSocket }> {
  const client = dashboard();
  const seen = watching(client);
  const count = sockets.length;
  await eventually('a snapshot', () => {
    desk.update(wallNow);
    return seen.messages > 0 || undefined;
  });
  return { client, seen, socket: sockets[count] as WebSocket };
}

describe('a dashboard that stops reading', () => {
  it('costs no memory, holds up no other, and has seen every alarm when it reads again', async () => {
    const slow = await connected();
    const quick = await connected();
    slow.client.pause();
    let most = 0;
    let largest = 0;
    // Until the network has taken all it takes without being read.
    for (let i = 0; i < 500 && slow.socket.bufferedAmount === 0; i += 1) await beat([]);
    expect(slow.socket.bufferedAmount).toBeGreaterThan(0);
    const before = held();
    const messagesBefore = quick.seen.messages;
    for (let i = 0; i < 300; i += 1) {
      // Every fourth block of 25 is bad: alarms are raised, return, and are raised again once acknowledged.
      await beat(Math.floor(i / 25) % 4 === 1 ? [1, 4, 7] : []);
      if (i % 100 === 99) for (const { id } of [...monitor.desk.standing()]) monitor.act({ kind: 'acknowledge', alarm: id, by: 'Mette', note: '' }, monitor.now);
      most = Math.max(most, slow.socket.bufferedAmount);
      largest = Math.max(largest, board.snapshot().length);
    }
    expect(most).toBeLessThanOrEqual(largest + 1_024); // One message at most waits.
    expect(held() - before).toBeLessThan(8 * 1_048_576);
    await eventually('the quick dashboard to be up to date', () => quick.seen.revision === board.revision || undefined);
    expect(quick.seen.messages - messagesBefore).toBeGreaterThan(250);
    expect(quick.seen.alarms.size).toBeGreaterThanOrEqual(guarantees);
    expect(slow.seen.alarms.size).toBe(0);
    slow.client.resume();
    await eventually('the slow dashboard to be up to date', async () => {
      desk.update(wallNow);
      await new Promise((resolve) => setImmediate(resolve));
      return slow.seen.revision === board.revision || undefined;
    });
    expect([...slow.seen.alarms.entries()].sort()).toEqual([...quick.seen.alarms.entries()].sort());
    expect(slow.seen.messages).toBeLessThan(quick.seen.messages / 2 + 500);
  });

  it('is given up when it takes nothing for a minute, and so is one that never begins to watch; others stay', async () => {
    const frozen = await connected();
    const well = await connected();
    const mute = dashboard(true);
    const muteClosed = new Promise((resolve) => mute.on('close', resolve));
    await eventually('three dashboards', () => sockets.length === 3 || undefined);
    frozen.client.pause();
    for (let i = 0; i < 500 && frozen.socket.bufferedAmount === 0; i += 1) await beat([]);
    wallNow += 59_000;
    desk.update(wallNow);
    expect(desk.connected).toBe(3);
    wallNow += 2_000;
    desk.update(wallNow);
    await eventually('two to be given up', () => desk.connected === 1 || undefined);
    expect(frozen.socket.readyState).toBe(frozen.socket.CLOSED);
    expect(await muteClosed).toBe(1006);
    await beat([]);
    await eventually('the other one to be up to date', () => well.seen.revision === board.revision || undefined);
  });
});
