import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkChain } from '../../../server/store/change-table.ts';
import { dataDirectory, servedOn } from '../serving.ts';
import { vouchline } from './run-vouchline.ts';

let data: string;
let example: string;
beforeEach(async () => {
  data = mkdtempSync(join(tmpdir(), 'vouchline-check-'));
  example = (await vouchline(['plant', 'example'])).out;
  await vouchline(['source', 'add', 'filler', '--station', 'A.leak-test', '--data', data]);
  await vouchline(['source', 'rotate', 'filler', '--data', data]);
});
afterEach(() => rmSync(data, { recursive: true, force: true }));

const check = (...more: readonly string[]): ReturnType<typeof vouchline> => vouchline(['check', '--data', data, ...more]);

function inFile(sql: string): void {
  const database = new Database(join(data, 'vouchline.db'));
  database.exec(`DROP TRIGGER changes_stay; DROP TRIGGER changes_stay_as_they_are; ${sql}`);
  database.close();
}

describe('vouchline check', () => {
  it('says that the record is whole, and finds its head again', async () => {
    const said = await check();
    expect(said).toMatchObject({ code: 0, err: '', out: expect.stringMatching(/^The record of changes is whole: 2 records, head 2:[0-9a-f]{64}\n$/) as string });
    const head = /2:[0-9a-f]{64}/.exec(said.out)?.[0] ?? '';
    expect(await check('--head', head)).toMatchObject({ code: 0 });
    expect(await check('--head', `2:${'0'.repeat(64)}`)).toMatchObject({ code: 1, out: expect.stringContaining('not the one noted') as string });
  });

  it('names the first record edited in the file and ends with 1', async () => {
    inFile("UPDATE changes SET body = replace(body, 'command line', 'somebody') WHERE id = 2");
    expect(await check()).toMatchObject({ code: 1, out: 'The record of changes is broken at record 2: it, or its place, is not what was written.\n' });
    expect(JSON.parse((await check('--json')).out)).toEqual({ kind: 'broken', at: 2, why: 'altered' });
  });

  it('names the first record deleted from the file, the last one too', async () => {
    inFile('DELETE FROM changes WHERE id = 2');
    expect(await check()).toMatchObject({ code: 1, out: 'The record of changes is broken at record 2: it and all that followed are missing.\n' });
  });

  it('verifies an export of the whole record, wherever it lies', async () => {
    const directory = dataDirectory(example);
    try {
      const served = await servedOn(directory.path);
      const [guarantee] = (await (await fetch(`${served.address}/api/guarantees`)).json()) as { card: { id: string } }[];
      for (const reason of ['new die', 'new “knife”']) {
        await fetch(`${served.address}/api/guarantees/${guarantee!.card.id}/restart`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ by: 'Ines', reason }) });
      }
      const text = await (await fetch(`${served.address}/api/changes/export`)).text();
      const { id, hash } = (await (await fetch(`${served.address}/api/changes/head`)).json()) as { id: number; hash: string };
      await served.stop('the test is over');
      const path = join(data, 'changes.ndjson');
      const checked = (lines: readonly string[], ...more: readonly string[]): ReturnType<typeof vouchline> => {
        writeFileSync(path, lines.join('\n'));
        return vouchline(['check', '--export', path, ...more]);
      };
      const lines = text.trimEnd().split('\n');
      expect(await checked(lines, '--head', `${id}:${hash}`)).toMatchObject({ code: 0, out: `The record of changes is whole: 3 records, head 3:${hash}\n` });
      expect(await checked(lines.map((line) => line.replace('new die', 'old die')))).toMatchObject({ code: 1, out: expect.stringContaining('broken at record 2') as string });
      expect(await checked(lines.filter((_, at) => at !== 1))).toMatchObject({ code: 1, out: 'The record of changes is broken at record 2: it is missing.\n' });
      expect(await checked(lines.slice(1), '--head', `${id}:${hash}`)).toMatchObject({ code: 1, out: expect.stringContaining('broken at record 3: it and all that followed') as string });
      expect(await checked(['{}', ...lines])).toMatchObject({ code: 2, err: expect.stringContaining('--export: line 1 is "{}"') as string });
      expect(await checked(['id,at', ...lines])).toMatchObject({ code: 2, err: expect.stringContaining('--export: line 1') as string });
    } finally {
      directory.remove();
    }
  });

  it('ends with 2 for a head or a directory that cannot be used', async () => {
    expect(await check('--head', '2:abc')).toMatchObject({ code: 2, err: expect.stringContaining('--head: got 2:abc') as string });
    expect(await vouchline(['check', '--data', join(data, 'none')])).toMatchObject({ code: 2, err: expect.stringContaining('there is no') as string });
  });
});

describe('a server', () => {
  it('records plant files and restarts that took effect, with who and why, and no act that changed nothing', async () => {
    const directory = dataDirectory(example);
    const served = await servedOn(directory.path);
    const post = (path: string, body: object): Promise<Response> =>
      fetch(`${served.address}${path}`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) });
    const [first] = (await (await fetch(`${served.address}/api/guarantees`)).json()) as { card: { id: string } }[];
    const id = first?.card.id ?? '';
    expect((await post(`/api/guarantees/${id}/restart`, { by: 'Ines', reason: 'new die' })).status).toBe(200);
    expect((await post('/api/alarms/99/acknowledge', { by: 'Ines' })).status).toBe(404);
    await served.stop('the test is over');
    const database = new Database(join(directory.path, 'vouchline.db'), { readonly: true });
    const rows = (database.prepare('SELECT body FROM changes ORDER BY id').pluck().all() as string[]).map((body) => JSON.parse(body) as object);
    expect(rows).toMatchObject([
      { kind: 'plant', who: 'server', after: { version: expect.stringMatching(/^[0-9a-f]{16}$/) as string } },
      { kind: 'restart', who: 'Ines', what: `guarantee ${id}`, why: 'new die' },
    ]);
    expect(checkChain(database)).toMatchObject({ kind: 'whole', head: { id: 2 } });
    database.close();
    directory.remove();
  });
});
