import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { actions } from '../../../core/access/action.ts';
import { mayDo, mayDoSomewhere } from '../../../core/access/may-do.ts';
import { roles, type Role } from '../../../core/access/role.ts';
import type { RecordedChange } from '../../../core/access/change.ts';
import type { Served } from '../../../server/serve.ts';
import { leakPlant, verdictPart } from '../plants.ts';
import { dataDirectory, servedOn, sourceTalk } from '../serving.ts';
import { DescribedAnswers, type Described, type Description } from './described-answers.ts';
import { realRequest, targetOf } from './real-requests.ts';
import { SignedIn } from './signed-in.ts';

/** A role for the plant, and for a line that the guarantee asked about does not stand on. */
const places = [null, 'B'] as const;
const people = roles.flatMap((role) => places.map((line) => [role, line] as const));
const nameOf = (role: Role, line: string | null): string => `${role}-${line ?? 'plant'}`;
const alarmOf = (role: Role, line: string | null): string => `leak-${nameOf(role, line)}`;

const [head, leak] = leakPlant.split('guarantees:\n') as [string, string];
/** One guarantee, so one alarm, for each to acknowledge. */
const plant = `${head.replace('lines:\n', 'lines:\n  - { id: B, name: Hose line B, stations: [{ id: B.leak-test, name: Leak test }] }\n')}guarantees:\n${leak}${people.map(([role, line]) => leak.replace('leak-A', alarmOf(role, line))).join('')}`;
const monday = Date.UTC(2026, 5, 1, 6);

let data: { path: string; remove: () => void };
let served: Served;
let administrator: SignedIn;
let target: string;
let answers: DescribedAnswers;
const signedIn = new Map<string, SignedIn>();

beforeAll(async () => {
  data = dataDirectory(plant);
  served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
  administrator = await SignedIn.byLink(served, served.firstLink!, 'first');
  for (const [role, line] of people) signedIn.set(nameOf(role, line), await administrator.invite(nameOf(role, line), role, line));
  target = await targetOf(administrator);
  const { token } = await administrator.json<{ token: string }>('POST', '/api/sources', { name: 'leak-tester', stations: ['A.leak-test'], why: 'new' });
  const source = sourceTalk(served.address, token);
  await source.until((message) => message.type === 'welcome');
  source.send({ type: 'records', first: 1, parts: [verdictPart(1000, [], monday), verdictPart(10, [1, 3, 5, 7, 9], monday + 1_000_000)] });
  await source.until((message) => message.type === 'ack');
  source.socket.terminate();
  expect(await administrator.json<object[]>('GET', '/api/alarms/standing')).toHaveLength(1 + people.length);
  answers = new DescribedAnswers(await administrator.json<Description>('GET', '/api/openapi.json'));
}, 60_000);
afterAll(async () => {
  await served.stop('the test is over');
  data.remove();
});

function allowed(role: Role, line: string | null, needs: NonNullable<Described['needs']>): boolean {
  const granted = { grants: [{ role, line: line ?? undefined }] };
  return needs.at === 'somewhere' ? mayDoSomewhere(granted, needs.action) : mayDo(granted, needs.action, needs.at === 'plant' ? undefined : 'A');
}

const refusedOf = async (holds: string): Promise<RecordedChange[]> => administrator.json('GET', `/api/changes?kind=refused&holds=${encodeURIComponent(holds)}&limit=1000`);
const asRoute = (method: string, path: string): string => `${method} ${path.replaceAll(/\{(\w+)\}/g, ':$1')}`;

describe('role by action by route', () => {
  it('has every route with what it needs', () => {
    expect(answers.table.length).toBeGreaterThan(45);
    expect(answers.table.filter(({ needs }) => needs === undefined).map(({ method, path }) => `${method} ${path}`).sort()).toEqual([
      'GET /api/me', 'GET /api/plant/example', 'GET /api/plant/schema', 'POST /api/display/sign-in', 'POST /api/invitations/accept', 'POST /api/invitations/look', 'POST /api/sign-in', 'POST /api/sign-in/passkey/begin', 'POST /api/sign-in/passkey/finish', 'POST /api/sign-out',
    ]);
  });

  it.each(people)('%s of %s: what is allowed works and is answered as described, what is not is refused and on record', async (role, line) => {
    const person = signedIn.get(nameOf(role, line))!;
    const refused: string[] = [];
    for (const { method, path, needs } of answers.table) {
      if (needs === undefined) continue;
      const asked = await realRequest(method, path, { served, administrator, person, target, guarantee: alarmOf(role, line) });
      const answer = await person.ask(method, asked.path, asked.body);
      const may = allowed(role, line, needs);
      const status = may ? (asked.status ?? (answer.ok ? answer.status : 'done')) : 403;
      expect([method, path, answer.status, await answers.faults(method, path, answer)]).toEqual([method, path, status, []]);
      if (!may) refused.push(asRoute(method, path));
      if (path === '/api/own/sign-out-everywhere') await person.signIn();
    }
    expect((await refusedOf(person.name)).map(({ what }) => what).sort()).toEqual(refused.sort());
    expect(await person.live()).toBe(101);
  }, 30_000);

  it.each(actions)('a token for %s does that and nothing else, of what its owner may', async (action) => {
    const { token } = await administrator.json<{ token: string }>('POST', '/api/own/tokens', { name: `only ${action}`, actions: [action], days: 1 });
    const headers = { 'content-type': 'application/json', authorization: `Bearer ${token}` };
    for (const { method, path, needs } of answers.table) {
      if (needs === undefined) continue;
      const { status } = await fetch(`${served.address}${path.replace('{id}', path.includes('/alarms/') ? '1' : 'leak-A')}`, { method, headers, ...(method === 'GET' ? {} : { body: '{}' }) });
      if (path.startsWith('/api/terminal/')) continue; // Nobody acts by PIN at a token.
      if (action === 'keep-own-account' && method !== 'GET') continue; // See the next test.
      expect([method, path, status === 403]).toEqual([method, path, needs.action !== action]);
    }
  });

  it.each([['GET', 200], ['POST', 403], ['PUT', 403], ['DELETE', 403]] as const)('a token changes nothing of its owner’s account: %s', async (verb, status) => {
    const { token } = await administrator.json<{ token: string }>('POST', '/api/own/tokens', { name: 'own account', actions: ['keep-own-account'], days: 1 });
    for (const { method, path, needs } of answers.table) {
      if (method !== verb || needs?.action !== 'keep-own-account' || path.endsWith('/finish')) continue; // There is nothing to finish that a token could not begin.
      const asked = await realRequest(method, path, { served, administrator, person: administrator, target, guarantee: 'leak-A' });
      const answer = await administrator.ask(method, asked.path, asked.body, { authorization: `Bearer ${token}` });
      expect([path, answer.status]).toEqual([path, status]);
    }
  });

  it('nobody is let in anywhere but where it says so', async () => {
    for (const { method, path, needs } of answers.table) {
      if (needs === undefined) continue;
      const { status } = await fetch(`${served.address}${path.replace('{id}', 'leak-A')}`, { method, ...(method === 'GET' ? {} : { headers: { 'content-type': 'application/json' }, body: '{}' }) });
      expect([method, path, path.includes('/alarms/{') ? [400, 401].includes(status) : status]).toEqual([method, path, path.includes('/alarms/{') ? true : 401]);
    }
  });

  it('what is open to all is answered as described', async () => {
    for (const path of ['/api/me', '/api/plant/example', '/api/plant/schema']) {
      expect([path, await answers.faults('GET', path, await fetch(`${served.address}${path}`))]).toEqual([path, []]);
      expect([path, await answers.faults('GET', path, await administrator.ask('GET', path))]).toEqual([path, []]);
    }
  });

  it('a token without sight opens no live socket, and that is on record', async () => {
    const { token } = await administrator.json<{ token: string }>('POST', '/api/own/tokens', { name: 'accounts only', actions: ['manage-accounts'], days: 1 });
    expect(await administrator.live({ authorization: `Bearer ${token}` })).toBe(403);
    expect(await refusedOf('/live')).toMatchObject([{ who: 'first Holm', what: '/live', after: { action: 'see', by: 'token' } }]);
  });
});

describe('what is refused to sources', () => {
  const source = async (name: string): Promise<string> => (await administrator.json<{ token: string }>('POST', '/api/sources', { name, stations: ['B.leak-test'], why: 'new' })).token;

  it('is on record: a frame for the station of another, once a minute', async () => {
    const talk = sourceTalk(served.address, await source('b-tester'));
    await talk.until((message) => message.type === 'welcome');
    for (let time = 0; time < 3; time += 1) {
      talk.send({ type: 'records', first: 1, parts: [verdictPart(10, [], monday)] });
      expect(await talk.until((message) => message.type === 'refused')).toMatchObject({ code: 'station-not-allowed' });
    }
    await expect.poll(() => refusedOf('b-tester')).toMatchObject([{ who: 'source b-tester', what: 'records of station A.leak-test', after: { code: 'station-not-allowed', allowed: 'B.leak-test' } }]);
    talk.socket.terminate();
  });

  it('is on record: a row for the station of another', async () => {
    const row = JSON.stringify({ sequence: 1, time: monday, station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', verdict: 'conforming' });
    const headers = { authorization: `Bearer ${await source('c-tester')}`, 'content-type': 'application/x-ndjson' };
    expect((await fetch(`${served.address}/source/records`, { method: 'POST', headers, body: row })).status).toBe(403);
    await expect.poll(() => refusedOf('c-tester')).toMatchObject([{ what: 'records of station A.leak-test' }]);
  });

  it('is on record: a token that nobody has, by either way, with where it came from', async () => {
    const token = await source('d-tester');
    await administrator.json('POST', '/api/sources/d-tester/withdraw', { why: 'lost' });
    const talk = sourceTalk(served.address, token);
    await talk.closed;
    const { status } = await fetch(`${served.address}/source/records`, { method: 'POST', headers: { authorization: `Bearer ${token}`, 'content-type': 'text/csv' }, body: '' });
    expect(status).toBe(401);
    const recorded = await administrator.json<RecordedChange[]>('GET', '/api/changes?kind=refused&limit=2');
    expect(recorded.map(({ who, what, after }) => ({ who, what, after }))).toEqual(
      ['POST /source/records', '/source'].map((what) => ({ who: 'unknown', what, after: { code: 'token-unknown', address: '127.0.0.1' } })),
    );
  });
});
