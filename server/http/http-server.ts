import { existsSync, readFileSync } from 'node:fs';
import type { IncomingMessage } from 'node:http';
import { fileURLToPath } from 'node:url';
import fastifyStatic from '@fastify/static';
import { fastify, type FastifyInstance } from 'fastify';
import { isForeignHost } from '../access/foreign-host.ts';
import { hasForeignOrigin } from '../access/foreign-origin.ts';
import { networkOf } from '../access/network-of.ts';
import { TooManyTries } from '../access/too-many-tries.ts';
import type { Hops } from './hops.ts';
import { RateLimit } from './rate-limit.ts';
import type { TlsPair } from './tls.ts';

/** Where the built dashboard lies: beside the built server, also for a server that runs from its sources (tests). */
const folder = fileURLToPath(new URL(import.meta.url.endsWith('.ts') ? '../../.build/client' : '../../client', import.meta.url));

const securityHeaders = {
  'content-security-policy':
    "default-src 'self'; script-src 'self'; style-src 'self'; img-src 'self' data:; connect-src 'self'; font-src 'self'; object-src 'none'; base-uri 'none'; form-action 'self'; frame-ancestors 'none'",
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'no-referrer',
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
  'permissions-policy': 'camera=(), geolocation=(), microphone=(), payment=(), usb=()',
} as const;

/** Ends the connection of a request whose body does not arrive in time: who sends a byte a minute holds nothing open. */
function endIfLate(request: IncomingMessage, withinMs: number): void {
  if (request.complete) return;
  const timer = setTimeout(() => request.socket.destroy(), withinMs);
  timer.unref();
  request.once('close', () => clearTimeout(timer));
  request.once('end', () => clearTimeout(timer));
}

/** Requests other than record uploads are small, bytes. */
const bodyLimit = 65_536;

/** How the server meets the network. */
export interface HttpSetting {
  readonly hops: Hops;
  /** undefined: plain HTTP. */
  readonly tls: TlsPair | undefined;
  /** Whether only this machine's own names are answered to. */
  readonly ownHostsOnly?: boolean;
  /** Requests a second from one address; the burst is ten times as many. */
  readonly requestsPerSecond: number;
  /** How long a request that is no upload may take to arrive, ms. */
  readonly arriveWithinMs?: number;
}

const usualArrival = 20_000;
const uploads = '/source/records';

/** An HTTP server with the dashboard's files, safe headers and one form of error; routes are added by the caller. */
export async function httpServer({ hops, tls, requestsPerSecond, ownHostsOnly = false, arriveWithinMs = usualArrival }: HttpSetting): Promise<FastifyInstance> {
  // An upload may take its time, but a connection that says nothing is ended.
  const options = { bodyLimit, forceCloseConnections: true, requestTimeout: 0, connectionTimeout: 60_000, return503OnClosing: true, trustProxy: (address: string) => hops.trusts(address) } as const;
  // How often heads that are late are looked for; how long a head may be, bytes.
  const heads = { connectionsCheckingInterval: Math.min(5_000, arriveWithinMs), headersTimeout: arriveWithinMs, requestTimeout: 0, maxHeaderSize: 16_384 };
  const http = (tls === undefined ? fastify({ ...options, http: heads }) : fastify({ ...options, https: { ...heads, ...tls, minVersion: 'TLSv1.2' } })) as FastifyInstance;
  const limit = new RateLimit(requestsPerSecond, 10 * requestsPerSecond);
  http.addHook('onRequest', async (request, reply) => {
    const path = request.url.split('?')[0];
    if (path !== uploads) {
      const wait = limit.take(networkOf(request.ip));
      if (wait > 0) throw new TooManyTries(wait, 'requests at a time');
      endIfLate(request.raw, arriveWithinMs);
    }
    const host = hops.hostOf(request.raw);
    if (ownHostsOnly && isForeignHost(host)) {
      return reply.status(403).send({ message: `this was asked of ${JSON.stringify(host ?? '')}; without accounts this server answers to this machine's own names alone: localhost, 127.0.0.1` });
    }
    if (request.method !== 'GET' && request.method !== 'HEAD' && hasForeignOrigin(request.headers, host, hops.isSecure(request.raw))) {
      return reply.status(403).send({ message: 'this was asked by a page of another place; expected a page of this server or a program' });
    }
    return undefined;
  });
  http.addHook('onResponse', (request, _reply, done) => {
    endIfLate(request.raw, arriveWithinMs); // Answered before it was all there, as refused uploads are.
    done();
  });
  http.addHook('onSend', async (request, reply) => {
    if (!reply.hasHeader('cache-control')) reply.header('cache-control', 'no-store'); // What the files of the pages do not say of themselves is kept nowhere.
    if (hops.isSecure(request.raw)) reply.header('strict-transport-security', 'max-age=31536000');
  });
  http.addHook('onSend', async (_request, reply) => {
    reply.headers(securityHeaders);
  });
  http.setErrorHandler((error: Error & { statusCode?: number; field?: string; retryAfter?: number }, _request, reply) => {
    const status = error.statusCode ?? 500;
    const message = status >= 500 ? 'The server could not do this; its log says why.' : error.message;
    if (error.retryAfter !== undefined) reply.header('retry-after', String(error.retryAfter));
    void reply.status(status).send({ message, ...(error.field === undefined ? {} : { field: error.field }) });
  });
  const page = existsSync(`${folder}/index.html`) ? readFileSync(`${folder}/index.html`, 'utf8') : undefined;
  if (page !== undefined) {
    await http.register(fastifyStatic, { root: folder, index: 'index.html', maxAge: '1y', immutable: true, setHeaders: (response, path) => {
      if (path.endsWith('.html')) response.setHeader('cache-control', 'no-cache');
    } });
  }
  http.setNotFoundHandler((request, reply) => {
    const wantsPage = request.method === 'GET' && !/^\/(api|assets)\//.test(request.url) && (request.headers.accept ?? '').includes('text/html');
    if (wantsPage && page !== undefined) return reply.header('cache-control', 'no-cache').type('text/html').send(page);
    return reply.status(404).send({ message: `there is nothing at ${request.url.slice(0, 200)}` });
  });
  return http;
}
