import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import fastifyStatic from '@fastify/static';
import { fastify, type FastifyInstance } from 'fastify';
import { hasForeignOrigin } from '../access/foreign-origin.ts';

/** Where the built dashboard lies: beside the built server, also for a server that runs from its sources (tests). */
const folder = fileURLToPath(new URL(import.meta.url.endsWith('.ts') ? '../../.build/client' : '../../client', import.meta.url));

const securityHeaders = {
  'content-security-policy':
    "default-src 'self'; script-src 'self'; style-src 'self'; img-src 'self' data:; connect-src 'self'; font-src 'self'; object-src 'none'; base-uri 'none'; form-action 'self'; frame-ancestors 'none'",
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'no-referrer',
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
} as const;

/** Requests other than record uploads are small, bytes. */
const bodyLimit = 65_536;

/** An HTTP server with the dashboard's files, safe headers and one form of error; routes are added by the caller. */
export async function httpServer(): Promise<FastifyInstance> {
  // An upload may take its time, but a connection that says nothing is ended.
  const http = fastify({ bodyLimit, forceCloseConnections: true, requestTimeout: 0, connectionTimeout: 60_000, return503OnClosing: true });
  http.addHook('onRequest', async (request, reply) => {
    if (request.method !== 'GET' && request.method !== 'HEAD' && hasForeignOrigin(request.headers)) {
      await reply.status(403).send({ message: 'this was asked by a page of another place; expected a page of this server or a program' });
    }
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
