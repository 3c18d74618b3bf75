import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { axeFindings as findings } from './axe-findings.ts';
import { startFake, type FakeServer } from './fake-server.ts';
import { openBrowser, type Browser, type Size } from './open-browser.ts';

let browser: Browser;
let fake: FakeServer;

beforeAll(async () => {
  browser = await openBrowser();
  fake = await startFake({ clockRate: 60 });
});
afterAll(async () => {
  await browser.close();
  await fake.stop();
});

const pages: readonly (readonly [string, string])[] = [['/', 'board-lane'], ['/alarms', 'alarm-card'], ['/guarantees/leak-bh4', 'history-chart svg'], ['/guarantees/chain-b', 'guarantee-picture table'], ['/guarantees/pull-bh5', 'guarantee-picture svg']];
const cases = pages.flatMap(([path, ready]) => (['desk', 'phone'] as const).flatMap((size) => (['light', 'dark'] as const).map((theme) => [path, size, theme, ready] as const)));

describe('access', () => {
  it.each<readonly [string, Size, 'light' | 'dark', string]>([...cases, ['/', 'wall', 'light', 'board-lane'], ['/', 'wall', 'dark', 'board-lane']])('%s on a %s, %s: axe finds nothing', async (path, size, theme, ready) => {
    const page = await browser.open(fake.url + path, size, theme);
    await page.locator(ready).first().waitFor();
    expect(await findings(page)).toEqual([]);
    await page.close();
  });

  it('the dialog and the open view panel too', async () => {
    const page = await browser.open(fake.url, 'phone');
    await page.getByText('View', { exact: true }).click();
    expect(await findings(page)).toEqual([]);
    await page.getByText('View', { exact: true }).click();
    await page.getByRole('button', { name: /^Acknowledge/ }).first().click();
    await page.getByRole('dialog').waitFor();
    expect(await findings(page)).toEqual([]);
    await page.close();
  });
});

describe('keyboard', () => {
  it('leads from the skip link over every lane to a guarantee and back, always seen', async () => {
    const page = await browser.open(fake.url, 'desk');
    await page.locator('board-lane').nth(7).waitFor();
    const focused = (): Promise<{ name: string; seen: boolean }> => page.evaluate(() => {
      let at = document.activeElement;
      while (at?.shadowRoot?.activeElement) at = at.shadowRoot.activeElement;
      const article = at?.closest('article');
      const seen = [at, article].some((one) => one instanceof Element && (getComputedStyle(one).outlineStyle !== 'none' || getComputedStyle(one).boxShadow !== 'none'));
      return { name: at?.getAttribute('aria-label') ?? (at?.textContent?.trim() || at?.localName) ?? '', seen };
    });
    await page.keyboard.press('Tab');
    expect((await focused()).name).toBe('Skip to the content');
    await page.keyboard.press('Enter');
    const heard: string[] = [];
    for (let step = 0; step < 12; step += 1) {
      await page.keyboard.press('Tab');
      const { name, seen } = await focused();
      expect(seen, name).toBe(true);
      heard.push(name);
      if (heard.filter((one) => one.includes('Hose line') || one.includes('Fluid')).length === 8) break;
    }
    expect(heard[0]).toMatch(/^BH-4 leak test, Hose line A: Violated\. Upper bound 484\sppm; promised at most 200\sppm nonconforming; 95\s% confidence, all looks/);
    expect(heard.filter((name) => name.startsWith('Acknowledge'))).toHaveLength(2);
    await page.keyboard.press('Enter');
    await page.locator('guarantee-page h1').waitFor();
    expect(new URL(page.url()).pathname).toMatch(/^\/guarantees\//);
    expect((await focused()).name).toBe('main');
    await page.goBack();
    await page.locator('line-board').waitFor();
    await page.close();
  });

  it('closes the dialog with Escape and leaves everything as it was', async () => {
    const page = await browser.open(fake.url, 'desk');
    await page.getByRole('button', { name: /^Acknowledge/ }).first().focus();
    await page.keyboard.press('Enter');
    await page.getByRole('dialog').waitFor();
    await page.keyboard.press('Escape');
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);
    expect(fake.posts).toEqual([]);
    await page.close();
  });
});
