import { describe, expect, it } from 'vitest';
import type { FakeAccessOptions } from './fake-access.ts';
import { changesOf, fullPlant, people } from './fake-people.ts';
import { hostile } from './hostile-text.ts';
import { fake, onFakePages, open, page, serve } from './fake-pages.ts';

onFakePages({ served: false });

const access = fullPlant({ changes: changesOf(40) });
const doors: FakeAccessOptions = { access: 'accounts', accounts: people, directory: 'Plant directory', invitations: [{ id: 'i', code: 'c', kind: 'account', grants: [{ role: 'viewer', line: 'a' }], account: null, shownAs: 'Selma', made: 0, by: 'Ada', expires: 0 }] };

/** How often the hostile text stands on the page as text, and how many elements it would have made there are. */
const found = (): Promise<{ texts: number; elements: number; ran: boolean }> => page.evaluate((text) => {
  const roots: (Document | ShadowRoot)[] = [document];
  let [texts, elements] = [0, 0];
  for (const root of roots) {
    for (const element of root.querySelectorAll('*')) {
      if (element.shadowRoot !== null) roots.push(element.shadowRoot);
      if (element.localName === 'img' || (element instanceof HTMLScriptElement && element.src === '')) elements += 1;
      const own = [...element.childNodes].filter((node) => node instanceof Text).map((node) => node.data).join('');
      if (own.includes(text) || (element instanceof HTMLInputElement && element.value.includes(text))) texts += 1;
    }
  }
  return { texts, elements, ran: 'broken' in globalThis };
}, hostile);

async function isText(least: number): Promise<void> {
  await expect.poll(async () => (await found()).texts).toBeGreaterThanOrEqual(least);
  expect(await found()).toMatchObject({ elements: 0, ran: false });
}

describe('script in a text is text', () => {
  it.each<readonly [string, string, number]>([
    ['/', 'board-lane', 8], ['/alarms', 'alarm-card', 8], ['/guarantees/leak-bh4', 'history-chart', 6], ['/guarantees/chain-b', 'guarantee-picture', 3],
    ['/account', 'own-tokens .rows', 4], ['/people', 'people-table', 8], ['/displays', '.rows', 4], ['/sources', '.rows', 4], ['/changes', 'change-list', 80],
  ])('at %s', async (path, ready, least) => {
    await serve({ access, hostile: true });
    await open(path, 'wide');
    await page.locator(ready).first().waitFor();
    await isText(least);
    await page.locator('person-menu summary').click();
    await isText(least);
  });

  it('in the dialogs of an alarm, of a person, and of what is asked before', async () => {
    await serve({ access, hostile: true });
    await open('/alarms', 'wide');
    await page.getByRole('button', { name: /^With a note/ }).first().click();
    await page.getByRole('dialog').waitFor();
    await isText(8);
    await page.goto(`${fake.url}/people`);
    await page.getByRole('button', { name: /^Change Ines/ }).click();
    await page.getByRole('button', { name: 'Disable the account' }).click();
    await page.getByRole('dialog').last().getByLabel('Why').fill(hostile);
    await isText(8);
  });

  it('at a shared screen', async () => {
    await serve({ access: { ...access, as: 'bench' }, hostile: true });
    await open('/', 'wide');
    await page.getByRole('button', { name: /^Acknowledge/ }).first().click();
    await page.getByRole('button', { name: /^Ines/ }).click();
    await page.getByLabel(/^PIN of Ines/).waitFor();
    await isText(8);
    await page.keyboard.type('4711');
    await page.keyboard.press('Enter');
    await page.getByText(/^Acknowledging as/).waitFor();
    await isText(8);
  });

  it.each([['/sign-in', 'Sign in with'], ['/join#c', 'Your account']])('before one is in, at %s', async (path, ready) => {
    await serve({ access: doors, hostile: true });
    await open(path, 'wide');
    await page.getByText(ready).first().waitFor();
    await isText(1);
  });

  it('in what is refused', async () => {
    await serve({ access: doors, hostile: true });
    await open('/', 'wide');
    await page.getByLabel('Name', { exact: true }).fill(hostile);
    await page.getByLabel('Password', { exact: true }).fill('wrong');
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await page.getByText('Name or password is wrong').waitFor();
    await isText(2);
  });
});
