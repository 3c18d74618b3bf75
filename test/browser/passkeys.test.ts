import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Served } from '../../server/serve.ts';
import { password } from '../server/access/people.ts';
import { leakPlant } from '../server/plants.ts';
import { dataDirectory, servedOn } from '../server/serving.ts';
import { openBrowser, type Browser } from './open-browser.ts';

let data: ReturnType<typeof dataDirectory>;
let served: Served;
let browser: Browser;
let page: Page;

beforeAll(async () => {
  data = dataDirectory(leakPlant);
  served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
  browser = await openBrowser();
  // Passkeys hold for a host by name; browsers take localhost for safe.
  page = await browser.open(served.address.replace('127.0.0.1', 'localhost'), 'desk');
  const device = await browser.context.newCDPSession(page);
  await device.send('WebAuthn.enable');
  await device.send('WebAuthn.addVirtualAuthenticator', { options: { protocol: 'ctap2', transport: 'internal', hasResidentKey: true, hasUserVerification: true, isUserVerified: true, automaticPresenceSimulation: true } });
  expect((await ask('POST', '/api/invitations/accept', { code: served.firstLink!.split('#')[1], name: 'olaf', shownAs: 'Olaf Berg', password })).status).toBe(200);
});
afterAll(async () => {
  await browser.close();
  await served.stop('the test is over');
  data.remove();
});

interface Answer {
  readonly status: number;
  readonly body: Record<string, unknown>;
}

const ask = (method: string, path: string, body?: object): Promise<Answer> =>
  page.evaluate(async ([how, where, what]) => {
    const answer = await fetch(where, { method: how, ...(what === undefined ? {} : { headers: { 'content-type': 'application/json' }, body: JSON.stringify(what) }) });
    const text = await answer.text();
    return { status: answer.status, body: (text === '' ? {} : JSON.parse(text)) as Record<string, unknown> };
  }, [method, path, body] as const);

/** Has the device make a passkey, or sign, as the browser does it. */
const make = (options: object): Promise<object> =>
  page.evaluate(async (json) => {
    const made = (await navigator.credentials.create({ publicKey: PublicKeyCredential.parseCreationOptionsFromJSON(json as never) })) as PublicKeyCredential;
    return made.toJSON();
  }, options);
const sign = (options: object): Promise<object> =>
  page.evaluate(async (json) => {
    const signed = (await navigator.credentials.get({ publicKey: PublicKeyCredential.parseRequestOptionsFromJSON(json as never) })) as PublicKeyCredential;
    return signed.toJSON();
  }, options);

describe('a passkey', () => {
  it('is made after the password was given again, and is on record', async () => {
    expect((await ask('POST', '/api/own/passkeys/begin', { password: 'wrong' })).body['field']).toBe('password');
    const { body: options } = await ask('POST', '/api/own/passkeys/begin', { password });
    const answer = await make(options);
    expect((await ask('POST', '/api/own/passkeys/finish', { name: 'desk', answer })).status).toBe(200);
    expect((await ask('POST', '/api/own/passkeys/finish', { name: 'again', answer })).status).toBe(400);
    expect((await ask('GET', '/api/own/passkeys')).body).toMatchObject([{ name: 'desk', lastUsed: null }]);
    expect((await ask('GET', '/api/changes?kind=passkey')).body).toMatchObject([{ who: 'Olaf Berg', what: 'passkey desk' }]);
    expect((await ask('GET', '/api/me')).body).toMatchObject({ passkeys: true });
  });

  it('signs in alone, each answer once', async () => {
    await ask('POST', '/api/sign-out');
    expect((await ask('GET', '/api/accounts')).status).toBe(401);
    const answer = await sign((await ask('POST', '/api/sign-in/passkey/begin', {})).body);
    expect(await ask('POST', '/api/sign-in/passkey/finish', { answer })).toEqual({ status: 200, body: { name: 'Olaf Berg' } });
    expect((await ask('GET', '/api/accounts')).status).toBe(200);
    expect((await ask('POST', '/api/sign-in/passkey/finish', { answer })).status).toBe(401);
  });

  it('is asked for after the password, which is then not enough', async () => {
    await ask('POST', '/api/sign-out');
    const first = await ask('POST', '/api/sign-in', { name: 'olaf', password });
    expect([first.body['second'], (await ask('GET', '/api/accounts')).status]).toEqual(['passkey', 401]);
    const ticket = first.body['ticket'] as string;
    const answer = await sign((await ask('POST', '/api/sign-in/passkey/begin', { ticket })).body);
    expect((await ask('POST', '/api/sign-in/passkey/finish', { ticket: 'vt_guess', answer })).status).toBe(401);
    const again = await sign((await ask('POST', '/api/sign-in/passkey/begin', { ticket })).body);
    expect((await ask('POST', '/api/sign-in/passkey/finish', { ticket, answer: again })).status).toBe(200);
    expect((await ask('GET', '/api/own/passkeys')).body).toMatchObject([{ name: 'desk', lastUsed: expect.any(Number) as number }]);
  });

  it('is removed, and then lets nobody in', async () => {
    const [{ id }] = (await ask('GET', '/api/own/passkeys')).body as unknown as [{ id: string }];
    expect((await ask('DELETE', `/api/own/passkeys/${id}`, { password: 'wrong' })).body['field']).toBe('password');
    expect((await ask('DELETE', `/api/own/passkeys/${id}`, { password })).status).toBe(204);
    await ask('POST', '/api/sign-out');
    const answer = await sign((await ask('POST', '/api/sign-in/passkey/begin', {})).body);
    expect((await ask('POST', '/api/sign-in/passkey/finish', { answer })).status).toBe(401);
    expect((await ask('POST', '/api/sign-in', { name: 'olaf', password })).body).toEqual({ name: 'Olaf Berg' });
  });
});
