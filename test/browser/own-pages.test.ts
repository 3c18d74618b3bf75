import { describe, expect, it } from 'vitest';
import type { FakeAccessOptions } from './fake-access.ts';
import { changesOf, fullPlant, signedInAs } from './fake-people.ts';
import type { Size } from './open-browser.ts';
import { browser, fake, onFakePages, open, page, serve } from './fake-pages.ts';

onFakePages({ served: false });

async function show(path: string, access: FakeAccessOptions = fullPlant(), size: Size = 'wide'): Promise<void> {
  await serve({ access });
  await open(path, size);
}

const dialog = () => page.getByRole('dialog').last();
const secret = (): Promise<string> => page.locator('secret-once input').inputValue();
const focusedName = (): Promise<string> => page.evaluate(() => {
  let at = document.activeElement;
  while (at?.shadowRoot?.activeElement) at = at.shadowRoot.activeElement;
  return at?.getAttribute('aria-label') ?? at?.textContent?.trim() ?? '';
});

describe('from an invitation to the next sign-in', () => {
  it('goes through every door', async () => {
    await show('/people', { ...fullPlant(), as: undefined as never });
    await page.getByLabel('Name', { exact: true }).fill('ada');
    await page.getByLabel('Password', { exact: true }).fill('ada-password-1');
    fake.access.accounts.get('ada')!.passkeys = [];
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await page.getByRole('heading', { name: 'Invite somebody' }).waitFor();
    await page.locator('invitation-list').getByLabel('Name shown').fill('Selma Aydin');
    await page.getByRole('button', { name: 'Make the link' }).click();
    await page.getByText('Tick at least one role.').waitFor();
    await page.getByLabel('Maintenance, Hose line A').check();
    await page.getByText('Maintenance for Hose line A.').waitFor();
    await page.getByRole('button', { name: 'Make the link' }).click();
    await page.getByText('Shown this once').waitFor();
    const link = await secret();
    expect(link.startsWith(`${fake.url}/join#code-`)).toBe(true);
    await page.locator('person-menu summary').click();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.getByText('You are signed out.').waitFor();
    await page.goto(link);
    await page.getByLabel('Name to sign in with').fill('selma');
    expect(await page.getByLabel('Your name').inputValue()).toBe('Selma Aydin');
    await page.getByLabel('New password', { exact: true }).fill('hoses all the way');
    await page.getByRole('button', { name: 'Make the account and sign in' }).click();
    await page.locator('person-menu summary').getByText('Selma Aydin').waitFor();
    await page.goto(link);
    await page.getByText(/used already/).waitFor();
  });
});

describe('people', () => {
  it('show their roles in a column each, and in words on a phone', async () => {
    await show('/people');
    const row = page.locator('people-table tr').filter({ hasText: 'Ines Maurer' });
    await row.waitFor();
    expect((await row.locator('.where-cell').allInnerTexts()).map((text) => text.trim())).toEqual(['Plant', 'Hose line A', 'Hose line A', '·', '·']);
    await page.setViewportSize({ width: 390, height: 844 });
    await row.getByText('Supervisor and maintenance for Hose line A; viewer for the whole plant').waitFor();
  });

  it('are changed with a reason, and what it gives and takes is said before', async () => {
    await show('/people');
    await page.getByRole('button', { name: 'Change Ines Maurer' }).click();
    await dialog().getByLabel('Engineer, Hose line B').check();
    await dialog().getByLabel('Viewer, The whole plant').uncheck();
    await dialog().getByText('Gives engineer for Hose line B. Takes viewer for the whole plant.').waitFor();
    await dialog().getByLabel('Why').fill('Takes over line B');
    await dialog().getByRole('button', { name: 'Save' }).click();
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);
    expect(await focusedName()).toBe('Change Ines Maurer');
    expect(fake.access.accounts.get('ines')?.grants).toEqual([{ role: 'supervisor', line: 'a' }, { role: 'maintenance', line: 'a' }, { role: 'engineer', line: 'b' }]);
    expect(fake.access.changes[0]).toMatchObject({ kind: 'account', why: 'Takes over line B' });
    await page.locator('people-table tr').filter({ hasText: 'Ines Maurer' }).locator('.where-cell').getByText('Hose line B').waitFor();
  });

  it('a role for the plant covers the lines', async () => {
    await show('/people');
    await page.getByRole('button', { name: 'Change Tom Reiter' }).click();
    expect(await dialog().getByLabel('Maintenance, Hose line A').count()).toBe(0);
    await dialog().getByLabel('Maintenance, The whole plant').uncheck();
    expect(await dialog().getByLabel('Maintenance, Hose line A').isChecked()).toBe(false);
  });

  it('the last administrator stays one, and the refusal says so where it was asked', async () => {
    await show('/people');
    await page.getByRole('button', { name: 'Change Ada Lindqvist' }).click();
    await page.getByRole('button', { name: 'Disable the account' }).click();
    await dialog().getByLabel('Why').fill('A try');
    await dialog().getByRole('button', { name: 'Disable' }).click();
    await page.getByText('This is the last administrator of the plant').waitFor();
    expect(fake.access.accounts.get('ada')?.disabled).toBe(false);
  });

  it('are disabled and enabled again, and get a link for a new password', async () => {
    await show('/people');
    await page.getByRole('button', { name: 'Change Tom Reiter' }).click();
    await page.getByRole('button', { name: 'New password link' }).click();
    await dialog().getByLabel('Why').fill('Forgot it');
    await dialog().getByRole('button', { name: 'Make the link' }).click();
    await page.getByText('The link for a new password').waitFor();
    expect(await secret()).toMatch(/\/join#code-/);
    await page.getByRole('button', { name: 'Disable the account' }).click();
    await dialog().getByLabel('Why').fill('On leave');
    await dialog().getByRole('button', { name: 'Disable' }).click();
    await page.locator('people-table tr').filter({ hasText: 'Tom Reiter' }).getByText('disabled').waitFor();
    await page.getByRole('button', { name: 'Change Tom Reiter' }).click();
    await page.getByRole('button', { name: 'Enable the account' }).click();
    await dialog().getByLabel('Why').fill('Back');
    await dialog().getByRole('button', { name: 'Enable' }).click();
    await expect.poll(() => fake.access.accounts.get('tom')?.disabled).toBe(false);
  });

  it('an invitation is withdrawn', async () => {
    await show('/people');
    await page.getByRole('button', { name: 'Withdraw the link for Selma Aydin' }).click();
    await dialog().getByRole('button', { name: 'Withdraw' }).click();
    await expect.poll(() => page.getByText('Selma Aydin').count()).toBe(0);
    expect(fake.access.invitations.size).toBe(1);
  });
});

describe('one’s own account', () => {
  it('sets a password, and shows beside the field what is wrong', async () => {
    await show('/account');
    await page.locator('own-password').getByLabel('Present password', { exact: true }).fill('not it');
    await page.locator('own-password').getByLabel('New password', { exact: true }).fill('a whole new password');
    await page.getByRole('button', { name: 'Set the password' }).click();
    await page.getByText('This is not your password.').waitFor();
    await page.locator('own-password').getByLabel('Present password', { exact: true }).fill('ada-password-1');
    await page.getByRole('button', { name: 'Set the password' }).click();
    await page.getByText('The password is set').waitFor();
    expect(fake.access.accounts.get('ada')?.password).toBe('a whole new password');
  });

  it('sets a PIN that is none of those tried first, and takes it away', async () => {
    await show('/account');
    const pin = page.locator('own-pin');
    await pin.getByLabel('New PIN').fill('1234');
    await pin.getByLabel('Your password', { exact: true }).fill('ada-password-1');
    await pin.getByRole('button', { name: 'Set the PIN' }).click();
    await page.getByText('A PIN is not a run of digits').waitFor();
    await pin.getByLabel('New PIN').fill('4719');
    await pin.getByRole('button', { name: 'Set the PIN' }).click();
    await page.getByText('The PIN is set.').waitFor();
    expect(fake.access.accounts.get('ada')?.pin).toBe('4719');
    await pin.getByLabel('Your password', { exact: true }).fill('ada-password-1');
    await pin.getByRole('button', { name: 'Set the PIN' }).click();
    await page.getByText('You have no PIN any more.').waitFor();
  });

  it('ends another session, and its own with a way back in', async () => {
    await show('/account');
    fake.access.sessionFor({ account: 'ada' }, '10.0.4.99', 'Mozilla/5.0 (Android 14) Firefox/127.0');
    await page.reload();
    await page.getByRole('button', { name: 'Sign out: Firefox on Android, 10.0.4.99' }).click();
    await dialog().getByRole('button', { name: 'Sign out' }).click();
    await expect.poll(() => page.getByText('Firefox on Android').count()).toBe(0);
    expect(await page.getByText('this one').count()).toBe(1);
    await page.getByRole('button', { name: 'Sign out everywhere' }).click();
    await dialog().getByRole('button', { name: 'Sign out everywhere' }).click();
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    expect(fake.access.sessions.size).toBe(0);
  });

  it('shows what happened to it lately', async () => {
    await show('/account');
    fake.access.record('sign-in-failed', 'unknown', 'account ada', null, { by: 'password', address: '10.0.9.2' }, '');
    await page.reload();
    await page.getByText('Sign-in failed').first().waitFor();
    await page.getByText(/by password, address 10\.0\.9\.2/).first().waitFor();
    await page.getByText('If something here was not you').waitFor();
  });

  it('shows a token once, copies it, and revokes it', async () => {
    await show('/account');
    await browser.context.grantPermissions(['clipboard-read', 'clipboard-write'], { origin: fake.url });
    await page.getByText('Make a token').click();
    await page.getByLabel('What it is for').fill('Andon lamp');
    await page.getByRole('button', { name: 'Make the token' }).click();
    await page.getByText('Choose at least one.').waitFor();
    await page.getByLabel('see boards, guarantees and alarms').check();
    await page.getByLabel('Days it holds').fill('30');
    await page.getByRole('button', { name: 'Make the token' }).click();
    await page.getByText('Shown this once').waitFor();
    expect(await focusedName()).toBe('Copy');
    await page.getByRole('button', { name: 'Copy' }).click();
    await page.getByText('Copied.').waitFor();
    expect(await page.evaluate(() => navigator.clipboard.readText())).toMatch(/^vouchline_own_/);
    expect(fake.access.accounts.get('ada')?.tokens.at(-1)).toMatchObject({ name: 'Andon lamp', actions: ['see'] });
    await page.reload();
    await page.getByText('Andon lamp').waitFor();
    expect(await page.locator('secret-once section').count()).toBe(0);
    await page.getByRole('button', { name: 'Revoke: Andon lamp' }).click();
    await dialog().getByRole('button', { name: 'Revoke' }).click();
    await expect.poll(() => page.getByText('Andon lamp').count()).toBe(0);
  });

  it('is linked with the directory where there is one', async () => {
    await show('/account', fullPlant({ directory: 'Hose plant directory' }));
    expect(await page.getByRole('link', { name: 'Link the account' }).getAttribute('href')).toBe('/api/sign-in/directory');
  });

  it('of who has no password asks for none', async () => {
    const plant = fullPlant({ directory: 'Hose plant directory' });
    await show('/account', { ...plant, accounts: plant.accounts!.map((one) => ({ ...one, password: '' })) });
    await page.locator('own-pin').getByLabel('New PIN').fill('28464917');
    await page.getByRole('button', { name: 'Set the PIN' }).click();
    await page.getByText('The PIN is set.').waitFor();
    expect([await page.locator('own-password').count(), await page.getByLabel('Your password', { exact: true }).count()]).toEqual([0, 0]);
  });

  it('adds a passkey, signs in with it, and removes it', async () => {
    await serve({ access: fullPlant() });
    const address = fake.url.replace('127.0.0.1', 'localhost'); // a passkey belongs to a name, not to an address
    await open(`${address}/account`, 'wide');
    const devtools = await browser.context.newCDPSession(page);
    await devtools.send('WebAuthn.enable');
    await devtools.send('WebAuthn.addVirtualAuthenticator', { options: { protocol: 'ctap2', transport: 'internal', hasResidentKey: true, hasUserVerification: true, isUserVerified: true, automaticPresenceSimulation: true } });
    await page.getByText('Add a passkey').click();
    await page.locator('own-passkeys').getByLabel('What it is').fill('Phone');
    await page.locator('own-passkeys').getByLabel('Your password', { exact: true }).fill('ada-password-1');
    await page.getByRole('button', { name: 'Add the passkey' }).click();
    await page.getByText('The passkey “Phone” is added.').waitFor();
    await page.locator('person-menu summary').click();
    await page.getByRole('button', { name: 'Sign out', exact: true }).last().click();
    await page.getByRole('button', { name: 'Use a passkey' }).click();
    await page.locator('board-lane').first().waitFor();
    await page.goto(`${address}/account`);
    await page.getByRole('button', { name: 'Remove: Phone' }).click();
    await dialog().getByLabel('Your password').fill('wrong');
    await dialog().getByRole('button', { name: 'Remove' }).click();
    await dialog().getByText('this is not your password').waitFor();
    await dialog().getByLabel('Your password').fill('ada-password-1');
    await dialog().getByRole('button', { name: 'Remove' }).click();
    await expect.poll(() => page.getByText('Phone', { exact: true }).count()).toBe(0);
  });
});

describe('displays', () => {
  it('are added with a link that signs a screen in, and withdrawn', async () => {
    await show('/displays');
    await page.getByLabel('Where it hangs').fill('Crimping cell');
    await page.getByLabel('Shows').selectOption({ label: 'Hose line B' });
    await page.getByLabel('People may acknowledge at it by PIN').check();
    await page.getByRole('button', { name: 'Make the link' }).click();
    await page.getByText('Shown this once').waitFor();
    expect(await secret()).toMatch(new RegExp(`^${fake.url}/display#token-`));
    await page.getByText('Shows Hose line B').waitFor();
    await page.getByRole('button', { name: 'Withdraw: Crimping cell' }).click();
    await page.keyboard.press('Escape');
    expect(await focusedName()).toBe('Withdraw: Crimping cell');
    await page.keyboard.press('Enter');
    await dialog().getByRole('button', { name: 'Withdraw' }).click();
    await expect.poll(() => page.getByText('Crimping cell').count()).toBe(0);
  });
});

describe('sources', () => {
  it('are made with a token shown once, renewed with an overlap, and withdrawn with a reason', async () => {
    await show('/sources');
    await page.getByLabel('Name', { exact: true }).fill('leak-a-1');
    await page.getByLabel('Stations').fill('a.leak-test, a.final');
    await page.getByLabel('Why').fill('New tester');
    await page.getByRole('button', { name: 'Make the token' }).click();
    await page.getByText('A source has this name already.').waitFor();
    await page.getByLabel('Name', { exact: true }).fill('leak-a-2');
    await page.getByRole('button', { name: 'Make the token' }).click();
    await page.getByText('The token of leak-a-2').waitFor();
    expect(await secret()).toBe('vouchline_leak-a-2_shown-once');
    expect(fake.access.sources.get('leak-a-2')?.stations).toEqual(['a.leak-test', 'a.final']);
    await page.getByRole('button', { name: 'Renew the token of leak-a-2' }).click();
    await dialog().getByLabel('Hours the old token still holds').fill('8');
    await dialog().getByLabel('Why').fill('Yearly');
    await dialog().getByRole('button', { name: 'Renew' }).click();
    await expect.poll(secret).toBe('vouchline_leak-a-2_renewed');
    await page.locator('.rows li').filter({ hasText: 'leak-a-2' }).getByText('The old token holds until').waitFor();
    await page.getByRole('button', { name: 'Withdraw leak-a-2' }).click();
    await dialog().getByLabel('Why').fill('Scrapped');
    await dialog().getByRole('button', { name: 'Withdraw' }).click();
    await page.locator('.rows li').filter({ hasText: 'leak-a-2' }).getByText('withdrawn', { exact: true }).waitFor();
  });
});

describe('the record of changes', () => {
  it('is read by pages to its end', async () => {
    await show('/changes', fullPlant({ changes: changesOf(230) }));
    const rows = page.locator('change-list tbody tr');
    await expect.poll(() => rows.count()).toBe(100);
    await page.getByRole('button', { name: 'Show older' }).click();
    await expect.poll(() => rows.count()).toBe(200);
    await page.getByRole('button', { name: 'Show older' }).click();
    await page.getByText('230 records; there are no older ones.').waitFor();
    await page.getByText('grants: viewer').first().waitFor({ state: 'detached' });
    await page.locator('del').getByText('supervisor for Hose line A, viewer for the whole plant').first().waitFor();
  });

  it('is filtered by kind, text and time, and exported for that time', async () => {
    await show('/changes', fullPlant({ changes: changesOf(60) }));
    const rows = page.locator('change-list tbody tr');
    await page.getByLabel('What', { exact: true }).selectOption({ label: 'Evidence restarted' });
    await page.getByLabel('Holds').fill('SEAL OF');
    await page.getByRole('button', { name: 'Filter' }).click();
    await expect.poll(() => rows.count()).toBe(6);
    await page.getByLabel('Holds').fill('no such words');
    await page.getByRole('button', { name: 'Filter' }).click();
    await page.getByText('Nothing on record fits the filter.').waitFor();
    await page.getByRole('button', { name: 'All' }).click();
    await expect.poll(() => rows.count()).toBe(60);
    await page.getByLabel('From').fill('2026-03-03T09:00');
    await page.getByLabel('To', { exact: true }).fill('2026-03-02T09:00');
    await page.getByRole('button', { name: 'Filter' }).click();
    await page.getByText('The end comes before the beginning.').waitFor();
    await page.getByLabel('To', { exact: true }).fill('2099-01-01T00:00');
    await page.getByRole('button', { name: 'Filter' }).click();
    const link = page.getByRole('link', { name: 'Export as NDJSON' });
    await expect.poll(() => link.getAttribute('href')).toBe(`/api/changes/export?from=${Date.UTC(2026, 2, 3, 8)}&to=${Date.UTC(2098, 11, 31, 23)}&form=ndjson`);
    const [download] = await Promise.all([page.waitForEvent('download'), link.click()]);
    expect(download.suggestedFilename()).toBe('changes.ndjson');
  });

  it('shows its head with the command that checks it', async () => {
    await show('/changes', fullPlant({ changes: changesOf(3) }));
    const head = `3:${fake.access.changes[0]!.hash}`;
    await page.getByText(`vouchline check --data DIR --head ${head}`).waitFor();
  });
});

describe('pages that are not for everybody', () => {
  it.each([['/people', 'Managing accounts needs the role administrator'], ['/displays', 'Managing displays needs the role administrator'], ['/sources', 'Managing sources needs the role engineer or administrator'], ['/changes', 'Reading the record of changes needs the role supervisor, engineer or administrator']])('%s says who may', async (path, words) => {
    await show(path, signedInAs('mette'));
    await page.getByText(`${words} for the whole plant.`).waitFor();
    await page.locator('person-menu summary').click();
    expect(await page.locator('person-menu nav a').allInnerTexts()).toEqual(['My account']);
  });

  it('an account without a role is told so', async () => {
    await show('/', signedInAs('mette', { accounts: [{ ...fullPlant().accounts!.find(({ id }) => id === 'mette')!, grants: [] }] }));
    await page.getByRole('heading', { name: 'You have no role yet' }).waitFor();
    expect(fake.watches).toEqual([]);
  });
});

describe('what is empty or fails', () => {
  it.each([['/displays', 'There is no display yet.'], ['/sources', 'No source has a token yet'], ['/changes', 'Nothing is on record yet. Sign-ins'], ['/account', 'You have no token.']])('%s says so', async (path, words) => {
    await show(path, signedInAs('ada', { displays: [], passkeys: true }));
    await page.getByText(words).first().waitFor();
  });

  it.each([['/people', '**/api/accounts', 'The accounts'], ['/displays', '**/api/displays', 'The displays'], ['/sources', '**/api/sources', 'The sources'], ['/changes', '**/api/changes?*', 'The record'], ['/account', '**/api/own/sessions', 'Your sessions']])('%s says what could not be read, and tries again', async (path, asked, what) => {
    await serve({ access: fullPlant() });
    await open('about:blank', 'wide');
    await page.route(asked, (route) => route.fulfill({ status: 503, body: '{"message":"the disk is full"}' }), { times: 1 });
    await page.goto(fake.url + path);
    const failed = page.locator('.failed').filter({ hasText: `${what} could not be read: the disk is full.` });
    await failed.getByRole('button', { name: 'Try again' }).click();
    await expect.poll(() => page.locator('.failed').count()).toBe(0);
  });
});
