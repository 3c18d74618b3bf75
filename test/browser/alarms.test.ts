import { describe, expect, it } from 'vitest';
import { caution } from '../../core/guarantee/caution.ts';
import { alarms, plantStart } from './fake-plant.ts';
import { fake, onFakePages, open, page, serve } from './fake-pages.ts';

onFakePages({ served: true });

describe('acknowledging', () => {
  it('asks once for the name, then takes one tap', async () => {
    await open('/', 'phone');
    await page.getByRole('button', { name: 'Acknowledge: BH-4 leak test' }).click();
    await page.getByLabel('Your name').fill('Ines Maurer');
    await page.getByLabel('Note').fill('Lot held');
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await page.getByText('by Ines Maurer').first().waitFor();
    expect(fake.posts).toEqual([{ path: '/api/alarms/41/acknowledge', body: { by: 'Ines Maurer', note: 'Lot held' } }]);
    await page.getByRole('button', { name: 'Acknowledge: Kit cap torque' }).click();
    await expect.poll(() => fake.posts.length).toBe(2);
    expect(fake.posts[1]).toEqual({ path: '/api/alarms/39/acknowledge', body: { by: 'Ines Maurer', note: '' } });
    expect(await page.getByRole('dialog').count()).toBe(0);
  });

  it('a name of blanks is not sent, and a refusal is shown with its reason', async () => {
    await open('/alarms', 'phone');
    await page.getByRole('button', { name: /^Acknowledge: BH-4/ }).click();
    await page.getByLabel('Your name').fill('   ');
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await page.getByText('Give your name').waitFor();
    expect(fake.posts).toEqual([]);
    fake.refusePosts('this alarm has ended');
    await page.getByLabel('Your name').fill('Ines');
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await page.getByText('Not acknowledged: this alarm has ended.').waitFor();
    expect(await page.getByRole('dialog').count()).toBe(1);
  });
});

describe('the alarm list', () => {
  it('has the waiting ones first by priority, then those in hand, then the ended', async () => {
    await open('/alarms', 'phone');
    await page.locator('alarm-card').nth(3).waitFor();
    expect(await page.locator('alarm-card h3').allInnerTexts()).toEqual(['BH-4 leak test', 'Kit cap torque', 'BH-5 crimp pull-off force', 'BH-4 final inspection']);
    expect(await page.locator('h1').innerText()).toBe('2 alarms wait for acknowledgement');
    await page.getByText('Hold the lot. Check the crimping die of station 2, then call maintenance.').waitFor();
  });

  it('asks the server for older ones and stops when there are none', async () => {
    await open('/alarms', 'desk');
    await page.getByRole('button', { name: 'Show older alarms' }).click();
    await expect.poll(() => page.getByRole('button', { name: 'Show older alarms' }).count()).toBe(0);
  });

  it('has targets of at least 44 px for gloved hands', async () => {
    await open('/alarms', 'phone');
    await page.locator('alarm-card').nth(3).waitFor();
    const heights = await page.locator('alarm-card button').evaluateAll((all) => all.map((one) => one.getBoundingClientRect().height));
    expect(Math.min(...heights)).toBeGreaterThanOrEqual(44);
  });

  it('says so when nothing was ever raised', async () => {
    await fake.stop();
    await serve({ noRecords: true });
    await open('/alarms', 'phone');
    await page.getByText('Nothing has been raised.').waitFor();
  });
});

describe('a new alarm', () => {
  it('is told politely to those who hear the page, and shown until it is acknowledged', async () => {
    await open('/guarantees/fill', 'desk');
    await page.locator('guarantee-page h1').waitFor();
    expect(await page.locator('alarm-announcer .slip').count()).toBe(0);
    fake.tell([], [{ ...alarms[0]!, id: 50, guarantee: 'fill', rule: 'crossing', safetyRelevant: false, raisedAt: plantStart as never, times: 1 }]);
    await page.locator('alarm-announcer .slip').waitFor();
    expect(await page.locator('alarm-announcer [role=status]').innerText()).toBe('Alarm, high priority: Kit fill volume, Bound crossed the guarantee line.');
    await page.locator('.slip').getByRole('button', { name: 'Acknowledge' }).click();
    await page.getByRole('dialog').getByLabel('Your name').fill('Tom');
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await expect.poll(() => page.locator('alarm-announcer .slip').count()).toBe(0);
  });
});

describe('what is safety-relevant', () => {
  it.each([['/', 'desk'], ['/', 'wall'], ['/alarms', 'phone'], ['/guarantees/leak-bh4', 'desk']] as const)('carries the caution in the same words at %s on a %s', async (path, size) => {
    await open(path, size);
    await page.locator('line-board, alarm-card, guarantee-page').first().waitFor();
    for (const sentence of [caution.title, ...caution.sentences]) await page.getByText(sentence).first().waitFor();
  });
});
