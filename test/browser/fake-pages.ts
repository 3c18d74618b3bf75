import type { Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, expect } from 'vitest';
import { startFake, type FakeOptions, type FakeServer } from './fake-server.ts';
import { openBrowser, type Browser, type Size } from './open-browser.ts';

/** The browser of a test file; the fake server and the page of the test that runs. */
export let browser: Browser;
export let fake: FakeServer;
export let page: Page;
let runs = false;

/** Has a browser for the file; after each test its page and server are gone, and no script may have failed. @param served whether each test begins with the usual fake server */
export function onFakePages({ served }: { readonly served: boolean }): void {
  beforeAll(async () => { browser = await openBrowser(); });
  afterAll(async () => { await browser.close(); });
  if (served) beforeEach(() => serve());
  afterEach(async () => {
    await page.close();
    await browser.context.clearCookies();
    await fake.stop();
    runs = false;
    expect(browser.errors).toEqual([]);
  });
}

/** Starts the test's fake server, in place of the one that runs. */
export async function serve(options: FakeOptions = {}): Promise<void> {
  if (runs) await fake.stop();
  runs = true;
  fake = await startFake(options);
}

/** Opens the test's page. @param place a path of the fake server, or a whole address */
export async function open(place: string, size: Size, theme: 'light' | 'dark' = 'light'): Promise<void> {
  page = await browser.open(place.startsWith('/') ? fake.url + place : place, size, theme);
}
