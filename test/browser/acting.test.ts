import { describe, expect, it } from 'vitest';
import type { FakeAccessOptions } from './fake-access.ts';
import { signedInAs } from './fake-people.ts';
import type { Size } from './open-browser.ts';
import { fake, onFakePages, open, page, serve } from './fake-pages.ts';

onFakePages({ served: false });

async function show(path: string, as: string, part: FakeAccessOptions = {}, size: Size = 'desk'): Promise<void> {
  await serve({ access: signedInAs(as, part) });
  await open(path, size);
}

const acknowledged = (): unknown[] => fake.posts.map(({ path, body }) => [path, body['by'], body['note']]);

describe('acknowledging with an account', () => {
  it('takes one tap, under the own name', async () => {
    await show('/', 'tom');
    await page.getByRole('button', { name: 'Acknowledge: BH-4 leak test' }).click();
    await page.getByText('by Tom Reiter').first().waitFor();
    expect(acknowledged()).toEqual([['/api/alarms/41/acknowledge', 'Tom Reiter', '']]);
    expect(await page.getByRole('dialog').count()).toBe(0);
  });

  it('asks for no name with a note either, and says under which it goes on record', async () => {
    await show('/alarms', 'tom');
    await page.getByRole('button', { name: 'With a note: BH-4 leak test' }).click();
    await page.getByText('It goes on record as Tom Reiter.').waitFor();
    expect(await page.getByLabel('Your name').count()).toBe(0);
    await page.getByRole('textbox', { name: 'Note' }).fill('Lot held');
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await page.getByText(/Acknowledged by Tom Reiter.*Lot held/).waitFor();
  });

  it('is there only on lines where one may, and elsewhere it says what is missing', async () => {
    await show('/alarms', 'ines');
    await page.locator('alarm-card').filter({ hasText: 'BH-4 leak test' }).getByRole('button', { name: /^Acknowledge as Ines Maurer/ }).waitFor();
    const other = page.locator('alarm-card').filter({ hasText: 'Kit cap torque' });
    await other.getByText('Acknowledging needs the role supervisor, maintenance or engineer for Fluid bottling.').waitFor();
    expect(await other.getByRole('button').count()).toBe(0);
  });

  it('restarting the evidence goes on record under the own name, and says what is missing where one may not', async () => {
    await show('/guarantees/leak-bh4', 'ines');
    await page.getByText('Restart the evidence', { exact: true }).first().click();
    await page.getByText('It goes on record as Ines Maurer.').waitFor();
    await page.getByLabel('Reason').fill('Seal changed');
    await page.getByRole('button', { name: 'Restart the evidence' }).click();
    await page.getByText('Evidence restarted.').waitFor();
    expect(fake.posts.at(-1)).toEqual({ path: '/api/guarantees/leak-bh4/restart', body: { by: 'Ines Maurer', reason: 'Seal changed' } });
    await page.goto(`${fake.url}/guarantees/fill`);
    await page.getByText('Restarting the evidence needs the role maintenance or engineer for Fluid bottling.').waitFor();
  });
});

describe('acting by PIN', () => {
  it('at an acting display: choose who, type the PIN with gloves, and it goes on record under that name', async () => {
    await show('/', 'bench', {}, 'phone');
    await page.getByRole('button', { name: 'Acknowledge: BH-4 leak test' }).click();
    await page.getByRole('heading', { name: 'Who are you?' }).waitFor();
    await page.getByRole('button', { name: 'Ines Maurer' }).click();
    const keys = await page.locator('pin-pad .keys button').evaluateAll((all) => all.map((one) => Math.min(one.getBoundingClientRect().height, one.getBoundingClientRect().width)));
    expect(keys).toHaveLength(12);
    expect(Math.min(...keys)).toBeGreaterThanOrEqual(56);
    for (const digit of ['4', '7', '1', '2']) await page.getByRole('button', { name: digit, exact: true }).click();
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await page.getByText('Not taken: the PIN is wrong.').waitFor();
    for (const digit of ['4', '7', '1', '2']) await page.getByRole('button', { name: digit, exact: true }).click();
    await page.getByRole('button', { name: 'Take back the last digit' }).click();
    await page.getByRole('button', { name: '1', exact: true }).click();
    await page.getByRole('dialog').getByRole('button', { name: 'Acknowledge' }).click();
    await expect.poll(acknowledged).toEqual([['/api/alarms/41/acknowledge', 'Ines Maurer', '']]);
    await page.getByText(/Acknowledging as Ines Maurer for 1 min 5\d s/).waitFor();
    await page.getByText('Not yet acknowledged').waitFor(); // bottling is none of her lines
    await page.getByRole('button', { name: 'End now' }).click();
    await expect.poll(() => page.getByText(/^Acknowledging as/).count()).toBe(0);
  });

  it('works by keyboard, and Escape gives the focus back', async () => {
    await show('/', 'bench');
    const button = page.getByRole('button', { name: 'Acknowledge: BH-4 leak test' });
    await button.focus();
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: 'Ines Maurer' }).waitFor();
    await page.keyboard.press('Escape');
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);
    expect(await button.evaluate((one) => one === (one.getRootNode() as ShadowRoot).activeElement)).toBe(true);
    expect(fake.posts).toEqual([]);
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: 'Tom Reiter' }).focus();
    await page.keyboard.press('Enter');
    await page.getByLabel('PIN of Tom Reiter').waitFor();
    await page.keyboard.type('2580');
    await page.keyboard.press('Enter');
    await page.getByText('by Tom Reiter').first().waitFor();
  });

  it('ends by itself: then nobody’s name stands on the buttons', async () => {
    await show('/alarms', 'bench', { actingMs: 2_500 });
    await page.getByRole('button', { name: /^Acknowledge: BH-4/ }).click();
    await page.getByRole('button', { name: 'Tom Reiter' }).click();
    await page.keyboard.type('2580');
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: /^Acknowledge as Tom Reiter: Kit cap torque/ }).waitFor();
    await page.getByRole('button', { name: /^Acknowledge: Kit cap torque/ }).waitFor();
  });

  it('at a shared terminal an account hands over by its menu', async () => {
    await show('/', 'mette');
    await page.getByText('Not yet acknowledged').first().waitFor();
    await page.getByText('Mette Sørensen').first().click();
    await page.getByRole('button', { name: 'Act as somebody by PIN' }).click();
    await page.getByRole('button', { name: 'Tom Reiter' }).click();
    await page.keyboard.type('2580');
    await page.keyboard.press('Enter');
    await page.getByText(/^Acknowledging as Tom Reiter/).waitFor();
    await page.getByRole('button', { name: 'Acknowledge: BH-4 leak test' }).click();
    await page.getByText('by Tom Reiter').first().waitFor();
  });
});

describe('open access', () => {
  it('is said plainly', async () => {
    await serve();
    await open('/', 'desk');
    await page.getByText('Open to everybody who reaches it').first().waitFor();
  });
});
