// Pictures of every page, size and theme into .screens/: node test/browser/screens.mjs [name part]
import { mkdirSync } from 'node:fs';
import { runnerImport } from 'vite';

const load = async (name) => (await runnerImport(new URL(name, import.meta.url).pathname)).module;
const { startFake } = await load('./fake-server.ts');
const { openBrowser } = await load('./open-browser.ts');

const only = process.argv[2] ?? '';
const out = new URL('../../.screens/', import.meta.url).pathname;
mkdirSync(out, { recursive: true });

const scenes = [
  { name: 'board', path: '/', fake: { clockRate: 60 }, sizes: ['wall', 'desk', 'phone'], themes: ['light', 'dark'] },
  { name: 'board-50', path: '/', fake: { guarantees: 50 }, sizes: ['wall', 'desk', 'phone'], themes: ['light'] },
  { name: 'board-300', path: '/', fake: { guarantees: 300 }, sizes: ['desk'], themes: ['light'] },
  { name: 'board-none', path: '/', fake: { guarantees: 0 }, sizes: ['desk', 'phone'], themes: ['light'] },
  { name: 'board-no-records', path: '/', fake: { noRecords: true }, sizes: ['desk'], themes: ['light'] },
  { name: 'board-grouped', path: '/', fake: { guarantees: 20 }, sizes: ['desk', 'wall'], themes: ['light'], settings: { grouped: true } },
  { name: 'board-lost', path: '/', fake: {}, sizes: ['desk', 'phone'], themes: ['light'], act: async (page, fake) => { fake.cutLive(); await page.waitForTimeout(800); } },
  { name: 'board-view', path: '/', fake: {}, sizes: ['desk', 'phone'], themes: ['light'], act: (page) => page.getByText('View', { exact: true }).click() },
  { name: 'board-ack', path: '/', fake: {}, sizes: ['desk', 'phone'], themes: ['dark'], act: (page) => page.getByRole('button', { name: /Acknowledge/ }).first().click() },
  { name: 'leak', path: '/guarantees/leak-bh4', fake: {}, sizes: ['desk', 'phone'], themes: ['light', 'dark'], full: true },
  { name: 'pull', path: '/guarantees/pull-bh5', fake: {}, sizes: ['desk'], themes: ['light'], full: true },
  { name: 'chain', path: '/guarantees/chain-b', fake: {}, sizes: ['desk', 'phone'], themes: ['light'], full: true },
  { name: 'alarms', path: '/alarms', fake: {}, sizes: ['desk', 'phone'], themes: ['light', 'dark'], full: true, settings: { personName: 'Ines Maurer' } },
  { name: 'alarms-none', path: '/alarms', fake: { noRecords: true }, sizes: ['phone'], themes: ['light'] },
];

const browser = await openBrowser();
for (const scene of scenes.filter(({ name }) => name.startsWith(only))) {
  for (const size of scene.sizes) for (const theme of scene.themes) {
    const fake = await startFake(scene.fake);
    await browser.context.addInitScript((settings) => { localStorage.setItem('vouchline-settings.1', settings); }, JSON.stringify(scene.settings ?? {}));
    const page = await browser.open(fake.url + scene.path, size, theme);
    await page.waitForTimeout(900);
    await scene.act?.(page, fake);
    await page.waitForTimeout(200);
    await page.screenshot({ path: `${out}${scene.name}-${size}-${theme}.png`, fullPage: scene.full === true });
    await page.close();
    await fake.stop();
  }
}
if (browser.errors.length > 0) process.stdout.write(`${[...new Set(browser.errors)].join('\n')}\n`);
await browser.close();
