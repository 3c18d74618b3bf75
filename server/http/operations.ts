import type { FastifyInstance } from 'fastify';
import type { Measures } from '../ops/measures.ts';
import type { Store } from '../store/store.ts';

export interface OperationsHost {
  readonly store: Store;
  readonly measures: Measures;
}

/** /healthz: the process answers. /readyz: records are taken and made durable. /metrics: OpenMetrics text. */
export function serveOperations(http: FastifyInstance, { store, measures }: OperationsHost): void {
  http.get('/healthz', () => ({ status: 'ok' }));
  http.get('/readyz', (_request, reply) => {
    const { condition } = store;
    if (condition.kind === 'open') return reply.send({ status: 'ready' });
    return reply.status(503).send({ status: 'not ready', why: condition.kind === 'refused' ? condition.error.message : 'stopping' });
  });
  http.get('/metrics', async (_request, reply) => reply.header('content-type', measures.registry.contentType).send(await measures.registry.metrics()));
}
