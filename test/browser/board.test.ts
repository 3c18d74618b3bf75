import { describe, expect, it } from 'vitest';
import { eight } from './fake-plant.ts';
import type { FakeOptions } from './fake-server.ts';
import type { Size } from './open-browser.ts';
import { fake, onFakePages, open, page, serve } from './fake-pages.ts';

onFakePages({ served: false });

async function show(options: FakeOptions = {}, size: Size = 'desk', path = '/'): Promise<void> {
  await serve(options);
  await open(path, size);
  await page.locator('line-board').waitFor();
}

const lanes = (): Promise<string[]> => page.locator('board-lane a').allInnerTexts();
const laneOf = (name: string) => page.locator('board-lane').filter({ hasText: name });
/** Places of the marks in one lane's drawing, px. */
const places = (name: string): Promise<{ line: number; dot: number; opposite: number | undefined; trail: number }> =>
  laneOf(name).evaluate((lane) => {
    const x = (selector: string, attribute: string): number | undefined => {
      const found = lane.shadowRoot?.querySelector(selector)?.getAttribute(attribute);
      return found === undefined || found === null ? undefined : Number(found);
    };
    return { line: x('.line', 'x1')!, dot: x('.dot', 'cx')!, opposite: x('.opposite', 'x1'), trail: lane.shadowRoot!.querySelectorAll('.trail line').length };
  });
const tipOf = (name: string): Promise<number> =>
  laneOf(name).evaluate((lane) => Number(/L([\d.]+) /.exec(lane.shadowRoot!.querySelector('.tip')!.getAttribute('d')!)![1]));

describe('the line board', () => {
  it('draws every evidence state by word, mark and place', async () => {
    await show();
    await page.locator('board-lane').nth(7).waitFor();
    for (const { card, view } of eight) {
      const lane = laneOf(card.name);
      expect(await lane.locator('.word').innerText()).toBe({ gathering: 'Gathering', demonstrated: 'Demonstrated', undecided: 'Undecided', violated: 'Violated', unknown: 'Unknown' }[view.state]);
      const { line, dot, opposite, trail } = await places(card.name);
      const tip = await tipOf(card.name);
      expect(tip > line).toBe((view.allowance.bound ?? 0) > 1);
      expect(dot).toBeLessThan(tip);
      expect(opposite !== undefined).toBe(view.state === 'violated');
      expect(trail).toBe(view.allowance.trail.length);
    }
    const marks = await page.locator('board-lane .mark').evaluateAll((all) => new Set(all.map((mark) => mark.innerHTML.replace(/<!--.*?-->/g, ''))).size);
    expect(marks).toBe(5);
  });

  it('shares one guarantee line through all lanes', async () => {
    await show();
    await page.locator('board-lane').nth(7).waitFor();
    const spans = await page.locator('board-lane .line').evaluateAll((all) => all.map((line) => { const box = line.getBoundingClientRect(); return [box.x, box.top, box.bottom] as const; }));
    const sorted = [...spans].sort((a, b) => a[1] - b[1]);
    expect(new Set(sorted.map(([x]) => x)).size).toBe(1);
    for (let index = 1; index < sorted.length; index += 1) expect(sorted[index]![1] - sorted[index - 1]![2]).toBeLessThanOrEqual(0.5);
  });

  it('sorts trouble to the top and says how many guarantees need somebody', async () => {
    await show();
    await page.locator('board-lane').nth(7).waitFor();
    expect(await lanes()).toEqual(['BH-4 leak test', 'BH-5 crimp pull-off force', 'Kit cap torque', 'BH-4 final inspection', 'BH-5 leak test', 'Kit fill volume', 'BH-4 surface flaws', 'BH-6 crimp to final']);
    expect(await page.locator('.says').innerText()).toBe('3 of 8 guarantees need you.');
    fake.tell([{ ...fake.view('fill'), state: 'undecided', bound: 249.1, allowance: { ...fake.view('fill').allowance, bound: 1.45 } }]);
    await expect.poll(lanes).toContain('Kit fill volume');
    await expect.poll(async () => (await lanes())[1]).toBe('Kit fill volume');
    expect(await page.locator('.says').innerText()).toBe('4 of 8 guarantees need you.');
  });

  it('does not move the lanes away under a pointer or the focus', async () => {
    await show();
    await page.locator('board-lane').nth(7).waitFor();
    await laneOf('BH-5 leak test').hover();
    fake.tell([{ ...fake.view('fill'), state: 'undecided', allowance: { ...fake.view('fill').allowance, bound: 1.45 } }]);
    await page.getByText('The lanes wait with their new order').waitFor();
    expect((await lanes())[5]).toBe('Kit fill volume');
    await page.mouse.move(5, 5);
    await expect.poll(async () => (await lanes())[1]).toBe('Kit fill volume');
  });

  it('moves them at last when nothing is done there, and leaves the focus in its lane', async () => {
    await serve();
    await open('about:blank', 'desk');
    await page.clock.install();
    await page.goto(fake.url);
    await page.clock.runFor(1000);
    await laneOf('Kit fill volume').locator('a').focus();
    fake.tell([{ ...fake.view('fill'), state: 'undecided', allowance: { ...fake.view('fill').allowance, bound: 1.45 } }]);
    await page.clock.runFor(5000);
    await page.getByText('The lanes wait with their new order').waitFor();
    await page.clock.runFor(27_000);
    await expect.poll(async () => (await lanes())[1]).toBe('Kit fill volume');
    expect(await laneOf('Kit fill volume').evaluate((lane) => lane.shadowRoot?.activeElement?.textContent)).toBe('Kit fill volume');
  });

  it('writes shares in the chosen unit and remembers it', async () => {
    await show();
    const figure = laneOf('BH-5 leak test').locator('.figure b');
    expect(await figure.innerText()).toMatch(/^148\s?ppm$/);
    await page.getByText('View', { exact: true }).click();
    await page.getByLabel('1 in N').check();
    await expect.poll(() => figure.innerText()).toBe('1 in 6,757');
    await page.getByLabel('%', { exact: true }).check();
    await expect.poll(() => figure.innerText()).toMatch(/^0\.0148\s?%$/);
    await page.reload();
    await expect.poll(() => figure.innerText()).toMatch(/^0\.0148\s?%$/);
    await page.evaluate(() => { localStorage.clear(); });
  });

  it('groups by line when asked to', async () => {
    await show();
    await page.getByText('View', { exact: true }).click();
    await page.getByLabel('By line').check();
    await expect.poll(() => page.locator('h2.group').count()).toBe(3);
    expect((await lanes()).slice(0, 3)).toEqual(['BH-4 leak test', 'BH-4 final inspection', 'BH-4 surface flaws']);
    await page.evaluate(() => { localStorage.clear(); });
  });

  it('says what to do when there is nothing to draw', async () => {
    await show({ guarantees: 0 });
    await page.getByText('This plant has no guarantees yet').waitFor();
    await page.close();
    await fake.stop();
    await show({ noRecords: true });
    await page.getByText('No records yet').waitFor();
    expect(await page.locator('board-lane .word').allInnerTexts()).toEqual(Array.from({ length: 8 }, () => 'Gathering'));
  });

  it('says that a demo clock runs faster, and ticks with it', async () => {
    await show({ clockRate: 60 });
    await page.getByText('60 times as fast as yours').waitFor();
    const minuteOf = async (): Promise<string> => (await page.locator('.clock').innerText()).slice(0, 5);
    expect(await minuteOf()).toMatch(/^09:1[23]$/);
    await expect.poll(minuteOf).not.toBe('09:12');
  });
});

describe('the board in its room', () => {
  /** Words that are cut off, or reach out of their lane. */
  const cut = (): Promise<string[]> =>
    page.locator('board-lane').evaluateAll((all) => all.flatMap((lane) => {
      const room = lane.getBoundingClientRect();
      return [...lane.shadowRoot!.querySelectorAll<HTMLElement>('a, b, .sub, button')].flatMap((words) => {
        const box = words.getBoundingClientRect();
        if (box.width === 0) return [];
        const out = words.scrollWidth > words.clientWidth + 1 && words.clientWidth > 0;
        return out || box.top < room.top - 1 || box.bottom > room.bottom + 1 || box.right > room.right + 1 ? [words.innerText] : [];
      });
    }));

  it.each([['wall', 8], ['wall', 50], ['desk', 8], ['desk', 50], ['phone', 8], ['phone', 50]] as const)('on a %s with %i guarantees nothing is cut and nothing scrolls sideways', async (size, guarantees) => {
    await show({ guarantees }, size);
    await page.locator('board-lane').nth(guarantees - 1).waitFor();
    await page.evaluate(() => document.fonts.ready);
    await expect.poll(cut).toEqual([]);
    expect(await page.evaluate(() => document.documentElement.scrollWidth - innerWidth)).toBeLessThanOrEqual(0);
  });

  it.each([8, 50])('a wall shows %i guarantees without scrolling, in large type where it matters', async (guarantees) => {
    await show({ guarantees }, 'wall');
    await page.locator('board-lane').nth(guarantees - 1).waitFor();
    await expect.poll(() => page.evaluate(() => document.documentElement.scrollHeight - innerHeight)).toBeLessThanOrEqual(0);
    const sizes = await page.locator('board-lane .word').evaluateAll((all) => all.map((word) => Number.parseFloat(getComputedStyle(word).fontSize)));
    expect(sizes[0]).toBeGreaterThan(guarantees === 8 ? 70 : 32);
  });

  it('a desk shows eight guarantees without scrolling the lanes out of sight', async () => {
    await show();
    await page.locator('board-lane').nth(7).waitFor();
    await expect.poll(() => page.locator('board-lane').last().evaluate((lane) => lane.getBoundingClientRect().bottom)).toBeLessThan(768);
  });

  it('draws three hundred lanes', async () => {
    await show({ guarantees: 300 });
    await page.locator('board-lane').nth(299).waitFor();
    expect(await page.locator('board-lane .tip').count()).toBe(300);
  });

  it('shapes are never stretched: the drawing is as wide as its cell', async () => {
    await show();
    await page.locator('board-lane').nth(7).waitFor();
    for (const width of [1366, 1000, 1700]) {
      await page.setViewportSize({ width, height: 800 });
      await expect.poll(() => page.locator('board-lane').first().evaluate((lane) => {
        const svg = lane.shadowRoot!.querySelector('.plot svg')!;
        const box = svg.getBoundingClientRect();
        return svg.hasAttribute('viewBox') || Math.abs(box.width - svg.parentElement!.clientWidth) > 1;
      })).toBe(false);
    }
  });
});
