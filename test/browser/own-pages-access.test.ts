import { describe, expect, it } from 'vitest';
import { axeFindings } from './axe-findings.ts';
import type { FakeAccessOptions } from './fake-access.ts';
import { changesOf, fullPlant, people } from './fake-people.ts';
import { fake, onFakePages, open, page, serve } from './fake-pages.ts';

onFakePages({ served: false });

const inside = fullPlant({ changes: changesOf(120) });
const before: FakeAccessOptions = { access: 'accounts', accounts: people, passkeys: true, directory: 'Hose plant directory', invitations: [{ id: 'i', code: 'c', kind: 'account', grants: [{ role: 'viewer', line: undefined }], account: null, shownAs: null, made: 0, by: '', expires: 0 }] };
const places: readonly (readonly [string, string, FakeAccessOptions])[] = [
  ['/sign-in', 'input[name=password]', before], ['/join#c', 'input[name=password]', before], ['/join', 'h1', before], ['/display#x', 'h1', before],
  ['/account', 'own-tokens .rows', inside], ['/people', 'people-table', inside], ['/displays', '.rows', inside], ['/sources', '.rows', inside], ['/changes', 'change-list', inside],
];

describe('axe finds nothing', () => {
  it.each(places.flatMap(([path, ready, access]) => (['light', 'dark'] as const).flatMap((theme) => (['wide', 'phone'] as const).map((size) => [path, theme, size, ready, access] as const))))('at %s, %s, %s', async (path, theme, size, ready, access) => {
    await serve({ access });
    await open(path, size, theme);
    await page.locator(ready).first().waitFor();
    if (size === 'wide' && access === inside) await page.locator('person-menu summary').click();
    expect(await axeFindings(page)).toEqual([]);
  });

  it.each(['light', 'dark'] as const)('in the dialogs and where something is wrong, %s', async (theme) => {
    await serve({ access: inside });
    await open('/people', 'wide', theme);
    await page.getByRole('button', { name: 'Make the link' }).click();
    await page.getByText('Tick at least one role.').waitFor();
    expect(await axeFindings(page)).toEqual([]);
    await page.getByRole('button', { name: 'Change Ines Maurer' }).click();
    expect(await axeFindings(page)).toEqual([]);
    await page.getByRole('button', { name: 'Disable the account' }).click();
    expect(await axeFindings(page)).toEqual([]);
    await page.goto(`${fake.url}/account`);
    await page.getByText('Make a token').click();
    expect(await axeFindings(page)).toEqual([]);
  });

  it.each(['light', 'dark'] as const)('at a shared screen while somebody acts, %s', async (theme) => {
    await serve({ access: { ...inside, as: 'bench' } });
    await open('/', 'phone', theme);
    await page.getByRole('button', { name: /^Acknowledge/ }).first().click();
    await page.getByRole('button', { name: 'Ines Maurer' }).waitFor();
    expect(await axeFindings(page)).toEqual([]);
    await page.getByRole('button', { name: 'Ines Maurer' }).click();
    await page.keyboard.type('4711');
    expect(await axeFindings(page)).toEqual([]);
    await page.keyboard.press('Enter');
    await page.getByText(/^Acknowledging as/).waitFor();
    expect(await axeFindings(page)).toEqual([]);
  });
});

describe('on a phone 320 px wide', () => {
  it.each(places)('%s does not scroll sideways', async (path, ready, access) => {
    await serve({ access });
    await open(path, 'narrow');
    await page.locator(ready).first().waitFor();
    const widths = await page.evaluate(() => {
      const roots: (Document | ShadowRoot)[] = [document];
      const beyond: string[] = [];
      for (const root of roots) for (const element of root.querySelectorAll('*')) {
        if (element.shadowRoot !== null) roots.push(element.shadowRoot);
        const box = element.getBoundingClientRect();
        if (box.width > 1 && box.height > 1 && box.right > innerWidth + 0.5) beyond.push(element.outerHTML.slice(0, 80));
      }
      return { page: document.documentElement.scrollWidth, beyond };
    });
    expect(widths).toEqual({ page: 320, beyond: [] });
  });

  it('nor do the board with its person, and the dialogs', async () => {
    await serve({ access: inside });
    await open('/', 'narrow');
    await page.locator('board-lane').first().waitFor();
    await page.locator('person-menu summary').click();
    const panel = await page.locator('person-menu .panel').boundingBox();
    expect(panel!.x).toBeGreaterThanOrEqual(0);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(320);
    await page.goto(`${fake.url}/people`);
    await page.getByRole('button', { name: 'Change Ines Maurer' }).click();
    const dialog = page.getByRole('dialog');
    expect(await dialog.evaluate((one) => one.scrollWidth <= one.clientWidth)).toBe(true);
  });
});

describe('by keyboard', () => {
  it('one gets from the board to the people, changes a role, and is back where one was', async () => {
    await serve({ access: inside });
    await open('/', 'wide');
    await page.locator('board-lane').first().waitFor();
    const tabTo = async (name: string): Promise<void> => {
      for (let step = 0; step < 60; step += 1) {
        await page.keyboard.press('Tab');
        const at = await page.evaluate(() => {
          let one = document.activeElement;
          while (one?.shadowRoot?.activeElement) one = one.shadowRoot.activeElement;
          const label = one instanceof HTMLInputElement ? one.labels?.[0]?.textContent : undefined;
          return (label ?? one?.getAttribute('aria-label') ?? one?.textContent ?? '').trim();
        });
        if (at === name) return;
      }
      throw new Error(`nothing is called ${name} on the way`);
    };
    await tabTo('Ada Lindqvist');
    await page.keyboard.press('Enter');
    await tabTo('People');
    await page.keyboard.press('Enter');
    await page.locator('people-table').waitFor();
    await tabTo('Change Mette Sørensen');
    await page.keyboard.press('Enter');
    await tabTo('Supervisor, Hose line B');
    await page.keyboard.press('Space');
    await tabTo('Why');
    await page.keyboard.type('New on line B');
    await page.keyboard.press('Enter');
    await expect.poll(() => fake.access.accounts.get('mette')?.grants.length).toBe(2);
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);
    await page.keyboard.press('Enter');
    await page.getByRole('dialog').getByRole('heading', { name: 'Mette Sørensen' }).waitFor();
  });
});
