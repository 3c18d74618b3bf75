import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { migrate, schemaVersion, schemaVersionOf } from '../../../server/store/migrate.ts';
import { openRegisterFile } from '../../../server/store/register-file.ts';
import { openStore } from '../../../server/store/sqlite-store.ts';
import { alarm, ended, entry, evidence, minute, morning } from './examples.ts';
import { versionOne } from './version-one.ts';
import { allEntries, withFault } from './store-contract.ts';

let directory: string;
beforeEach(() => {
  directory = mkdtempSync(join(tmpdir(), 'vouchline-schema-'));
});
afterEach(() => {
  rmSync(directory, { recursive: true });
});

const database = (): Database.Database => new Database(join(directory, 'vouchline.db'));

/** Every table and index as SQLite keeps it, white space aside: a column added later reads the same wherever its line breaks. */
const schemaOf = (of: Database.Database): unknown[] =>
  (of.prepare('SELECT type, name, sql FROM sqlite_schema ORDER BY name').raw().all() as string[][]).map((row) => row.map((cell) => cell?.replace(/\s+/g, ' ')));

describe('schema', () => {
  it('of version 1 opens with all it holds', async () => {
    versionOne(database());
    const store = await openStore(directory);
    expect(store.lastId).toBe(3);
    expect(await allEntries(store)).toEqual([1, 2, 3].map((id) => entry(id, id === 2 ? { kind: 'plant' } : {})));
    expect(await store.entriesOf('plant', { limit: 9 })).toEqual([entry(2, { kind: 'plant' })]);
    expect(await store.openAlarms()).toEqual([alarm(2)]);
    expect(await store.endedAlarms({ limit: 9 })).toEqual([alarm(1, ended)]);
    expect(await store.happenings({ from: morning, to: morning + 1, guarantee: 'leak-a', limit: 9 })).toMatchObject([{ journalId: 3, happening: evidence('leak-a', morning) }]);
    expect(await store.history({ guarantee: 'leak-a', from: morning, to: morning + 1, points: 1 })).toMatchObject({ inspected: [minute('leak-a', 0).inspected] });
    expect(await store.sources.list()).toMatchObject([{ name: 'filler', stations: ['fill'] }]);
    await store.close();
  });

  it('reached step by step is the same as one made at once', () => {
    const old = database();
    versionOne(old);
    migrate(old);
    const fresh = new Database(':memory:');
    migrate(fresh);
    expect(schemaVersionOf(old)).toBe(schemaVersion);
    expect(schemaOf(old)).toEqual(schemaOf(fresh));
    migrate(old);
    expect(schemaVersionOf(old)).toBe(schemaVersion);
    old.close();
  });

  it('version 1 as built today is version 1 as it was', () => {
    const old = new Database(':memory:');
    versionOne(old);
    const today = new Database(':memory:');
    migrate(today, 1);
    expect(schemaOf(today)).toEqual(schemaOf(old));
  });

  it('a step that fails leaves the version before it whole', () => {
    const old = database();
    versionOne(old);
    old.exec('CREATE TABLE journal_without_frames (here_already)');
    const before = schemaOf(old);
    expect(() => migrate(old)).toThrow('already');
    expect(schemaVersionOf(old)).toBe(1);
    expect(schemaOf(old)).toEqual(before);
    old.close();
  });

  it('of a newer program is refused in words and left alone', async () => {
    const newer = database();
    newer.pragma(`user_version = ${schemaVersion + 1}`);
    newer.close();
    await expect(openStore(directory)).rejects.toEqual(withFault('newer-schema'));
    await expect(openStore(directory)).rejects.toThrow(`newer version of Vouchline (schema ${schemaVersion + 1}; this program knows up to ${schemaVersion})`);
    expect(() => openRegisterFile(directory)).toThrow('newer version of Vouchline');
    const left = database();
    expect(schemaVersionOf(left)).toBe(schemaVersion + 1);
    expect(schemaOf(left)).toEqual([]);
    left.close();
  });

  it('finds what it looks for without reading all', () => {
    const fresh = new Database(':memory:');
    migrate(fresh);
    const planOf = (sql: string): string => fresh.prepare(`EXPLAIN QUERY PLAN ${sql}`).all().map((row) => (row as { detail: string }).detail).join('; ');
    expect(planOf('SELECT * FROM journal WHERE kind > 1 AND kind = 4 AND id < 9 ORDER BY id DESC')).toContain('USING INDEX journal_without_frames (kind=? AND id<?)');
    expect(planOf('SELECT body FROM alarms WHERE ended = 0 ORDER BY id')).toContain('USING INDEX alarms_by_end (ended=?)');
    expect(planOf("SELECT body FROM happenings WHERE at >= 1 AND at < 2 AND id < 9 AND guarantee = 'a' ORDER BY id DESC")).toContain('happenings_of_guarantee (guarantee=? AND at>? AND at<?)');
  });
});
