import type { IncomingMessage, Server } from 'node:http';
import type { Duplex } from 'node:stream';
import { WebSocketServer, type WebSocket } from 'ws';
import { liveProtocol } from '../../core/live/message.ts';
import { sourceProtocol } from '../../core/protocol/source-messages.ts';
import { mayDoSomewhere } from '../../core/access/may-do.ts';
import type { Caller } from '../access/caller.ts';
import { isForeignHost } from '../access/foreign-host.ts';
import { hasForeignOrigin } from '../access/foreign-origin.ts';
import type { Guard } from '../access/guard.ts';
import { networkOf } from '../access/network-of.ts';
import { bearerToken } from '../ingest/bearer-token.ts';
import type { Hops } from './hops.ts';
import { RateLimit } from './rate-limit.ts';
import type { Sender } from '../pipeline/arrival.ts';

/** Who may connect, and what happens then. */
export interface SocketHost {
  /** Largest message of a source, bytes. */
  readonly frameBytes: number;
  readonly senderOf: (token: string) => Promise<Sender | undefined>;
  /** Puts on record that somebody came with a token nobody has. */
  readonly tokenUnknown: (what: string, address: string) => Promise<void>;
  readonly onSource: (socket: WebSocket, sender: Sender) => void;
  readonly onDashboard: (socket: WebSocket, caller: Caller) => void;
  readonly guard: Guard;
  readonly hops: Hops;
  /** Whether only this machine's own names are answered to. */
  readonly ownHostsOnly: boolean;
  /** Upgrades a second from one address; the burst is ten times as many. */
  readonly upgradesPerSecond: number;
  /** Sockets open at the same time from one address at most. */
  readonly mostOfAddress: number;
  /** Why nobody is let in now; undefined if they are. */
  readonly closedBecause: () => string | undefined;
  readonly mostDashboards: number;
  readonly onError: (cause: Error) => void;
}

const offered = (request: IncomingMessage): readonly string[] => (request.headers['sec-websocket-protocol'] ?? '').split(',').map((name) => name.trim());

/**
 * Answers upgrade requests on /source and /live. A request that cannot be served is answered in HTTP before the
 * upgrade, with the refusal's code as the body.
 *
 * @returns how to stop: no upgrade is answered any more
 */
export function serveSockets(server: Server, host: SocketHost): () => void {
  const sources = new WebSocketServer({ noServer: true, maxPayload: host.frameBytes, perMessageDeflate: false, handleProtocols: () => sourceProtocol });
  const dashboards = new WebSocketServer({ noServer: true, maxPayload: 1_024, perMessageDeflate: false, handleProtocols: () => liveProtocol });

  const limit = new RateLimit(host.upgradesPerSecond, 10 * host.upgradesPerSecond);
  const open = new Map<string, number>();

  /** Counts a socket of an address until it closes. @returns whether there is room for it */
  function hasRoom(address: string, socket: Duplex): boolean {
    const count = open.get(address) ?? 0;
    if (count >= host.mostOfAddress) return false;
    open.set(address, count + 1);
    socket.once('close', () => {
      const left = (open.get(address) ?? 1) - 1;
      if (left <= 0) open.delete(address);
      else open.set(address, left);
    });
    return true;
  }

  async function upgradeSource(request: IncomingMessage, socket: Duplex, head: Buffer): Promise<void> {
    const closed = host.closedBecause();
    if (closed !== undefined) return refuse(socket, 503, closed);
    if (!offered(request).includes(sourceProtocol)) return refuse(socket, 400, 'subprotocol-missing');
    const token = bearerToken(request.headers);
    if (token === undefined) return refuse(socket, 401, 'token-missing');
    const sender = await host.senderOf(token);
    if (sender === undefined) {
      await host.tokenUnknown('/source', host.hops.addressOf(request));
      return refuse(socket, 401, 'token-unknown');
    }
    sources.handleUpgrade(request, socket, head, (opened) => {
      opened.on('error', host.onError);
      host.onSource(opened, sender);
    });
  }

  function upgradeDashboard(request: IncomingMessage, socket: Duplex, head: Buffer): void {
    const closed = host.closedBecause();
    if (closed !== undefined) return refuse(socket, 503, closed); // What is in memory is ahead of the disk: it is not shown as live.
    if (!offered(request).includes(liveProtocol)) return refuse(socket, 400, 'subprotocol-missing');
    const caller = host.guard.callerOf({ headers: request.headers, address: host.hops.addressOf(request) });
    if (caller === undefined) return refuse(socket, 401, 'not-signed-in');
    if (!mayDoSomewhere(caller, 'see')) {
      void host.guard.noteRefused(caller, 'see', '/live').then(() => refuse(socket, 403, 'not-allowed'));
      return;
    }
    if (dashboards.clients.size >= host.mostDashboards) return refuse(socket, 503, 'too-many-dashboards');
    dashboards.handleUpgrade(request, socket, head, (opened) => {
      opened.on('error', host.onError);
      host.onDashboard(opened, caller);
    });
  }

  function onUpgrade(request: IncomingMessage, socket: Duplex, head: Buffer): void {
    socket.on('error', host.onError);
    const path = (request.url ?? '').split('?')[0];
    const address = networkOf(host.hops.addressOf(request));
    const asked = host.hops.hostOf(request);
    const wait = limit.take(address);
    if (wait > 0) refuse(socket, 429, 'too-many-connections', wait);
    else if (!hasRoom(address, socket)) refuse(socket, 503, 'too-many-connections', 10_000);
    else if (host.ownHostsOnly && isForeignHost(asked)) refuse(socket, 403, 'foreign-host');
    else if (hasForeignOrigin(request.headers, asked, host.hops.isSecure(request))) refuse(socket, 403, 'foreign-origin');
    else if (path === '/live') upgradeDashboard(request, socket, head);
    else if (path === '/source') {
      upgradeSource(request, socket, head).catch((cause: unknown) => {
        host.onError(cause as Error);
        refuse(socket, 500, 'not-stored');
      });
    } else refuse(socket, 404, 'no-such-socket');
  }

  server.on('upgrade', onUpgrade);
  return () => {
    server.off('upgrade', onUpgrade);
    sources.close();
    dashboards.close();
  };
}

const reasons: Readonly<Record<number, string>> = { 400: 'Bad Request', 401: 'Unauthorized', 403: 'Forbidden', 404: 'Not Found', 429: 'Too Many Requests', 500: 'Internal Server Error', 503: 'Service Unavailable' };

/** @param waitMs after which it may be tried again */
function refuse(socket: Duplex, status: number, code: string, waitMs?: number): void {
  if (socket.destroyed) return;
  const body = JSON.stringify({ code });
  socket.once('finish', () => socket.destroy()); // A peer that never closes its side would hold the socket for ever.
  socket.end(`HTTP/1.1 ${status} ${reasons[status] ?? ''}\r\nContent-Type: application/json\r\nContent-Length: ${Buffer.byteLength(body)}\r\nConnection: close\r\n${waitMs === undefined ? '' : `Retry-After: ${Math.ceil(waitMs / 1000)}\r\n`}\r\n${body}`);
}
