import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { Provider } from 'oidc-provider';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { RecordedChange } from '../../../core/access/change.ts';
import { directorySetting } from '../../../server/access/directory-setting.ts';
import type { Served } from '../../../server/serve.ts';
import { settle } from '../../../server/settings/settings.ts';
import { leakPlant } from '../plants.ts';
import { dataDirectory, servedOn } from '../serving.ts';
import { SignedIn } from './signed-in.ts';

let data: ReturnType<typeof dataDirectory>;
let served: Served;
let provider: Server;
let first: SignedIn;

/** A browser as far as it matters here: cookies by host, redirects one by one. */
class Wanderer {
  readonly #cookies = new Map<string, Map<string, string>>();

  async go(url: string, form?: Record<string, string>): Promise<{ status: number; url: string; to: string | undefined; text: string }> {
    const { host } = new URL(url);
    const jar = this.#cookies.get(host) ?? new Map<string, string>();
    this.#cookies.set(host, jar);
    const answer = await fetch(url, {
      redirect: 'manual',
      headers: { cookie: [...jar].map(([name, value]) => `${name}=${value}`).join('; '), accept: 'text/html', ...(form && { 'content-type': 'application/x-www-form-urlencoded' }) },
      ...(form && { method: 'POST', body: new URLSearchParams(form).toString() }),
    });
    for (const set of answer.headers.getSetCookie()) {
      const [pair = ''] = set.split(';');
      jar.set(pair.slice(0, pair.indexOf('=')), pair.slice(pair.indexOf('=') + 1));
    }
    const to = answer.headers.get('location');
    return { status: answer.status, url, to: to === null ? undefined : new URL(to, url).href, text: await answer.text() };
  }

  /** From sign-in to wherever the server sends the browser in the end. */
  async throughDirectory(login: string): Promise<string> {
    let at = await this.go(`${served.address}/api/sign-in/directory`);
    for (let steps = 0; steps < 20; steps += 1) {
      if (at.to?.startsWith(served.address) === true && !at.to.includes('/directory')) return at.to.slice(served.address.length);
      if (at.to !== undefined) at = await this.go(at.to);
      else if (at.text.includes('name="login"')) at = await this.go(at.url, { prompt: 'login', login, password: 'any' });
      else if (at.text.includes('value="consent"')) at = await this.go(at.url, { prompt: 'consent' });
      else throw new Error(`lost at ${at.url}: ${at.status} ${at.text.slice(0, 300)}`);
    }
    throw new Error('walked in circles');
  }

  async me(): Promise<{ caller: { name: string; grants: unknown[] } | null }> {
    return JSON.parse((await this.go(`${served.address}/api/me`)).text) as never;
  }

  bring(cookie: string): this {
    this.#cookies.set(new URL(served.address).host, new Map([[cookie.slice(0, cookie.indexOf('=')), cookie.slice(cookie.indexOf('=') + 1)]]));
    return this;
  }
}

beforeAll(async () => {
  data = dataDirectory(leakPlant);
  provider = createServer();
  await new Promise<void>((resolve) => provider.listen(0, '127.0.0.1', resolve));
  const issuer = `http://127.0.0.1:${(provider.address() as AddressInfo).port}`;
  served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts', 'directory-issuer': issuer, 'directory-client': 'vouchline', 'directory-secret': 'shared', 'directory-name': 'Hose works directory' });
  const oidc = new Provider(issuer, {
    clients: [{ client_id: 'vouchline', client_secret: 'shared', redirect_uris: [`${served.address}/api/sign-in/directory/back`] }],
    claims: { openid: ['sub'], profile: ['preferred_username', 'name'] },
    conformIdTokenClaims: false,
    findAccount: (_context, id) => ({ accountId: id, claims: () => ({ sub: id, preferred_username: id, name: `${id} of the directory` }) }),
    pkce: { required: () => true },
    cookies: { keys: ['only for this test'] },
    ttl: { AccessToken: 60, AuthorizationCode: 60, Grant: 60, IdToken: 60, Interaction: 60, Session: 60 },
  });
  const answer = oidc.callback();
  provider.on('request', (request, response) => void answer(request, response));
  first = await SignedIn.byLink(served, served.firstLink!, 'olaf');
}, 30_000);
afterAll(async () => {
  await served.stop('the test is over');
  provider.closeAllConnections();
  provider.close();
  data.remove();
});

describe('signing in through a directory', () => {
  it('makes an account without roles for whom it knows, and finds it again', async () => {
    const mette = new Wanderer();
    expect(await mette.throughDirectory('mette')).toBe('/');
    expect((await mette.me()).caller).toMatchObject({ name: 'mette of the directory', grants: [] });
    expect((await mette.go(`${served.address}/api/guarantees`)).status).toBe(403);
    expect(await new Wanderer().throughDirectory('mette')).toBe('/');
    const accounts = await first.json<{ name: string; hasPassword: boolean }[]>('GET', '/api/accounts');
    expect(accounts.filter(({ name }) => name === 'mette')).toMatchObject([{ hasPassword: false }]);
    const changes = await first.json<RecordedChange[]>('GET', '/api/changes?kind=sign-in&holds=mette');
    expect(changes.map(({ after }) => (after as { by: string }).by)).toEqual(['directory', 'directory']);
  });

  it('takes no account over that has the same name; its owner links it', async () => {
    const other = new Wanderer();
    expect(await other.throughDirectory('olaf')).toBe('/sign-in?fault=name-taken');
    expect(await new Wanderer().throughDirectory('m\u0435tte')).toBe('/sign-in?fault=name-unfit');
    expect((await other.me()).caller).toBeNull();
    expect(await new Wanderer().bring(first.cookie).throughDirectory('olaf')).toBe('/');
    const olaf = new Wanderer();
    expect(await olaf.throughDirectory('olaf')).toBe('/');
    expect((await olaf.me()).caller).toMatchObject({ name: 'olaf Holm' });
  });

  it('comes back only to the browser that began, and once', async () => {
    const begun = await new Wanderer().go(`${served.address}/api/sign-in/directory`);
    const state = new URL(begun.to!).searchParams.get('state')!;
    expect(new URL(begun.to!).searchParams.get('code_challenge_method')).toBe('S256');
    const forged = await new Wanderer().go(`${served.address}/api/sign-in/directory/back?code=guess&state=${state}`);
    expect(forged.to).toBe(`${served.address}/sign-in?fault=begun-elsewhere`);
    const wrong = new Wanderer();
    const own = new URL((await wrong.go(`${served.address}/api/sign-in/directory`)).to!).searchParams.get('state')!;
    expect((await wrong.go(`${served.address}/api/sign-in/directory/back?code=guess&state=${own}`)).to).toBe(`${served.address}/sign-in?fault=not-let-in`);
  });

  it('is offered by its name', async () => {
    expect(await (await fetch(`${served.address}/api/me`)).json()).toMatchObject({ directory: 'Hose works directory' });
  });
});

describe('the settings of a directory', () => {
  const setting = (told: Record<string, string>): unknown => directorySetting(settle(told, {}, {}));

  it('are asked for whole, and for a safe address', () => {
    expect(setting({})).toBeUndefined();
    expect(() => setting({ 'directory-issuer': 'https://id.example' })).toThrow('directory-client: is missing');
    expect(() => setting({ 'directory-issuer': 'https://id.example', 'directory-client': 'v' })).toThrow('directory-secret: is missing');
    expect(() => setting({ 'directory-issuer': 'http://id.example', 'directory-client': 'v', 'directory-secret': 's' })).toThrow('expected an address with https');
  });
});
