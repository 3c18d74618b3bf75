import type Database from 'better-sqlite3';
import type { AccessItem, AccessWrite } from '../access/access-file.ts';
import { appendChange } from './change-table.ts';

export function readAccess(database: Database.Database): AccessItem[] {
  return database.prepare('SELECT kind, id, body FROM access ORDER BY kind, id').all() as AccessItem[];
}

/** All of it or nothing; the record of changes is written in the same transaction. `at`: wall time, ms since 1970-01-01 UTC. */
export function writeAccess(database: Database.Database, { put = [], drop = [], changes = [] }: AccessWrite, at: number): void {
  const putting = database.prepare('INSERT INTO access VALUES (?, ?, ?) ON CONFLICT (kind, id) DO UPDATE SET body = excluded.body');
  const dropping = database.prepare('DELETE FROM access WHERE kind = ? AND id = ?');
  database.transaction(() => {
    for (const { kind, id } of drop) dropping.run(kind, id);
    for (const { kind, id, body } of put) putting.run(kind, id, body);
    for (const change of changes) appendChange(database, change, at);
  }).immediate();
}
