import { mkdirSync, mkdtempSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openRegisterFile } from '../../../server/store/register-file.ts';
import { openStore } from '../../../server/store/sqlite-store.ts';
import type { StoreError } from '../../../server/store/store-error.ts';
import type { Store, StoreOptions } from '../../../server/store/store.ts';
import { alarm, entries, entry, evidence, group, minute, morning } from './examples.ts';
import { allEntries, withFault } from './store-contract.ts';

let top: string;
let directory: string;
const opened: Store[] = [];

beforeEach(() => {
  top = mkdtempSync(join(tmpdir(), 'vouchline-store-'));
  directory = join(top, 'plant', 'data');
});

afterEach(async () => {
  await Promise.all(opened.splice(0).map((store) => store.close()));
  rmSync(top, { recursive: true });
});

async function open(options?: StoreOptions): Promise<Store> {
  const store = await openStore(directory, options);
  opened.push(store);
  return store;
}

const modeOf = (path: string): string => (statSync(path).mode & 0o777).toString(8);

/** Changes the database behind a closed store's back. */
function tamper(sql: string): void {
  const database = new Database(join(directory, 'vouchline.db'));
  database.exec(sql);
  database.close();
}

describe('data directory', () => {
  it('is made for its owner alone, with every file in it', async () => {
    const store = await open();
    await store.commit(group({ entries: [entry(1)] }));
    expect(modeOf(directory)).toBe('700');
    const files = readdirSync(directory);
    expect(files).toEqual(expect.arrayContaining(['lock.db', 'vouchline.db', 'vouchline.db-shm', 'vouchline.db-wal']));
    for (const file of files) expect([file, modeOf(join(directory, file))]).toEqual([file, '600']);
  });

  it('takes reading rights away from files that others may read', async () => {
    mkdirSync(directory, { recursive: true });
    writeFileSync(join(directory, 'vouchline.db'), '', { mode: 0o644 });
    await open();
    expect(modeOf(join(directory, 'vouchline.db'))).toBe('600');
  });

  it('is refused in words where it cannot be one', async () => {
    writeFileSync(join(top, 'plant'), 'a file');
    await expect(open()).rejects.toThrow(`The data directory ${directory} cannot be used`);
    await expect(open()).rejects.toEqual(withFault('input-output'));
  });

  it('keeps tokens only as hashes', async () => {
    const store = await open();
    const { token } = await store.sources.add({ name: 'leak-tester-a', stations: ['leak-a'], at: morning });
    await store.close();
    const rows = new Database(join(directory, 'vouchline.db')).prepare('SELECT * FROM sources').raw().all();
    expect(rows).toHaveLength(1);
    expect(JSON.stringify(rows)).not.toContain(token.slice(10));
  });

  it('is free again after a start that failed', async () => {
    mkdirSync(directory, { recursive: true });
    writeFileSync(join(directory, 'vouchline.db'), 'this is a text, not a database, and it is long enough to tell');
    await expect(open()).rejects.toEqual(withFault('damaged'));
    await expect(open()).rejects.toEqual(withFault('damaged'));
  });
});

describe('a full disk', () => {
  it('refuses the commit and all after it; what was durable is there after a restart', async () => {
    const refusals: StoreError[] = [];
    const store = await open({ mostPages: 60, groupEntries: 1, onRefused: (error) => refusals.push(error) });
    const large = (id: number) => group({ entries: [entry(id, { body: new Uint8Array(20_000) })], alarms: [alarm(id)] });
    const settled = await Promise.allSettled(Array.from({ length: 30 }, (_, place) => store.commit(large(place + 1))));
    const durable = settled.filter(({ status }) => status === 'fulfilled').length;
    expect(durable).toBeGreaterThan(2);
    expect(durable).toBeLessThan(15);
    expect(settled.slice(0, durable).every(({ status }) => status === 'fulfilled')).toBe(true);
    expect(refusals).toEqual([withFault('disk-full')]);
    expect(store.condition).toEqual({ kind: 'refused', error: refusals[0] });
    expect(store.lastId).toBe(durable);
    await expect(store.commit(group({ entries: [entry(99)] }))).rejects.toEqual(withFault('refused'));
    await expect(store.keepSnapshot({ journalId: 1, at: 0, body: new Uint8Array() })).rejects.toEqual(withFault('refused'));
    await store.close();
    const again = await open();
    expect(again.lastId).toBe(durable);
    expect(await again.openAlarms()).toHaveLength(durable);
  });

  it('writes nothing behind a gap: what is under way when a commit fails fails too, although it would fit', async () => {
    const store = await open({ mostPages: 60, groupEntries: 1 });
    const settled = await Promise.allSettled([
      store.commit(group({ entries: [entry(1)] })),
      store.commit(group({ entries: [entry(2, { body: new Uint8Array(1_000_000) })] })),
      store.commit(group({ entries: [entry(3)] })),
      store.commit(group({ entries: [entry(4)] })),
    ]);
    expect(settled.map((one) => (one.status === 'fulfilled' ? 'durable' : (one.reason as StoreError).fault))).toEqual(['durable', 'disk-full', 'refused', 'refused']);
    expect(await allEntries(store)).toEqual([entry(1)]);
  });

  it('holds no more than it may: the commit above the bound is refused', async () => {
    const store = await open({ mostWaitingBytes: 10_000 });
    const settled = await Promise.allSettled([1, 2, 3, 4].map((id) => store.commit(group({ entries: [entry(id, { body: new Uint8Array(4_000) })] }))));
    expect(settled.map((one) => (one.status === 'fulfilled' ? 'durable' : (one.reason as StoreError).fault))).toEqual(['durable', 'durable', 'overrun', 'refused']);
    expect(await allEntries(store)).toHaveLength(2);
  });
});

describe('snapshots', () => {
  it.each(["body = x'0909'", 'at = at + 1', 'journal_id = 8'])('one that was changed (%s) gives way to the one before', async (change) => {
    const store = await open();
    await store.commit(group({ entries: entries(1, 9) }));
    for (const journalId of [3, 7]) await store.keepSnapshot({ journalId, at: morning, body: new Uint8Array([journalId]) });
    await store.close();
    tamper(`UPDATE snapshots SET ${change} WHERE journal_id = 7`);
    const found = await (await open()).newestSnapshot();
    expect(found).toEqual({ snapshot: { journalId: 3, at: morning, body: new Uint8Array([3]) }, damaged: [change === 'journal_id = 8' ? 8 : 7] });
  });

  it('with none intact the journal is all there is', async () => {
    const store = await open();
    await store.commit(group({ entries: entries(1, 2) }));
    for (const journalId of [1, 2]) await store.keepSnapshot({ journalId, at: morning, body: new Uint8Array([journalId]) });
    await store.close();
    tamper('UPDATE snapshots SET hash = zeroblob(32)');
    expect(await (await open()).newestSnapshot()).toEqual({ snapshot: undefined, damaged: [2, 1] });
  });

  it('hand over their buffer, but never the rest of a larger one', async () => {
    const store = await open();
    const alone = new Uint8Array(100);
    await store.keepSnapshot({ journalId: 0, at: 0, body: alone });
    expect(alone.length).toBe(0);
    const large = new Uint8Array(1_000).fill(5);
    await store.keepSnapshot({ journalId: 0, at: 0, body: large.subarray(10, 20) });
    expect(large.length).toBe(1_000);
    expect((await store.newestSnapshot()).snapshot!.body).toEqual(new Uint8Array(10).fill(5));
  });
});

describe('reading', () => {
  it('goes through the journal in batches bounded by bytes', async () => {
    const store = await open();
    const kept = Array.from({ length: 50 }, (_, place) => entry(place + 1, { body: new Uint8Array(1_000).fill(place) }));
    await store.commit(group({ entries: kept }));
    const sizes: number[] = [];
    for await (const batch of store.readJournal(1, 11_000)) sizes.push(batch.length);
    expect(sizes).toEqual([10, 10, 10, 10, 10]);
    expect(await allEntries(store, 1, 1)).toEqual(kept);
  });

  it('can be left in the middle of the journal', async () => {
    const store = await open();
    await store.commit(group({ entries: entries(1, 50) }));
    for await (const batch of store.readJournal(1, 1)) {
      expect(batch[0]!.id).toBe(1);
      break;
    }
    await store.close();
  });

  it('sees what was committed while it reads, and no half of a group', async () => {
    const store = await open();
    const commits = Array.from({ length: 40 }, (_, place) => store.commit(group({ entries: [entry(place + 1)], alarms: [alarm(place + 1)], happenings: [{ journalId: place + 1, happening: evidence('leak-a', morning) }] })));
    for (let times = 0; times < 20; times += 1) {
      const alarms = (await store.openAlarms()).length;
      const told = (await store.happenings({ from: morning, to: morning + 1, limit: 100 })).length;
      expect(told).toBeGreaterThanOrEqual(alarms);
    }
    await Promise.all(commits);
    expect(await store.openAlarms()).toHaveLength(40);
  });
});

describe('backup', () => {
  it('is a store of its own with everything in it', async () => {
    const store = await open();
    await store.commit(group({ entries: entries(1, 100), alarms: [alarm(1)], minutes: [minute('leak-a', 0)] }));
    const { token } = await store.sources.add({ name: 'filler', stations: ['fill'], at: morning });
    const other = join(top, 'copy');
    mkdirSync(other);
    await store.backup(join(other, 'vouchline.db'));
    await store.close();
    directory = other;
    const copy = await open();
    expect(await allEntries(copy)).toEqual(entries(1, 100));
    expect(await copy.openAlarms()).toEqual([alarm(1)]);
    expect(await copy.sources.ofToken(token, morning)).toMatchObject({ name: 'filler' });
    expect(modeOf(join(other, 'vouchline.db'))).toBe('600');
  });

  it('never writes over a file', async () => {
    const store = await open();
    const file = join(top, 'precious.db');
    writeFileSync(file, 'precious');
    await expect(store.backup(file)).rejects.toThrow(`${file} exists`);
    expect(statSync(file).size).toBe(8);
  });
});

describe('source register on its own', () => {
  it('makes a directory before the first server, and is heard by a running one', async () => {
    const before = openRegisterFile(directory);
    const first = await before.add({ name: 'filler', stations: ['fill'], at: morning });
    before.close();
    const store = await open();
    expect(await store.sources.ofToken(first.token, morning)).toEqual(first.source);
    const beside = openRegisterFile(directory);
    const second = await beside.rotate({ name: 'filler' });
    expect(await store.sources.ofToken(first.token, morning)).toBeUndefined();
    expect(await store.sources.ofToken(second.token, morning)).toEqual(first.source);
    await expect(beside.add({ name: 'filler', stations: ['fill'], at: morning })).rejects.toEqual(withFault('name-taken'));
    beside.close();
  });
});
