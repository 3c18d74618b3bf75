import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Action } from '../../../core/access/action.ts';
import { mayDo, mayDoSomewhere } from '../../../core/access/may-do.ts';
import { roles, type Role } from '../../../core/access/role.ts';
import type { RecordedChange } from '../../../core/access/change.ts';
import type { Served } from '../../../server/serve.ts';
import { leakPlant, verdictPart } from '../plants.ts';
import { dataDirectory, servedOn, sourceTalk } from '../serving.ts';
import { SignedIn } from './signed-in.ts';

interface Described {
  readonly method: string;
  readonly path: string;
  readonly needs: { readonly action: Action; readonly at: 'plant' | 'somewhere' | 'the line it concerns' } | undefined;
}

const plant = leakPlant.replace('lines:\n', 'lines:\n  - { id: B, name: Hose line B, stations: [{ id: B.leak-test, name: Leak test }] }\n');
/** A role for the plant, and for a line that the guarantee asked about does not stand on. */
const places = [null, 'B'] as const;
const monday = Date.UTC(2026, 5, 1, 6);

let data: { path: string; remove: () => void };
let served: Served;
let administrator: SignedIn;
let table: readonly Described[];
const people = new Map<string, SignedIn>();

beforeAll(async () => {
  data = dataDirectory(plant);
  served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
  administrator = await SignedIn.byLink(served, served.firstLink!, 'first');
  for (const role of roles) for (const line of places) people.set(`${role} ${line ?? 'plant'}`, await administrator.invite(`${role}-${line ?? 'plant'}`, role, line));
  const { token } = await administrator.json<{ token: string }>('POST', '/api/sources', { name: 'leak-tester', stations: ['A.leak-test'], why: 'new' });
  const source = sourceTalk(served.address, token);
  await source.until((message) => message.type === 'welcome');
  source.send({ type: 'records', first: 1, parts: [verdictPart(1000, [], monday), verdictPart(10, [1, 3, 5, 7, 9], monday + 1_000_000)] });
  await source.until((message) => message.type === 'ack');
  source.socket.terminate();
  expect(await administrator.json('GET', '/api/alarms/standing')).toMatchObject([{ id: 1, guarantee: 'leak-A' }]);
  const { paths } = await administrator.json<{ paths: Record<string, Record<string, { 'x-needs'?: Described['needs'] }>> }>('GET', '/api/openapi.json');
  table = Object.entries(paths).flatMap(([path, methods]) => Object.entries(methods).map(([method, of]) => ({ method: method.toUpperCase(), path, needs: of['x-needs'] })));
});
afterAll(async () => {
  await served.stop('the test is over');
  data.remove();
});

/** With things that are there where it matters: an alarm of line A stands. */
const real = (path: string): string => path.replace('/guarantees/{id}', '/guarantees/leak-A').replace('/alarms/{id}', '/alarms/1').replace('{id}', '7').replace('{name}', 'nobody');

function expected(role: Role, line: string | null, needs: NonNullable<Described['needs']>): boolean {
  const granted = { grants: [{ role, line: line ?? undefined }] };
  return needs.at === 'somewhere' ? mayDoSomewhere(granted, needs.action) : mayDo(granted, needs.action, needs.at === 'plant' ? undefined : 'A');
}

describe('role by action by route', () => {
  it('has every route with what it needs', () => {
    expect(table.length).toBeGreaterThan(45);
    expect(table.filter(({ needs }) => needs === undefined).map(({ method, path }) => `${method} ${path}`).sort()).toEqual([
      'GET /api/me', 'GET /api/plant/example', 'GET /api/plant/schema', 'POST /api/display/sign-in', 'POST /api/invitations/accept', 'POST /api/invitations/look', 'POST /api/sign-in', 'POST /api/sign-in/passkey/begin', 'POST /api/sign-in/passkey/finish', 'POST /api/sign-out',
    ]);
  });

  it.each(roles.flatMap((role) => places.map((line) => [role, line] as const)))('%s of %s: what is allowed works, what is not is refused and on record', async (role, line) => {
    const person = people.get(`${role} ${line ?? 'plant'}`)!;
    const refused: string[] = [];
    for (const { method, path, needs } of table) {
      if (needs === undefined) continue;
      const answer = await person.ask(method, real(path), method === 'GET' ? undefined : {});
      const allowed = expected(role, line, needs);
      expect([method, path, [401, 403].includes(answer.status) ? answer.status : 'let in']).toEqual([method, path, allowed ? 'let in' : 403]);
      if (!allowed) refused.push(`${method} ${path.replaceAll(/\{(\w+)\}/g, ':$1')}`);
      if (path === '/api/own/sign-out-everywhere') await person.signIn();
    }
    const recorded = async (): Promise<string[]> =>
      (await administrator.json<RecordedChange[]>('GET', `/api/changes?kind=refused&holds=${encodeURIComponent(person.name)}&limit=1000`)).map(({ what }) => what).sort();
    await expect.poll(recorded, { timeout: 10_000 }).toEqual(refused.sort());
    expect(await person.live()).toBe(101);
  });

  it('nobody is let in anywhere but where it says so', async () => {
    for (const { method, path, needs } of table) {
      if (needs === undefined) continue;
      const { status } = await fetch(`${served.address}${real(path)}`, { method, ...(method === 'GET' ? {} : { headers: { 'content-type': 'application/json' }, body: '{}' }) });
      expect([method, path, status]).toEqual([method, path, 401]);
    }
  });

  it('a token without sight opens no live socket, and that is on record', async () => {
    const { token } = await administrator.json<{ token: string }>('POST', '/api/own/tokens', { name: 'accounts only', actions: ['manage-accounts'], days: 1 });
    expect(await administrator.live({ authorization: `Bearer ${token}` })).toBe(403);
    await expect.poll(() => administrator.json<RecordedChange[]>('GET', '/api/changes?kind=refused&holds=/live')).toMatchObject([{ who: 'first Holm', what: '/live', after: { action: 'see', by: 'token' } }]);
  });
});
