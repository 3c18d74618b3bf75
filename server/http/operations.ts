import type { FastifyInstance, FastifyRequest } from 'fastify';
import { mayDo } from '../../core/access/may-do.ts';
import type { Guard } from '../access/guard.ts';
import { isLoopback } from '../access/open-access.ts';
import type { Measures } from '../ops/measures.ts';
import { NotSignedIn } from './refusals.ts';
import type { Store } from '../store/store.ts';

export interface OperationsHost {
  readonly store: Store;
  readonly measures: Measures;
  /** Whether a request may read the measures. */
  readonly maySeeMeasures: (request: FastifyRequest) => boolean;
}

/**
 * /healthz: the process answers. /readyz: records are taken and made durable. /metrics: OpenMetrics text, for this machine
 * and for who sees the whole plant.
 */
export function serveOperations(http: FastifyInstance, { store, measures, maySeeMeasures }: OperationsHost): void {
  http.get('/healthz', () => ({ status: 'ok' }));
  http.get('/readyz', (_request, reply) => {
    const { condition } = store;
    if (condition.kind === 'open') return reply.send({ status: 'ready' });
    return reply.status(503).send({ status: 'not ready', why: condition.kind === 'refused' ? condition.error.message : 'stopping' });
  });
  http.get('/metrics', async (request, reply) => {
    if (!maySeeMeasures(request)) throw new NotSignedIn();
    return reply.header('content-type', measures.registry.contentType).send(await measures.registry.metrics());
  });
}

/** Scrapers on the same machine need no token; others need sight of the plant. */
export function mayReadMeasures(guard: Guard, request: FastifyRequest): boolean {
  // A proxy on this machine that nobody named makes every client look like this machine: what came through one needs a token.
  const forwarded = request.headers['x-forwarded-for'] !== undefined || request.headers.forwarded !== undefined;
  if (!forwarded && isLoopback(request.ip.replace(/^::ffff:/, ''))) return true;
  const caller = guard.callerOf({ headers: request.headers, address: request.ip });
  return caller !== undefined && mayDo(caller, 'see', undefined);
}
