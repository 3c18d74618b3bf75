import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { RecordedChange } from '../../../core/access/change.ts';
import { limitChanges } from '../../../core/access/limit-changes.ts';
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Served } from '../../../server/serve.ts';
import { csvLine } from '../../../server/http/change-csv.ts';
import { openRegisterFile } from '../../../server/store/register-file.ts';
import { leakPlant, verdictPart } from '../plants.ts';
import { dataDirectory, servedOn, sourceTalk } from '../serving.ts';
import { password } from './people.ts';
import { SignedIn } from './signed-in.ts';

let data: { path: string; remove: () => void };
let served: Served;
let first: SignedIn;
beforeEach(async () => {
  data = dataDirectory(leakPlant);
  served = await servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
  first = await SignedIn.byLink(served, served.firstLink!, 'olaf');
});
afterEach(async () => {
  await served.stop('the test is over');
  data.remove();
});

const monday = Date.UTC(2026, 5, 1, 6);

describe('the record of changes over HTTP', () => {
  it('is read newest first, filtered, page by page, and has a head', async () => {
    for (const reason of ['new seal', 'new die', 'new sensor']) await first.ask('POST', '/api/guarantees/leak-A/restart', { reason });
    const all = await first.json<RecordedChange[]>('GET', '/api/changes');
    expect(all.map(({ kind, why }) => [kind, why]).slice(0, 3)).toEqual([['restart', 'new sensor'], ['restart', 'new die'], ['restart', 'new seal']]);
    expect(await first.json('GET', '/api/changes/head')).toEqual({ id: all[0]!.id, hash: all[0]!.hash });
    expect((await first.json<RecordedChange[]>('GET', '/api/changes?kind=restart&holds=DIE')).map(({ why }) => why)).toEqual(['new die']);
    const second = await first.json<RecordedChange[]>('GET', `/api/changes?limit=2&before=${all[1]!.id}`);
    expect(second.map(({ id }) => id)).toEqual([all[2]!.id, all[3]!.id]);
    expect((await first.ask('GET', '/api/changes?kind=anything')).status).toBe(400);
  });

  it('is exported whole, as lines of JSON and as CSV that no spreadsheet runs', async () => {
    await first.ask('POST', '/api/guarantees/leak-A/restart', { reason: '=HYPERLINK("http://evil.example")' });
    const json = await first.ask('GET', '/api/changes/export');
    expect(json.headers.get('content-disposition')).toBe('attachment; filename="changes.ndjson"');
    const lines = (await json.text()).trimEnd().split('\n').map((line) => JSON.parse(line) as RecordedChange);
    expect(lines).toEqual(await first.json('GET', '/api/changes?limit=1000'));
    const csv = await (await first.ask('GET', '/api/changes/export?form=csv')).text();
    expect(csv.startsWith('id,at,kind,who,what,before,after,why,entry,hash\r\n')).toBe(true);
    expect(csv).toContain(`"'=HYPERLINK(""http://evil.example"")"`);
    expect(csvLine(['+1', '-1', '@a', 'plain', 'a,b', 'a"b'])).toBe(`'+1,'-1,'@a,plain,"a,b","a""b"\r\n`);
  });
});

describe('the plant file over HTTP', () => {
  const asked = async (): Promise<{ text: string; version: string }> => first.json('GET', '/api/plant');

  it('is put in force, kept in its file, and on record with what changed', async () => {
    const { text, version } = await asked();
    const changed = text.replace('at-most: 1 %', 'at-most: 2 %');
    const put = await first.json<{ version: string }>('PUT', '/api/plant', { text: changed, was: version, why: 'agreed with the customer' });
    expect((await asked()).version).toBe(put.version);
    expect(readFileSync(join(data.path, 'plant.yaml'), 'utf8')).toBe(changed);
    const [change] = await first.json<RecordedChange[]>('GET', '/api/changes?kind=plant');
    expect(change).toMatchObject({
      who: 'olaf Holm', why: 'agreed with the customer',
      before: { version, guarantees: { 'leak-A': { promise: { atMost: 0.01 } } } },
      after: { version: put.version, guarantees: { 'leak-A': { promise: { atMost: 0.02 } } } },
    });
    expect(Object.keys((change!.after as { guarantees: { 'leak-A': object } }).guarantees['leak-A'])).toEqual(['promise']);
  });

  it('is refused where somebody else was faster, or where it is not sound, and then nothing changes', async () => {
    const { text, version } = await asked();
    expect((await first.ask('PUT', '/api/plant', { text, was: 'older', why: 'x' })).status).toBe(409);
    const bad = await first.ask('PUT', '/api/plant', { text: text.replace('1 %', 'few'), was: version, why: 'x' });
    expect([bad.status, ((await bad.json()) as { message: string }).message]).toEqual([400, expect.stringContaining('guarantees[0].at-most')]);
    expect(await first.json('POST', '/api/plant/check', { text: text.replace('1 %', 'few') })).toMatchObject({ faults: [{ field: 'guarantees[0].at-most' }] });
    expect([await asked(), readFileSync(join(data.path, 'plant.yaml'), 'utf8')]).toEqual([{ text, version }, text]);
  });

  it('takes one of two that were made from the same, and none over a file changed by hand', async () => {
    const { text, version } = await asked();
    const put = (limit: string): Promise<Response> => first.ask('PUT', '/api/plant', { text: text.replace('1 %', limit), was: version, why: 'at the same time' });
    expect((await Promise.all([put('2 %'), put('3 %'), put('4 %')])).map(({ status }) => status).sort()).toEqual([200, 409, 409]);
    const now = await asked();
    expect(readFileSync(join(data.path, 'plant.yaml'), 'utf8')).toBe(now.text);
    writeFileSync(join(data.path, 'plant.yaml'), now.text.replace('confidence: 95 %', 'confidence: 90 %'));
    const over = await first.ask('PUT', '/api/plant', { text: text.replace('1 %', '5 %'), was: now.version, why: 'x' });
    expect([over.status, ((await over.json()) as { message: string }).message]).toEqual([409, expect.stringContaining('changed by hand')]);
    expect(await served.reload()).toEqual([]);
  });

  it('says of limits what is gone and what is new', () => {
    const guarantee = { id: 'a', tail: 0.05 } as never;
    expect(limitChanges([guarantee], [])).toEqual({ before: { a: { id: 'a', tail: 0.05 } }, after: { a: null } });
    expect(limitChanges([guarantee], [{ id: 'a', tail: 0.01 } as never])).toEqual({ before: { a: { tail: 0.05 } }, after: { a: { tail: 0.01 } } });
    expect(limitChanges([guarantee], [guarantee])).toEqual({ before: {}, after: {} });
  });
});

describe('one’s own account', () => {
  it('shows everybody what happened to theirs lately, and nothing of others', async () => {
    const mette = await first.invite('mette', 'viewer', null);
    await first.invite('mette-marie', 'viewer', null);
    await mette.json('POST', '/api/own/tokens', { name: 'board', actions: ['see'], days: 1 });
    await mette.ask('PUT', '/api/own/pin', { password, pin: '2846' });
    await fetch(`${served.address}/api/sign-in`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ name: 'mette', password: 'not hers at all' }) });
    const lately = await mette.json<RecordedChange[]>('GET', '/api/own/changes');
    expect(lately.map(({ kind, what }) => `${kind} ${what.replace(/token .*:/, 'token:')}`)).toEqual(['sign-in-failed account mette', 'pin account mette', 'token token: board', 'sign-in account mette', 'account account mette']);
  });
});

describe('sources over HTTP', () => {
  const make = async (more: object = {}): Promise<string> => (await first.json<{ token: string }>('POST', '/api/sources', { name: 'leak-tester', stations: ['A.leak-test'], why: 'new station', ...more })).token;
  const isConnected = async (): Promise<boolean> => (await first.json<{ connected: boolean }[]>('GET', '/api/sources'))[0]!.connected;

  it('are made, heard, renewed with overlap, and withdrawn at once, each on record', async () => {
    const old = await make();
    const talk = sourceTalk(served.address, old);
    await talk.until((message) => message.type === 'welcome');
    expect(await isConnected()).toBe(true);
    const { token } = await first.json<{ token: string }>('POST', '/api/sources/leak-tester/renew', { overlapHours: 1, why: 'yearly' });
    talk.send({ type: 'records', first: 1, parts: [verdictPart(5, [], monday)] });
    expect(await talk.until((message) => message.type === 'ack')).toMatchObject({ next: 6 });
    expect((await first.ask('POST', '/api/sources/leak-tester/withdraw', { why: 'broken' })).status).toBe(200);
    expect(await talk.until((message) => message.type === 'refused')).toMatchObject({ code: 'token-unknown' });
    for (const replayed of [old, token]) {
      const upload = await fetch(`${served.address}/source/records`, { method: 'POST', headers: { authorization: `Bearer ${replayed}`, 'content-type': 'text/csv' }, body: '' });
      expect([upload.status, await upload.json()]).toMatchObject([401, { code: 'token-unknown' }]);
    }
    const changes = await first.json<RecordedChange[]>('GET', '/api/changes?holds=leak-tester');
    expect(changes.map(({ kind, who, why }) => [kind, who, why])).toEqual([['token-withdrawn', 'olaf Holm', 'broken'], ['token-renewed', 'olaf Holm', 'yearly'], ['source-made', 'olaf Holm', 'new station']]);
  });

  it('that the command line withdraws or renews are let go within a second or two', async () => {
    const talk = sourceTalk(served.address, await make());
    await talk.until((message) => message.type === 'welcome');
    const register = openRegisterFile(data.path);
    await register.rotate({ name: 'leak-tester' });
    register.close();
    expect(await talk.until((message) => message.type === 'refused')).toMatchObject({ code: 'token-unknown' });
    await talk.closed;
  });

  it('send only what their token covers', async () => {
    const talk = sourceTalk(served.address, await make({ stations: ['*'], products: ['BH-5'] }));
    await talk.until((message) => message.type === 'welcome');
    talk.send({ type: 'records', first: 1, parts: [verdictPart(5, [], monday)] });
    expect(await talk.until((message) => message.type === 'refused')).toMatchObject({ code: 'product-not-allowed', field: 'parts[0].product', expected: 'BH-5' });
    talk.send({ type: 'records', first: 1, parts: [{ kind: 'changeover', line: 'A', product: 'BH-4', time: monday }] });
    expect(await talk.until((message) => message.type === 'refused')).toMatchObject({ code: 'product-not-allowed' });
    talk.socket.terminate();
  });

  it('say what does not fit', async () => {
    await make();
    expect((await first.ask('POST', '/api/sources', { name: 'leak-tester', stations: ['A.leak-test'], why: 'again' })).status).toBe(409);
    const bad = await first.ask('POST', '/api/sources', { name: 'two words', stations: ['A.leak-test'], why: 'x' });
    expect([bad.status, await bad.json()]).toMatchObject([400, { field: 'name' }]);
    expect((await first.ask('POST', '/api/sources/nobody/withdraw', { why: 'x' })).status).toBe(404);
  });
});

describe('SQL in a text', () => {
  const hostile = ["'; DROP TABLE changes; --", "' OR '1'='1", '%_[]\\"', "'; UPDATE access SET body = '{}'; --"];

  it.each(hostile)('is a text wherever one can be given: %s', async (text) => {
    expect((await first.ask('POST', '/api/guarantees/leak-A/restart', { reason: text })).status).toBe(200);
    expect((await first.ask('POST', '/api/displays', { name: text })).status).toBe(200);
    expect((await first.ask('POST', '/api/own/tokens', { name: text, actions: ['see'], days: 1 })).status).toBe(200);
    const { link } = await first.json<{ link: string }>('POST', '/api/invitations', { grants: [{ role: 'viewer', line: text.slice(0, 64) }], shownAs: text });
    expect(await first.json('POST', '/api/invitations/look', { code: link.split('#')[1] })).toMatchObject({ shownAs: text });
    expect((await first.ask('POST', '/api/invitations/look', { code: text })).status).toBe(404);
    expect((await first.ask('POST', '/api/sign-in', { name: text, password: text })).status).toBe(401);
    expect((await first.ask('POST', '/api/display/sign-in', { token: text })).status).toBe(401);
    expect((await first.ask('POST', '/api/sources', { name: text, stations: [text], why: text })).status).toBe(400);
    expect((await first.ask('POST', `/api/sources/${encodeURIComponent(text)}/withdraw`, { why: text })).status).toBe(404);
    expect((await first.ask('PUT', `/api/accounts/${encodeURIComponent(text)}`, { disabled: true, why: text })).status).toBe(404);
    expect((await first.ask('GET', `/api/guarantees/${encodeURIComponent(text)}/strip`)).status).toBe(404);
    expect(await first.json('GET', `/api/events?guarantee=${encodeURIComponent(text)}`)).toEqual([]);
    const found = await first.json<RecordedChange[]>('GET', `/api/changes?holds=${encodeURIComponent(text)}`);
    expect(found.map(({ kind }) => kind).sort()).toEqual(['display', 'invitation', 'restart', 'sign-in-failed', 'token']);
    expect((await first.json<object[]>('GET', '/api/accounts')).length).toBe(1);
  });
});

it('a plant file changed by hand goes on record as loaded by the server', async () => {
  writeFileSync(join(data.path, 'plant.yaml'), leakPlant.replace('confidence: 95 %', 'confidence: 99 %'));
  expect(await served.reload()).toEqual([]);
  const [change] = await first.json<RecordedChange[]>('GET', '/api/changes?kind=plant');
  expect(change).toMatchObject({ who: 'server', before: { guarantees: { 'leak-A': { tail: 0.05 } } }, after: { guarantees: { 'leak-A': { tail: 0.01 } } } });
});
