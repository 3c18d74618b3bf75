import type { Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ServerMessage } from '../../core/protocol/source-messages.ts';
import type { Served } from '../../server/serve.ts';
import { leakPlant, verdictPart } from '../server/plants.ts';
import { dataDirectory, servedOn, sourceTalk, tokenFor, type Talk } from '../server/serving.ts';
import { openBrowser, type Browser } from './open-browser.ts';

const monday = Date.UTC(2026, 5, 1, 6);
let browser: Browser;
let data: ReturnType<typeof dataDirectory>;
let served: Served;
let source: Talk<ServerMessage>;
let page: Page;
let next: number;
let at: number;

beforeAll(async () => {
  browser = await openBrowser();
});
afterAll(async () => {
  await browser.close();
});
beforeEach(async () => {
  data = dataDirectory(leakPlant);
  const token = await tokenFor(data.path, 'leak-tester', ['A.leak-test']);
  served = await servedOn(data.path);
  source = sourceTalk(served.address, token);
  await source.next();
  next = 1;
  at = monday;
});
afterEach(async () => {
  await page.close();
  await served.stop('test over');
  data.remove();
  expect(browser.errors).toEqual([]);
});

/** Sends verdicts one second apart and waits until they are on disk. */
async function inspect(units: number, nonconforming: readonly number[] = []): Promise<void> {
  source.send({ type: 'records', first: next, parts: [verdictPart(units, nonconforming, at)] });
  next += units;
  at += units * 1000;
  expect(await source.next()).toEqual({ type: 'ack', next });
}

describe('the board on a real server', () => {
  it('lives through a fault: demonstrated, crossed, acknowledged, returned to normal', async () => {
    page = await browser.open(served.address, 'desk');
    const lane = page.locator('board-lane').first();
    await lane.getByText('Gathering').waitFor();
    await inspect(1000);
    await lane.getByText('Demonstrated').waitFor();
    await inspect(10, [1, 3, 5, 7, 9]);
    await lane.getByText('Undecided').waitFor();
    await page.getByText(/needs you/).first().waitFor();
    await page.getByRole('button', { name: 'Acknowledge: Leak test, line A' }).click();
    await page.getByLabel('Your name').fill('Mette');
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await lane.getByText('by Mette').waitFor();
    await inspect(1100);
    await lane.getByText('Demonstrated').waitFor();
    await page.getByRole('link', { name: /^Alarms/ }).click();
    await page.locator('alarm-card').getByText('Leak test, line A').waitFor();
    expect(await page.locator('alarm-card').count()).toBe(1);
  });

  it('shows the page of the guarantee with its window, its units and its caution', async () => {
    await inspect(1000, [200, 700]);
    page = await browser.open(`${served.address}/guarantees/leak-A`, 'desk');
    await page.getByRole('heading', { name: 'Leak test, line A' }).waitFor();
    await page.getByText('Absence of an alarm proves nothing about a single unit.').first().waitFor();
    await page.getByText('2 nonconforming units listed').waitFor();
    await page.getByText('exact binomial bound', { exact: false }).first().waitFor();
  });

  it('says when the server is gone, and is live again when it is back', async () => {
    await inspect(1000);
    page = await browser.open(served.address, 'desk');
    await page.locator('board-lane').getByText('Demonstrated').waitFor();
    const port = new URL(served.address).port;
    await served.stop('restart');
    await page.getByText(/last known/).first().waitFor();
    served = await servedOn(data.path, { kind: 'records' }, { port });
    await expect.poll(() => page.locator('page-masthead dd b').innerText(), { timeout: 30_000 }).toBe('Live');
    await page.locator('board-lane').getByText('Demonstrated').waitFor();
  });
});
