import { describe, expect, it } from 'vitest';
import { fake, onFakePages, open, page } from './fake-pages.ts';

onFakePages({ served: true });

const liveness = (): Promise<string> => page.locator('page-masthead dd b').innerText();

describe('the connection', () => {
  it('when it is lost everything dims and says last known; when it returns the board resumes and is live', async () => {
    await open('/', 'desk');
    await page.locator('board-lane').first().waitFor();
    expect(await liveness()).toBe('Live');
    fake.cutLive();
    await page.getByText('Connection lost. What you see is last known').waitFor();
    expect(await liveness()).toBe('Not live');
    expect(await page.locator('main').evaluate((main) => getComputedStyle(main).filter)).toContain('grayscale');
    expect(await page.locator('board-lane').count()).toBe(8);
    fake.returnLive();
    fake.tell([{ ...fake.view('fill'), state: 'undecided', allowance: { ...fake.view('fill').allowance, bound: 1.3 } }]);
    await expect.poll(liveness, { timeout: 20_000 }).toBe('Live');
    expect(fake.watches.at(-1)).toMatchObject({ type: 'watch', boot: 'boot-1' });
    expect(fake.watches.at(-1)?.revision).toBeGreaterThan(0);
    expect(await page.locator('.says').innerText()).toBe('4 of 8 guarantees need you.');
    expect(await page.getByText('Connection lost').count()).toBe(0);
  });

  it('a server that falls silent is not live after three seconds, though the socket is open', async () => {
    await open('about:blank', 'desk');
    await page.clock.install();
    await page.goto(fake.url);
    await page.clock.runFor(1000);
    await page.locator('board-lane').first().waitFor();
    fake.fallSilent();
    await page.clock.runFor(2000);
    expect(await liveness()).toBe('Live');
    await page.clock.runFor(2500);
    await page.getByText('Not live: the server is silent').waitFor();
  });

  it('without a server the page says so and keeps trying', async () => {
    fake.cutLive();
    await open('/', 'phone');
    await page.getByText('The server does not answer. Trying again.').waitFor();
    fake.returnLive();
    await page.locator('board-lane').first().waitFor({ timeout: 20_000 });
  });
});
