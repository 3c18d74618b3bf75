import type Database from 'better-sqlite3';
import type { Happening } from '../../core/monitor/happening.ts';
import { checkHappeningQuery } from './query-check.ts';
import type { HappeningFound, HappeningQuery } from './store.ts';

/** Newest first. */
export function readHappenings(database: Database.Database, query: HappeningQuery): HappeningFound[] {
  checkHappeningQuery(query);
  const { from, to, guarantee, kind, before = Number.MAX_SAFE_INTEGER, limit } = query;
  const narrowed = `${guarantee === undefined ? '' : 'AND guarantee = @guarantee'} ${kind === undefined ? '' : 'AND kind = @kind'}`;
  const rows = database
    .prepare(
      `SELECT id, journal_id AS journalId, body FROM happenings
       WHERE at >= @from AND at < @to AND id < @before ${narrowed} ORDER BY id DESC LIMIT @limit`,
    )
    .all({ from, to, guarantee, kind, before, limit }) as { id: number; journalId: number; body: string }[];
  return rows.map(({ id, journalId, body }) => ({ id, journalId, happening: JSON.parse(body) as Happening }));
}
