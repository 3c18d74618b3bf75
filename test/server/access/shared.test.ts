import * as v from 'valibot';
import { beforeEach, describe, expect, it } from 'vitest';
import { openGuard } from '../../../server/access/guard.ts';
import { actingName } from '../../../server/http/acting-name.ts';
import { route } from '../../../server/http/route.ts';
import { serveRoutes } from '../../../server/http/serve-routes.ts';
import { password, Plant, type Person } from './people.ts';

const onLine = v.object({ line: v.string() });
type OnLine = v.InferOutput<typeof onLine>;

let plant: Plant;
let olaf: Person;
beforeEach(async () => {
  plant = await new Plant().open();
  serveRoutes(plant.http, [
    route({ method: 'POST', path: '/acknowledge/:line', summary: '', params: onLine, needs: { action: 'acknowledge', at: ({ line }: OnLine) => line }, answer: v.looseObject({}), handle: ({ caller }) => ({ by: actingName(caller, undefined) }) }),
    route({ method: 'GET', path: '/boards', summary: '', needs: { action: 'see', at: 'somewhere' }, answer: v.looseObject({}), handle: () => ({}) }),
    route({ method: 'GET', path: '/boards/:line', summary: '', params: onLine, needs: { action: 'see', at: ({ line }: OnLine) => line }, answer: v.looseObject({}), handle: () => ({}) }),
  ], plant.access.guard);
  olaf = await plant.administrator();
});

async function display(of: object): Promise<{ screen: Person; id: string }> {
  const { body } = await olaf.ask('POST', '/api/displays', of);
  const screen = plant.person('10.0.0.20');
  expect((await screen.ask('POST', '/api/display/sign-in', { token: (body['link'] as string).split('#')[1] })).status).toBe(200);
  return { screen, id: String(body['id']) };
}

describe('a display', () => {
  it('sees its line, does nothing, and is revoked at once', async () => {
    const { screen, id } = await display({ name: 'Hall 2' });
    expect([(await screen.ask('GET', '/boards')).status, (await screen.ask('GET', '/api/own/sessions')).status, (await screen.ask('GET', '/api/accounts')).status]).toEqual([200, 403, 403]);
    expect((await screen.ask('GET', '/api/terminal/people')).status).toBe(403);
    const ended: string[] = [];
    plant.access.onEnded((by) => ended.push(by));
    expect((await olaf.ask('DELETE', `/api/displays/${id}`)).status).toBe(204);
    expect([(await screen.ask('GET', '/boards')).status, ended, plant.access.isOver(id)]).toEqual([401, [id], true]);
  });

  it('of one line sees that line alone', async () => {
    const { screen } = await display({ name: 'Hall 2', line: 'A' });
    expect([(await screen.ask('GET', '/boards/A')).status, (await screen.ask('GET', '/boards/B')).status, (await screen.ask('POST', '/acknowledge/A', {})).status]).toEqual([200, 403, 403]);
  });

  it('can only be of a line there is', async () => {
    expect((await olaf.ask('POST', '/api/displays', { name: 'Hall 3', line: 'Q' })).body['field']).toBe('line');
  });
});

describe('acting by PIN', () => {
  let mette: string;
  beforeEach(async () => {
    const person = await plant.account(olaf, 'mette', [{ role: 'maintenance', line: null }]);
    expect((await person.ask('PUT', '/api/own/pin', { password, pin: '1234' })).body['field']).toBe('pin');
    expect((await person.ask('PUT', '/api/own/pin', { password, pin: '2846' })).status).toBe(204);
    mette = ((await person.ask('GET', '/api/me')).body['caller'] as { account: string }).account;
  });

  it("is under the person's own name, for what a PIN is for, and for two minutes from the last act", async () => {
    const { screen } = await display({ name: 'Hall 2', acting: true });
    expect((await screen.ask('GET', '/api/terminal/people')).body).toEqual([{ account: mette, shownAs: 'mette Holm' }]);
    expect((await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: '9999' })).status).toBe(401);
    expect((await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: '2846' })).body).toMatchObject({ name: 'mette Holm', until: plant.now + 120_000 });
    expect(((await screen.ask('GET', '/api/me')).body['caller'] as { pin: object }).pin).toMatchObject({ name: 'mette Holm' });
    const me = (await screen.ask('GET', '/api/me')).body['caller'] as { may: Record<string, { plant: boolean }> };
    expect([me.may['acknowledge']!.plant, me.may['restart-evidence']!.plant]).toEqual([true, false]);
    plant.now += 119_000;
    expect((await screen.ask('POST', '/acknowledge/A', {})).body).toEqual({ by: 'mette Holm' });
    plant.now += 119_000;
    expect((await screen.ask('GET', '/api/me')).body['caller']).toMatchObject({ pin: { name: 'mette Holm' } });
    plant.now += 1_001;
    expect((await screen.ask('GET', '/api/me')).body['caller']).toMatchObject({ pin: null });
  });

  it('is not guessed: tries are slowed down for the screen and for the person', async () => {
    const { screen } = await display({ name: 'Hall 2', acting: true });
    for (let tries = 0; tries < 4; tries += 1) await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: `000${tries}` });
    const slowed = await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: '2846' });
    expect([slowed.status, slowed.retryAfter]).toEqual([429, '10']);
    const { screen: another } = await display({ name: 'Hall 4', acting: true });
    expect((await another.ask('POST', '/api/terminal/act-as', { account: mette, pin: '2846' })).status).toBe(429);
    plant.now += 10_000;
    expect((await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: '2846' })).status).toBe(200);
  });

  it('is on record, and so are PINs that were wrong: whose, and at which screen', async () => {
    const { screen } = await display({ name: 'Hall 2', acting: true });
    await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: '9999' });
    await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: '2846' });
    const told = (await plant.changes()).filter(({ after }) => (after as { by?: string } | null)?.by === 'PIN').map(({ kind, who, what, after }) => [kind, who, what, after]);
    expect(told).toEqual(expect.arrayContaining([
      ['sign-in-failed', 'unknown', 'account mette', { by: 'PIN', at: 'display Hall 2' }],
      ['sign-in', 'mette Holm', 'account mette', { by: 'PIN', at: 'display Hall 2' }],
    ]));
  });

  it('ten at the same time are not ten guesses', async () => {
    const { screen } = await display({ name: 'Hall 2', acting: true });
    const all = await Promise.all(Array.from({ length: 10 }, (_, k) => screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: `000${k}` })));
    expect(all.filter(({ status }) => status === 401).length).toBe(4);
  });

  it('ends when it is ended', async () => {
    const { screen } = await display({ name: 'Hall 2', acting: true });
    await screen.ask('POST', '/api/terminal/act-as', { account: mette, pin: '2846' });
    expect((await screen.ask('DELETE', '/api/terminal/act-as')).status).toBe(204);
    expect((await screen.ask('GET', '/api/me')).body['caller']).toMatchObject({ pin: null });
  });
});

describe('an API token', () => {
  const asked = (token: string): Record<string, string> => ({ authorization: `Bearer ${token}` });

  it('does what it is for, within what its owner may do now, until it is revoked', async () => {
    const mette = await plant.account(olaf, 'mette', [{ role: 'engineer', line: null }]);
    const { body } = await mette.ask('POST', '/api/own/tokens', { name: 'nightly', actions: ['see', 'manage-accounts'], grants: [{ role: 'engineer', line: 'A' }, { role: 'administrator', line: null }], days: 10 });
    const [id, token] = [String(body['id']), String(body['token'])];
    const program = plant.person();
    expect((await program.ask('GET', '/boards', undefined, asked(token))).status).toBe(200);
    expect((await program.ask('GET', '/api/accounts', undefined, asked(token))).status).toBe(403);
    expect((await program.ask('POST', '/api/own/sign-out-everywhere', {}, asked(token))).status).toBe(403);
    expect((await mette.ask('GET', '/api/own/tokens')).body).toMatchObject([{ id, name: 'nightly' }]);
    expect(JSON.stringify((await mette.ask('GET', '/api/own/tokens')).body)).not.toContain(token);
    expect((await olaf.ask('DELETE', `/api/own/tokens/${id}`)).status).toBe(404);
    expect((await mette.ask('DELETE', `/api/own/tokens/${id}`)).status).toBe(204);
    expect((await program.ask('GET', '/boards', undefined, asked(token))).status).toBe(401);
  });

  it('runs out, and dies with its account', async () => {
    const mette = await plant.account(olaf, 'mette', [{ role: 'viewer', line: null }]);
    const made = async (days: number): Promise<string> => String((await mette.ask('POST', '/api/own/tokens', { name: 't', actions: ['see'], days })).body['token']);
    const [short, long] = [await made(1), await made(300)];
    const status = async (token: string): Promise<number> => (await plant.person().ask('GET', '/boards', undefined, asked(token))).status;
    plant.now += 86_400_000;
    expect([await status(short), await status(long)]).toEqual([401, 200]);
    await olaf.signIn('olaf');
    const id = ((await olaf.ask('GET', '/api/accounts')).body as unknown as { id: string; name: string }[]).find(({ name }) => name === 'mette')!.id;
    await olaf.ask('PUT', `/api/accounts/${id}`, { disabled: true, why: 'left' });
    expect(await status(long)).toBe(401);
  });
});

describe('a request of another place', () => {
  it('changes nothing by a cookie, with or without saying where it comes from', async () => {
    const forged = (headers: Record<string, string>): Promise<{ status: number }> => olaf.ask('POST', '/api/invitations', { grants: [] }, headers);
    expect((await forged({ origin: 'http://evil.example' })).status).toBe(403);
    expect((await forged({ origin: 'null' })).status).toBe(403);
    const bare = await plant.http.inject({ method: 'POST', url: '/api/invitations', headers: { host: 'plant.example', cookie: olaf.cookie! }, payload: { grants: [] } });
    expect(bare.statusCode).toBe(403);
  });
});

it('a server without accounts lets everybody do everything, and says so', () => {
  expect(openGuard.callerOf({ headers: {}, address: '' })).toMatchObject({ kind: 'open', name: undefined });
});
