import { describe, expect, it } from 'vitest';
import type { FakeAccessOptions, FakeInvitation } from './fake-access.ts';
import { day } from './fake-access.ts';
import { people, signedInAs } from './fake-people.ts';
import type { Size } from './open-browser.ts';
import { browser, fake, onFakePages, open, page, serve } from './fake-pages.ts';

onFakePages({ served: false });

async function show(path: string, access: FakeAccessOptions, size: Size = 'desk'): Promise<void> {
  await serve({ access });
  await open(path, size);
}

const accounts: FakeAccessOptions = { access: 'accounts', accounts: people };
const invitation = (part: Partial<FakeInvitation>): FakeInvitation => ({ id: 'i', code: 'secret-code', kind: 'account', grants: [{ role: 'maintenance', line: 'a' }], account: null, shownAs: null, made: 0, by: '', expires: Date.now() + day, ...part });
const path = (): string => new URL(page.url()).pathname;

async function signIn(name: string, password: string): Promise<void> {
  await page.getByLabel('Name', { exact: true }).fill(name);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
}

describe('signing in', () => {
  it('comes before everything else, and leads back to where one wanted to go', async () => {
    await show('/guarantees/leak-bh4', accounts);
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    expect(path()).toBe('/sign-in');
    expect(fake.watches).toEqual([]);
    await signIn('ines', 'ines-password-1');
    await page.getByRole('heading', { name: 'BH-4 leak test' }).waitFor();
    expect(path()).toBe('/guarantees/leak-bh4');
    await page.getByText('Ines Maurer').first().waitFor();
  });

  it('says what is wrong without saying which, and keeps the name', async () => {
    await show('/', accounts);
    await signIn('ines', 'not-her-password');
    await page.getByText('Name or password is wrong.').waitFor();
    expect(await page.getByLabel('Name', { exact: true }).inputValue()).toBe('ines');
  });

  it('counts down while no further try is taken', async () => {
    await show('/', accounts);
    fake.access.failures = 3;
    await signIn('ines', 'ines-password-1');
    await page.getByText('Too many tries; wait a little.').waitFor();
    const waits = page.getByRole('button', { name: /^Sign in, in \d+ s$/ });
    expect(await waits.isDisabled()).toBe(true);
  });

  it('shows the password when asked to, and marks fields for password keepers', async () => {
    await show('/sign-in', accounts);
    const password = page.getByLabel('Password', { exact: true });
    expect(await password.getAttribute('type')).toBe('password');
    expect(await password.getAttribute('autocomplete')).toBe('current-password');
    expect(await page.getByLabel('Name', { exact: true }).getAttribute('autocomplete')).toBe('username');
    await page.getByRole('button', { name: 'Show password' }).click();
    expect(await password.getAttribute('type')).toBe('text');
  });

  it('works by keyboard alone', async () => {
    await show('/', accounts);
    await page.getByLabel('Name', { exact: true }).waitFor();
    await page.keyboard.type('tom');
    await page.keyboard.press('Tab');
    await page.keyboard.type('tom-password-1');
    await page.keyboard.press('Enter');
    await page.locator('board-lane').first().waitFor();
    await page.locator('person-menu summary').focus();
    await page.keyboard.press('Enter');
    await page.getByText('Maintenance for the whole plant').waitFor();
    await page.keyboard.press('Escape');
    expect(await page.getByText('Maintenance for the whole plant').isVisible()).toBe(false);
  });

  it('offers the directory and passkeys only where there are any', async () => {
    await show('/', { ...accounts, directory: 'Hose plant directory', passkeys: true });
    expect(await page.getByRole('link', { name: 'Sign in with Hose plant directory' }).getAttribute('href')).toBe('/api/sign-in/directory');
    await page.getByRole('button', { name: 'Use a passkey' }).waitFor();
  });

  it('says why the directory sent one back, and takes it out of the address', async () => {
    await show('/sign-in?fault=name-taken', { ...accounts, directory: 'Hose plant directory' });
    await page.getByText('Hose plant directory did not sign you in: somebody here has your name already.').waitFor();
    expect(page.url()).toBe(`${fake.url}/sign-in`);
  });

  it('whoever comes back from the directory gets to where they wanted to go', async () => {
    await show('/alarms', accounts);
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    const { cookie } = fake.access.sessionFor({ account: 'ines' }, '10.0.4.2', '');
    await browser.context.addCookies([{ name: 'vouchline-session', value: cookie.split(/[=;]/)[1]!, url: fake.url }]);
    await page.goto(fake.url);
    await page.locator('alarm-card').first().waitFor();
    expect(path()).toBe('/alarms');
    await page.goto(fake.url);
    await page.locator('board-lane').first().waitFor();
  });

  it('tells a plant without accounts where the first one comes from', async () => {
    await show('/', { access: 'accounts' });
    await page.getByText(/printed a link for the first one/).waitFor();
  });
});

describe('leaving', () => {
  it('signs out, says so, and shows nothing of the plant any more', async () => {
    await show('/', signedInAs('ines'));
    await page.locator('board-lane').first().waitFor();
    await page.getByText('Ines Maurer').first().click();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.getByText('You are signed out.').waitFor();
    expect(await page.locator('board-lane').count()).toBe(0);
  });

  it('a session that ends takes the figures away, says so, and leads back after signing in', async () => {
    await show('/alarms', signedInAs('ines'));
    await page.locator('alarm-card').first().waitFor();
    fake.access.end();
    fake.endSockets();
    await page.getByText(/^Your session has ended/).waitFor();
    expect(await page.locator('alarm-card').count()).toBe(0);
    await signIn('ines', 'ines-password-1');
    await page.locator('alarm-card').first().waitFor();
    expect(path()).toBe('/alarms');
  });

  it('a call that is answered with 401 ends it too', async () => {
    await show('/alarms', signedInAs('ines'));
    await page.locator('alarm-card').first().waitFor();
    fake.access.end();
    await page.getByRole('button', { name: 'Show older alarms' }).click();
    await page.getByText(/^Your session has ended/).waitFor();
  });

  it('a server that goes down ends no session', async () => {
    await show('/', signedInAs('ines'));
    await page.locator('board-lane').first().waitFor();
    fake.cutLive();
    await page.getByText('Connection lost.').waitFor();
    fake.returnLive();
    await expect.poll(() => page.locator('page-masthead dd b').innerText(), { timeout: 20_000 }).toBe('Live');
  });
});

describe('a link to join by', () => {
  it('makes the first account, takes the code out of the address, and lets one in', async () => {
    await show('/join#secret-code', { access: 'accounts', invitations: [invitation({ kind: 'first', grants: [{ role: 'administrator', line: undefined }] })] });
    await page.getByRole('heading', { name: 'The first account' }).waitFor();
    expect(page.url()).toBe(`${fake.url}/join`);
    expect(await page.evaluate(() => history.length)).toBeLessThanOrEqual(2);
    await page.getByText('Administrator for the whole plant.').waitFor();
    await page.getByLabel('Your name').fill('Ada Lindqvist');
    await page.getByLabel('Name to sign in with').fill('ada');
    const password = page.getByLabel('New password', { exact: true });
    expect(await password.getAttribute('autocomplete')).toBe('new-password');
    await password.fill('short');
    await page.getByText('5 of at least 12 characters.').waitFor();
    await page.getByRole('button', { name: 'Make the account and sign in' }).click();
    await page.getByText('A password has 12 to 128 characters; this one has 5.').waitFor();
    expect(fake.access.accounts.size).toBe(0);
    await password.fill('long enough by now');
    await page.getByText('18 characters: long enough.').waitFor();
    await page.getByRole('button', { name: 'Make the account and sign in' }).click();
    await page.locator('board-lane').first().waitFor();
    expect(path()).toBe('/');
    expect([...fake.access.accounts.values()][0]).toMatchObject({ name: 'ada', shownAs: 'Ada Lindqvist' });
  });

  it('shows a refusal beside the field it names, and leaves the focus there', async () => {
    await show('/join#secret-code', { ...accounts, invitations: [invitation({})] });
    await page.getByText('Maintenance for a.').waitFor();
    await page.getByLabel('Your name').fill('Ines M.');
    const name = page.getByLabel('Name to sign in with');
    await name.fill('ines');
    await page.getByLabel('New password', { exact: true }).fill('long enough by now');
    await page.getByRole('button', { name: 'Make the account and sign in' }).click();
    await page.getByText('Somebody has this name already.').waitFor();
    expect(await name.getAttribute('aria-invalid')).toBe('true');
    await expect.poll(() => name.evaluate((one) => one === (one.getRootNode() as ShadowRoot).activeElement)).toBe(true);
  });

  it('sets a new password, with the account’s name for password keepers', async () => {
    await show('/join#secret-code', { ...accounts, invitations: [invitation({ kind: 'new-password', grants: [], account: 'tom', shownAs: 'Tom Reiter' })] });
    await page.getByText('For Tom Reiter.').waitFor();
    expect(await page.locator('input[autocomplete=username]').inputValue()).toBe('tom');
    await page.getByLabel('New password', { exact: true }).fill('another long password');
    await page.getByRole('button', { name: 'Set the password and sign in' }).click();
    await page.locator('board-lane').first().waitFor();
    expect(fake.access.accounts.get('tom')?.password).toBe('another long password');
  });

  it.each([['/join#no-such-code', /used already, was withdrawn, or has expired/], ['/join', /behind #, is missing/]])('%s says that it does not hold, and why', async (link, why) => {
    await show(link, accounts);
    await page.getByRole('heading', { name: 'This link does not hold' }).waitFor();
    await page.getByText(why).waitFor();
  });
});

describe('a display', () => {
  it('signs in by its link, shows the board and lets nobody acknowledge', async () => {
    await show('/display#token-hall', { ...accounts, ...signedInAs('nobody') });
    await page.locator('board-lane').nth(7).waitFor();
    expect(page.url()).toBe(`${fake.url}/`);
    await page.getByText('Hall 2, by the gate').first().waitFor();
    expect(await page.getByRole('button', { name: /^Acknowledge/ }).count()).toBe(0);
    await page.getByText('Not yet acknowledged').first().waitFor();
  });

  it('that only shows has the words of a wall; one that people act at has not', async () => {
    await show('/', signedInAs('hall'), 'hd');
    await page.locator('board-lane').first().waitFor();
    const walls = (): Promise<boolean> => page.evaluate(() => document.documentElement.classList.contains('wall'));
    expect(await walls()).toBe(true);
    await fake.stop();
    await serve({ access: signedInAs('bench') });
    await page.goto(fake.url);
    await page.getByRole('button', { name: /^Acknowledge/ }).first().waitFor();
    expect(await walls()).toBe(false);
  });

  it('says in words when it was withdrawn, also after a start', async () => {
    await show('/display#token-hall', { ...accounts, ...signedInAs('nobody') });
    await page.locator('board-lane').first().waitFor();
    fake.access.displays.delete('hall');
    fake.endSockets();
    await page.getByRole('heading', { name: 'Not live: this display was withdrawn' }).waitFor();
    expect(await page.locator('board-lane').count()).toBe(0);
    await page.reload();
    await page.getByRole('heading', { name: 'Not live: this display was withdrawn' }).waitFor();
  });

  it('by a link that does not hold says so', async () => {
    await show('/display#made-up', accounts);
    await page.getByRole('heading', { name: 'This screen is no display' }).waitFor();
    expect(page.url()).toBe(`${fake.url}/display`);
  });
});
