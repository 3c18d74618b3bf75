// Pictures of every page, size and theme into .screens/: node test/browser/screens.mjs [beginning of a name]
import { mkdirSync } from 'node:fs';
import { runnerImport } from 'vite';

const load = async (name) => (await runnerImport(new URL(name, import.meta.url).pathname)).module;
const { startFake } = await load('./fake-server.ts');
const { openBrowser } = await load('./open-browser.ts');
const { fullPlant, people, signedInAs } = await load('./fake-people.ts');

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
  { name: 'board-open', path: '/', fake: {}, sizes: ['desk', 'phone'], themes: ['light'], act: (page) => page.locator('person-menu summary').click() },
  { name: 'person', path: '/', fake: { access: signedInAs('ada') }, sizes: ['desk', 'phone'], themes: ['light', 'dark'], act: (page) => page.locator('person-menu summary').click() },
  { name: 'display', path: '/', fake: { access: signedInAs('hall') }, sizes: ['hd', 'wall'], themes: ['light', 'dark'] },
  { name: 'withdrawn', path: '/', fake: { access: signedInAs('hall') }, sizes: ['hd', 'phone'], themes: ['light'], act: async (page, fake) => { fake.access.displays.clear(); fake.endSockets(); await page.waitForTimeout(600); } },
  { name: 'pin', path: '/', fake: { access: signedInAs('bench') }, sizes: ['desk', 'phone'], themes: ['light', 'dark'], act: async (page) => {
    await page.getByRole('button', { name: /^Acknowledge/ }).first().click();
    await page.getByRole('button', { name: 'Ines Maurer' }).click();
    await page.keyboard.type('471');
  } },
  { name: 'pin-who', path: '/', fake: { access: signedInAs('bench') }, sizes: ['phone'], themes: ['light'], act: (page) => page.getByRole('button', { name: /^Acknowledge/ }).first().click() },
  { name: 'acting', path: '/alarms', fake: { access: signedInAs('bench') }, sizes: ['desk', 'phone'], themes: ['light'], act: async (page) => {
    await page.getByRole('button', { name: /^Acknowledge/ }).first().click();
    await page.getByRole('button', { name: 'Ines Maurer' }).click();
    await page.keyboard.type('4711\n');
  } },
  { name: 'alarms-viewer', path: '/alarms', fake: { access: signedInAs('mette') }, sizes: ['desk'], themes: ['light'] },
  { name: 'sign-in', path: '/', fake: { access: { access: 'accounts', accounts: people, passkeys: true, directory: 'Hose plant directory' } }, sizes: ['desk', 'phone'], themes: ['light', 'dark'] },
  { name: 'sign-in-wrong', path: '/', fake: { access: { access: 'accounts', accounts: people } }, sizes: ['phone'], themes: ['light', 'dark'], act: async (page) => {
    await page.getByLabel('Name', { exact: true }).fill('ines');
    await page.keyboard.press('Tab');
    await page.keyboard.type('wrong\n');
  } },
  { name: 'join', path: '/join#c', fake: { access: { access: 'accounts', invitations: [{ id: 'i', code: 'c', kind: 'first', grants: [{ role: 'administrator' }, { role: 'engineer' }], account: null, shownAs: null, expires: 0 }] } }, sizes: ['desk', 'phone'], themes: ['light', 'dark'], act: async (page) => {
    await page.getByLabel('New password', { exact: true }).fill('short one');
    await page.getByLabel('Your name').fill('Ada');
    await page.getByLabel('Name to sign in with').fill('ada');
    await page.keyboard.press('Enter');
  } },
  { name: 'account', path: '/account', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['light', 'dark'], full: true, act: async (page) => { await page.getByText('Make a token').click(); } },
  { name: 'people', path: '/people', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['light', 'dark'], full: true },
  { name: 'invite', path: '/people', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['light'], full: true, act: async (page) => {
    await page.getByLabel('Maintenance, Hose line A').check();
    await page.getByRole('button', { name: 'Make the link' }).click();
  } },
  { name: 'edit-person', path: '/people', fake: { access: fullPlant() }, sizes: ['wide', 'phone', 'narrow'], themes: ['light', 'dark'], act: async (page) => {
    await page.getByRole('button', { name: 'Change Ines Maurer' }).click();
    await page.getByRole('dialog').getByLabel('Supervisor, Hose line B').check();
    await page.getByRole('dialog').getByLabel('Viewer, The whole plant').uncheck();
  } },
  { name: 'why', path: '/people', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['dark'], act: async (page) => {
    await page.getByRole('button', { name: 'Change Ines Maurer' }).click();
    await page.getByRole('button', { name: 'Disable the account' }).click();
  } },
  { name: 'displays', path: '/displays', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['light', 'dark'], full: true },
  { name: 'displays-none', path: '/displays', fake: { access: fullPlant({ displays: [] }) }, sizes: ['wide'], themes: ['light'] },
  { name: 'sources', path: '/sources', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['light', 'dark'], full: true },
  { name: 'sources-renewed', path: '/sources', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['light'], act: async (page) => {
    await page.getByRole('button', { name: 'Renew the token of crimp-b' }).click();
    await page.getByLabel('Why').last().fill('Yearly');
    await page.getByRole('button', { name: 'Renew', exact: true }).click();
  } },
  { name: 'changes', path: '/changes', fake: { access: fullPlant() }, sizes: ['wide', 'phone'], themes: ['light', 'dark'] },
  { name: 'changes-end', path: '/changes', fake: { access: fullPlant({ changes: fullPlant().changes.slice(0, 12) }) }, sizes: ['wide', 'phone'], themes: ['light'], full: true },
  { name: 'changes-none', path: '/changes', fake: { access: fullPlant({ changes: [] }) }, sizes: ['wide'], themes: ['light'] },
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
