import type { Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ServerMessage } from '../../core/protocol/source-messages.ts';
import type { Served } from '../../server/serve.ts';
import { leakPlant, verdictPart } from '../server/plants.ts';
import { dataDirectory, servedOn, sourceTalk, type Talk } from '../server/serving.ts';
import { openBrowser, type Browser } from './open-browser.ts';

const password = 'seven long hoses in the rain';
let browser: Browser;
let data: ReturnType<typeof dataDirectory>;
let served: Served;
let page: Page;

beforeAll(async () => { browser = await openBrowser(); });
afterAll(async () => { await browser.close(); });
beforeEach(async () => {
  data = dataDirectory(leakPlant);
  served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
  page = await browser.open('about:blank', 'wide');
});
afterEach(async () => {
  await page.close();
  await browser.context.clearCookies();
  await served.stop('test over');
  data.remove();
  expect(browser.errors).toEqual([]);
});

const dialog = () => page.getByRole('dialog').last();
const secret = (): Promise<string> => page.locator('secret-once input').inputValue();

async function join(link: string, shownAs: string, name: string): Promise<void> {
  await page.goto(link);
  await page.getByLabel('Your name').fill(shownAs);
  await page.getByLabel('Name to sign in with').fill(name);
  await page.getByLabel('New password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Make the account and sign in' }).click();
  await page.locator('person-menu summary').getByText(shownAs).waitFor();
}

async function menu(name: string): Promise<void> {
  await page.locator('person-menu summary').click();
  await page.locator('person-menu').getByText(name, { exact: true }).click();
}

async function signIn(name: string, with_: string): Promise<void> {
  await page.getByLabel('Name', { exact: true }).fill(name);
  await page.getByLabel('Password', { exact: true }).fill(with_);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
}

/** Makes a source on its page, as a person does, and connects it. */
async function sourceMade(): Promise<Talk<ServerMessage>> {
  await menu('Sources');
  await page.getByLabel('Name', { exact: true }).fill('leak-tester');
  await page.getByLabel('Stations').fill('A.leak-test');
  await page.getByLabel('Why').fill('First tester');
  await page.getByRole('button', { name: 'Make the token' }).click();
  await page.getByText('The token of leak-tester').waitFor();
  const source = sourceTalk(served.address, await secret());
  expect(await source.next()).toMatchObject({ type: 'welcome' });
  return source;
}

async function alarmRaised(source: Talk<ServerMessage>): Promise<void> {
  source.send({ type: 'records', first: 1, parts: [verdictPart(1000, [], Date.UTC(2026, 5, 1, 6)), verdictPart(10, [1, 3, 5, 7, 9], Date.UTC(2026, 5, 1, 6, 20))] });
  expect(await source.next()).toEqual({ type: 'ack', next: 1011 });
}

async function invited(role: string): Promise<string> {
  await menu('People');
  await page.getByLabel(role).check();
  await page.getByRole('button', { name: 'Make the link' }).click();
  await page.getByText('Shown this once').waitFor();
  return secret();
}

describe('on a real server with accounts', () => {
  it('from the first link to an alarm acknowledged under one’s own name, and both on record', async () => {
    await page.goto(served.address);
    await page.getByText(/printed a link for the first one/).waitFor();
    await join(served.firstLink!, 'Ada Lindqvist', 'ada');
    const source = await sourceMade();
    await alarmRaised(source);
    await page.reload();
    await page.locator('.rows').getByText('connected').waitFor();
    await page.getByRole('link', { name: 'Board' }).click();
    await page.getByRole('button', { name: 'Acknowledge: Leak test, line A' }).click();
    await page.locator('board-lane').getByText('by Ada Lindqvist').waitFor();
    await menu('Sign out');
    await page.getByText('You are signed out.').waitFor();
    await signIn('ada', 'something else altogether');
    await page.locator('.fault').filter({ hasText: /\S/ }).first().waitFor();
    await signIn('ada', password);
    await page.locator('board-lane').first().waitFor();
    await menu('Record of changes');
    const row = page.locator('change-list tr').filter({ hasText: 'Alarm acknowledged' });
    await row.getByText('Ada Lindqvist').waitFor();
    await row.locator('ins').getByText('acknowledged').waitFor();
    for (const kind of ['Signed in', 'Sign-in failed', 'Signed out', 'Source made', 'Account changed']) await page.locator('change-list tr').filter({ hasText: kind }).first().waitFor();
    await page.locator('record-head').getByText(/^\d+:[0-9a-f]{64}$/).first().waitFor();
    const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: 'Export as CSV' }).click()]);
    expect(download.suggestedFilename()).toBe('changes.csv');
    source.socket.terminate();
  });

  it('people come by invitation, get another role, and are disabled: their screen says so and shows nothing more', async () => {
    await join(served.firstLink!, 'Ada Lindqvist', 'ada');
    const link = await invited('Viewer, Hose line A');
    const others = await openBrowser();
    const theirs = await others.open(link, 'wide');
    await theirs.getByText('Viewer for A.').waitFor();
    await theirs.getByLabel('Your name').fill('Mette Holm');
    await theirs.getByLabel('Name to sign in with').fill('ada');
    await theirs.getByLabel('New password', { exact: true }).fill(password);
    await theirs.getByRole('button', { name: 'Make the account and sign in' }).click();
    await theirs.getByText(/Somebody has this name already/).waitFor();
    await theirs.getByLabel('Name to sign in with').fill('mette');
    await theirs.getByRole('button', { name: 'Make the account and sign in' }).click();
    await theirs.locator('board-lane').first().waitFor();
    await page.reload();
    await page.getByRole('button', { name: 'Change Mette Holm' }).click();
    await dialog().getByLabel('Maintenance, Hose line A').check();
    await dialog().getByLabel('Why').fill('Mends now');
    await dialog().getByRole('button', { name: 'Save' }).click();
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);
    await theirs.locator('person-menu summary').click();
    await theirs.getByText('Viewer and maintenance for Hose line A').waitFor({ timeout: 20_000 });
    await page.getByRole('button', { name: 'Change Mette Holm' }).click();
    await page.getByRole('button', { name: 'Disable the account' }).click();
    await dialog().getByLabel('Why').fill('Left');
    await dialog().getByRole('button', { name: 'Disable' }).click();
    await theirs.getByText(/^Your session has ended/).waitFor({ timeout: 20_000 });
    expect(await theirs.locator('board-lane').count()).toBe(0);
    await others.close();
    expect(others.errors).toEqual([]);
  });

  it('a display is made, acts by PIN under a person’s name, and says when it is withdrawn', async () => {
    await join(served.firstLink!, 'Ada Lindqvist', 'ada');
    const source = await sourceMade();
    await menu('My account');
    await page.locator('own-pin').getByLabel('New PIN').fill('4719');
    await page.locator('own-pin').getByLabel('Your password', { exact: true }).fill(password);
    await page.getByRole('button', { name: 'Set the PIN' }).click();
    await page.getByText('The PIN is set.').waitFor();
    await menu('Displays');
    await page.getByLabel('Where it hangs').fill('Leak test bench');
    await page.getByLabel('People may acknowledge at it by PIN').check();
    await page.getByRole('button', { name: 'Make the link' }).click();
    await page.getByText('Shown this once').waitFor();
    const screens = await openBrowser();
    const screen = await screens.open(await secret(), 'desk');
    await screen.locator('board-lane').first().waitFor();
    expect(screen.url()).toBe(`${served.address}/`);
    await alarmRaised(source);
    await screen.getByRole('button', { name: 'Acknowledge: Leak test, line A' }).click();
    await screen.getByRole('button', { name: 'Ada Lindqvist' }).click();
    await screen.keyboard.type('9174');
    await screen.keyboard.press('Enter');
    await screen.getByText(/^Not taken/).waitFor();
    await screen.keyboard.type('4719');
    await screen.keyboard.press('Enter');
    await screen.locator('board-lane').getByText('by Ada Lindqvist').waitFor();
    await screen.getByText(/^Acknowledging as Ada Lindqvist for 1 min/).waitFor();
    await screen.getByRole('button', { name: 'End now' }).click();
    await expect.poll(() => screen.getByText(/^Acknowledging as/).count()).toBe(0);
    await page.getByRole('button', { name: 'Withdraw: Leak test bench' }).click();
    await dialog().getByRole('button', { name: 'Withdraw' }).click();
    await screen.getByRole('heading', { name: 'Not live: this display was withdrawn' }).waitFor({ timeout: 20_000 });
    await screens.close();
    expect(screens.errors).toEqual([]);
    source.socket.terminate();
  });

  it('a passkey, added on one’s own page, is asked for after the password and signs in alone', async () => {
    const devtools = await browser.context.newCDPSession(page);
    await devtools.send('WebAuthn.enable');
    await devtools.send('WebAuthn.addVirtualAuthenticator', { options: { protocol: 'ctap2', transport: 'internal', hasResidentKey: true, hasUserVerification: true, isUserVerified: true, automaticPresenceSimulation: true } });
    await join(served.firstLink!.replace('127.0.0.1', 'localhost'), 'Ada Lindqvist', 'ada'); // a passkey belongs to a name, not to an address
    await menu('My account');
    await page.getByText('You have no passkey.').waitFor();
    await page.getByText('Add a passkey').click();
    await page.locator('own-passkeys').getByLabel('What it is').fill('Phone');
    await page.locator('own-passkeys').getByLabel('Your password', { exact: true }).fill(password);
    await page.getByRole('button', { name: 'Add the passkey' }).click();
    await page.getByText('The passkey “Phone” is added.').waitFor();
    await menu('Sign out');
    await signIn('ada', password);
    await page.locator('board-lane').first().waitFor();
    await menu('Sign out');
    await page.getByRole('button', { name: 'Use a passkey' }).click();
    await page.locator('board-lane').first().waitFor();
    await menu('My account');
    await page.getByText(/last used/).first().waitFor();
    await page.getByRole('button', { name: 'Remove: Phone' }).click();
    await dialog().getByLabel('Your password').fill(password);
    await dialog().getByRole('button', { name: 'Remove' }).click();
    await page.getByText('You have no passkey.').waitFor();
  });

  it('one’s own account: password, sessions, tokens', async () => {
    await join(served.firstLink!, 'Ada Lindqvist', 'ada');
    await menu('My account');
    await page.locator('own-password').getByLabel('Present password', { exact: true }).fill(password);
    await page.locator('own-password').getByLabel('New password', { exact: true }).fill('eight longer hoses in the sun');
    await page.getByRole('button', { name: 'Set the password' }).click();
    await page.getByText('The password is set').waitFor();
    await page.getByText('Make a token').click();
    await page.getByLabel('What it is for').fill('Andon lamp');
    await page.getByLabel('see boards, guarantees and alarms').check();
    await page.getByRole('button', { name: 'Make the token' }).click();
    await page.getByText('Shown this once').waitFor();
    const authorization = `Bearer ${await secret()}`;
    expect((await fetch(`${served.address}/api/guarantees`, { headers: { authorization } })).status).toBe(200);
    await page.getByRole('button', { name: 'Revoke: Andon lamp' }).click();
    await dialog().getByRole('button', { name: 'Revoke' }).click();
    await page.getByText('You have no token.').waitFor();
    expect((await fetch(`${served.address}/api/guarantees`, { headers: { authorization } })).status).toBe(401);
    await page.getByText('this one').waitFor();
    await page.getByRole('button', { name: 'Sign out everywhere' }).click();
    await dialog().getByRole('button', { name: 'Sign out everywhere' }).click();
    await page.getByText('You are signed out.').waitFor();
    await signIn('ada', 'eight longer hoses in the sun');
    await page.locator('board-lane').first().waitFor();
  });
});
