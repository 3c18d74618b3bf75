import type Database from 'better-sqlite3';
import type { Entry, EntryKind } from './entry.ts';
import { kindCode, kindOfCode, packEntries, type PackedEntries } from './packed-entries.ts';
import { checkPage } from './query-check.ts';
import type { Page } from './store.ts';

type EntryRow = [id: number, at: number, kind: number, source: number | null, first: number | null, records: number, body: Buffer];

/** How a connection reads the journal on from an id: about `batchBytes` of bodies (at least one entry), packed. */
export function journalReader(database: Database.Database): (fromId: number, batchBytes: number) => PackedEntries {
  const onward = database.prepare('SELECT * FROM journal WHERE id >= ? ORDER BY id').raw();
  return (fromId, batchBytes) => {
    const entries: Entry[] = [];
    let bytes = 0;
    for (const row of onward.iterate(fromId) as Iterable<EntryRow>) {
      entries.push(entryOf(row));
      bytes += row[6].length + entryBytes;
      if (bytes >= batchBytes) break;
    }
    return packEntries(entries);
  };
}

/** What an entry takes beside its body, so that a batch of small ones is no larger in memory than one of large ones. */
const entryBytes = 100;

/** Entries of one rare kind, newest first, found by the index over all that are not frames. */
export function readEntriesOf(database: Database.Database, kind: EntryKind, page: Page): PackedEntries {
  checkPage(page);
  const rows = database
    .prepare('SELECT * FROM journal WHERE kind > 1 AND kind = ? AND id < ? ORDER BY id DESC LIMIT ?')
    .raw()
    .all(kindCode(kind), page.before ?? Number.MAX_SAFE_INTEGER, page.limit) as EntryRow[];
  return packEntries(rows.map(entryOf));
}

function entryOf([id, at, kind, source, first, records, body]: EntryRow): Entry {
  return { id, at, kind: kindOfCode(kind), sourceId: source ?? undefined, firstSequence: first ?? undefined, records, body };
}
