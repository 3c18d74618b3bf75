import type { FastifyInstance, FastifyReply, FastifyRequest } from 'fastify';
import { mayDo, mayDoSomewhere } from '../../core/access/may-do.ts';
import { whoDoes, type Caller } from '../access/caller.ts';
import type { Guard } from '../access/guard.ts';
import { NotAllowed, NotSignedIn } from './refusals.ts';
import { checked } from './request-schemas.ts';
import type { AnyRoute, Asked, Need } from './route.ts';

/**
 * Puts routes on the server. Each request is let in before anything of it is believed: who asks, whether they may, and
 * only then whether what they ask is well formed.
 */
export function serveRoutes(http: FastifyInstance, routes: readonly AnyRoute[], guard: Guard): void {
  for (const one of routes) {
    http.route({ method: one.method, url: one.path, ...(one.bodyBytes === undefined ? {} : { bodyLimit: one.bodyBytes }), handler: (request, reply) => answered(one, request, reply, guard) });
  }
}

async function answered(one: AnyRoute, request: FastifyRequest, reply: FastifyReply, guard: Guard): Promise<unknown> {
  const caller = guard.callerOf({ headers: request.headers, address: request.ip });
  const params = one.params && checked(one.params, request.params);
  const asker = one.needs === 'nobody' ? caller : await letIn(caller, one, params, request, guard);
  const query = one.query && checked(one.query, request.query);
  const body = one.body && checked(one.body, request.body);
  const asked = { params, query, body, caller: asker, request, reply };
  return (one.handle as (asked: Asked<undefined, undefined, undefined>) => unknown)(asked as never);
}

/** @throws NotSignedIn, NotAllowed (and that is on record) */
async function letIn(caller: Caller | undefined, { method, path, needs }: AnyRoute, params: unknown, request: FastifyRequest, guard: Guard): Promise<Caller> {
  if (caller === undefined) throw new NotSignedIn();
  const { action, at } = needs as Need;
  const doer = whoDoes(caller, action);
  if (caller.cookie && method !== 'GET' && request.headers.origin === undefined) {
    throw new NotAllowed('A browser says where a changing request comes from (Origin), and this one does not.');
  }
  const allowed = at === 'somewhere' ? mayDoSomewhere(doer, action) : mayDo(doer, action, at === 'plant' ? undefined : at(params));
  if (allowed) {
    if (doer !== caller && caller.by !== undefined) guard.noteActed(caller.by);
    return doer;
  }
  await guard.noteRefused(doer, action, `${method} ${path}`);
  throw new NotAllowed(`Your roles do not allow this (${action}).`);
}
