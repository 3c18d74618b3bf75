import { fastify, type FastifyInstance } from 'fastify';
import * as v from 'valibot';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { anybody, type Caller } from '../../../server/access/caller.ts';
import type { Guard } from '../../../server/access/guard.ts';
import { NotFound } from '../../../server/http/refusals.ts';
import { route } from '../../../server/http/route.ts';
import { serveRoutes } from '../../../server/http/serve-routes.ts';

const supervisorOfA: Caller = { kind: 'account', name: 'Ines Maurer', account: 'ines', by: 's1', cookie: true, grants: [{ role: 'supervisor', line: 'A' }] };
const routes = [
  route({ method: 'GET', path: '/open', summary: 'open', needs: 'nobody', answer: v.any(), handle: ({ caller }) => ({ name: (caller as Caller | undefined)?.name ?? 'nobody' }) }),
  route({ method: 'GET', path: '/boards', summary: 'boards', needs: { action: 'see', at: 'somewhere' }, answer: v.any(), handle: () => 'boards' }),
  route({ method: 'GET', path: '/changes', summary: 'changes', needs: { action: 'read-changes', at: 'plant' }, answer: v.any(), handle: () => 'changes' }),
  route({
    method: 'POST', path: '/lines/:line/acknowledge', summary: 'acknowledge', params: v.object({ line: v.string() }), body: v.strictObject({ note: v.string() }),
    needs: {
      action: 'acknowledge',
      at: ({ line }: { readonly line: string }) => {
        if (line === 'C') throw new NotFound('there is no line C');
        return line;
      },
    },
    answer: v.string(),
    handle: ({ body }) => body.note,
  }),
];

let http: FastifyInstance;
let caller: Caller | undefined;
let refused: string[];
beforeEach(() => {
  http = fastify();
  refused = [];
  caller = supervisorOfA;
  const guard: Guard = { callerOf: () => caller, noteRefused: (who, action, what) => Promise.resolve(void refused.push(`${who.name ?? ''} ${action} ${what}`)), noteActed: () => undefined };
  serveRoutes(http, routes, guard);
});
afterEach(() => http.close());

const post = (line: string, body: object = { note: 'held' }, headers: Record<string, string> = { origin: 'http://x' }): Promise<number> =>
  http.inject({ method: 'POST', url: `/lines/${line}/acknowledge`, payload: body, headers }).then(({ statusCode }) => statusCode);
const get = async (url: string): Promise<number> => (await http.inject(url)).statusCode;

describe('a route', () => {
  it('is open to nobody unless it says so', async () => {
    caller = undefined;
    expect([await get('/open'), await get('/boards'), await get('/changes'), await post('A')]).toEqual([200, 401, 401, 401]);
    expect(refused).toEqual([]);
  });

  it('asks for a role where the thing happens, and records who was refused', async () => {
    expect([await get('/boards'), await post('A'), await post('B'), await get('/changes'), await post('C')]).toEqual([200, 200, 403, 403, 404]);
    expect(refused).toEqual(['Ines Maurer acknowledge POST /lines/:line/acknowledge', 'Ines Maurer read-changes GET /changes']);
  });

  it('lets a token do only what it is for', async () => {
    caller = { ...anybody, kind: 'token', onlyActions: ['see'] };
    expect([await get('/boards'), await get('/changes'), await post('A')]).toEqual([200, 403, 403]);
  });

  it('takes no changing request by a cookie that does not say where it comes from', async () => {
    expect(await post('A', { note: '' }, {})).toBe(403);
    caller = { ...supervisorOfA, cookie: false };
    expect(await post('A', { note: '' }, {})).toBe(200);
  });

  it('decides who may before it reads what is asked', async () => {
    expect([await post('B', { wrong: 1 }), await post('A', { wrong: 1 })]).toEqual([403, 400]);
  });
});
