import { describe, expect, it } from 'vitest';
import { fake, onFakePages, open, page } from './fake-pages.ts';

onFakePages({ served: true });

const show = async (id: string): Promise<void> => {
  await open(`/guarantees/${id}`, 'desk');
  await page.locator('history-chart svg').waitFor();
};

describe('the page of a guarantee', () => {
  it('draws bound, estimate, line, nonconforming units and events on one axis', async () => {
    await show('leak-bh4');
    for (const what of ['path.bound.demonstrated', 'path.bound.undecided', 'path.estimate', '.line', '.strip .bar', '.strip .stroke', '.event']) {
      expect(await page.locator(`history-chart ${what}`).count(), what).toBeGreaterThan(0);
    }
    await page.getByText('What happened in this span').click();
    await page.getByText('Evidence restarted by Ines Maurer: die changed').waitFor();
  });

  it('asks for the span that was chosen', async () => {
    await show('leak-bh4');
    const asked = page.waitForRequest((request) => request.url().includes('/history') && span(request.url()) === 8 * 3_600_000);
    await page.getByLabel('8 h').check();
    await asked;
  });
  const span = (url: string): number => Number(new URL(url).searchParams.get('to')) - Number(new URL(url).searchParams.get('from'));

  it('tells the figures, the method, the look rule, the assumptions and the source', async () => {
    await show('leak-bh4');
    for (const words of ['Exact binomial bound.', 'all looks.', 'Units are independent of one another.', 'C. J. Clopper, E. S. Pearson', 'Mind:']) await page.getByText(words).first().waitFor();
    expect(await page.locator('.figures').innerText()).toMatch(/Upper bound\s+484\sppm/);
  });

  it.each([
    ['leak-bh4', 'Units of the window', ['The window by time']],
    ['final-bh4', 'The window by time', ['Units of the window']],
    ['chain-b', 'Station by station', ['The window by time']],
    ['pull-bh5', 'Values of the window', []],
    ['flaws-bh4', 'How this is computed', ['Units of the window', 'The window by time', 'Values of the window']],
  ])('shows of %s what suits it: %s', async (id, shown, absent) => {
    await show(id);
    await page.getByRole('heading', { name: shown }).waitFor();
    for (const heading of absent) expect(await page.getByRole('heading', { name: heading }).count(), heading).toBe(0);
  });

  it('writes figures of the axis whole, however long they are', async () => {
    await show('flaws-bh4');
    await page.getByText(/nonconformit(y|ies) in .* m in this step/).waitFor();
    const cut = await page.locator('history-chart').evaluate((chart) => {
      const edge = chart.getBoundingClientRect().left;
      return [...chart.shadowRoot!.querySelectorAll('text')].filter((text) => text.getBoundingClientRect().left < edge - 0.5).map((text) => text.textContent);
    });
    expect(cut).toEqual([]);
  });

  it("draws the run's evidence with what is enough, and the gauge's recent path", async () => {
    await show('leak-bh4');
    await page.locator('run-evidence path.broken').waitFor({ state: 'attached' });
    expect(await page.locator('run-evidence .enough').count()).toBe(2);
    await page.getByText(/Run 3, since .*begun by a restart: die changed \(Ines Maurer\)\. It decides the state\./).waitFor();
    await page.locator('run-evidence summary').click();
    await page.getByText('however often anybody looks. It has counted every record since the run began').waitFor();
    expect(await page.locator('.lately path').getAttribute('d')).toMatch(/^M0\.00 /);
    await page.getByText('Its alarm stands.').waitFor();
    await page.getByText('It returns after 9,040 units more if they all conform. Half way back after 5,210 of them.').waitFor();
    await page.getByText('the distance between false calls no longer holds').waitFor();
  });

  it('shows the picture that suits the quantity', async () => {
    await show('pull-bh5');
    await page.locator('guarantee-picture .limit').waitFor({ state: 'attached' });
    expect(await page.locator('guarantee-picture .model').count()).toBe(1);
    await page.close();
    await show('chain-b');
    await page.getByText('Leak test (limits the line)').waitFor();
  });

  it('reads out a step under the arrow keys', async () => {
    await show('leak-bh4');
    const chart = page.getByRole('slider');
    await chart.focus();
    await page.keyboard.press('Home');
    expect(await chart.getAttribute('aria-valuetext')).toContain('bound –');
    await page.keyboard.press('End');
    expect(await chart.getAttribute('aria-valuetext')).toContain('violated');
  });

  it('restarts the evidence only with a name and a reason', async () => {
    await show('pull-bh5');
    await page.getByText('Restart the evidence').first().click();
    await page.getByLabel('Your name').fill('Ines Maurer');
    await page.getByLabel('Reason').fill(' ');
    await page.getByRole('button', { name: 'Restart the evidence' }).click();
    await page.getByText('Give your name and the reason').waitFor();
    expect(fake.posts).toEqual([]);
    await page.getByLabel('Reason').fill('Die changed');
    await page.getByRole('button', { name: 'Restart the evidence' }).click();
    await page.getByText('Evidence restarted.').waitFor();
    expect(fake.posts).toEqual([{ path: '/api/guarantees/pull-bh5/restart', body: { by: 'Ines Maurer', reason: 'Die changed' } }]);
  });

  it('says so when no guarantee has that name', async () => {
    await open('/guarantees/nothing', 'desk');
    await page.getByText('No guarantee is called nothing').waitFor();
  });
});
