import type Database from 'better-sqlite3';
import type { Change, RecordedChange } from '../../core/access/change.ts';
import type { ChangeQuery } from '../access/access-file.ts';
import { checkPage } from './query-check.ts';

interface Row {
  readonly body: string;
  readonly hash: string;
}

/** The record of changes, newest first. */
export function readChanges(database: Database.Database, query: ChangeQuery): RecordedChange[] {
  checkPage(query);
  const { from, to, kind, holds = '', before = Number.MAX_SAFE_INTEGER, limit } = query;
  const rows = database
    .prepare(
      `SELECT body, lower(hex(hash)) AS hash FROM changes
       WHERE id < @before AND body ->> 'at' >= @from AND body ->> 'at' < @to AND (@kind IS NULL OR body ->> 'kind' = @kind)
         AND (@holds = '' OR instr(lower(body ->> 'who' || char(10) || (body ->> 'what') || char(10) || (body ->> 'why')), lower(@holds)) > 0)
       ORDER BY id DESC LIMIT @limit`,
    )
    .all({ from, to, kind: kind ?? null, holds, before, limit }) as Row[];
  return rows.map(({ body, hash }) => ({ ...(JSON.parse(body) as Change & { readonly id: number; readonly at: number }), hash }));
}
