import { createHash } from 'node:crypto';
import type Database from 'better-sqlite3';
import type { Snapshot, SnapshotFound } from './store.ts';

/** Two: should the newest be damaged, the one before it is there and only a longer tail is replayed. */
const kept = 2;

/** Hash over everything a snapshot says, so that a changed journal id is found out too. */
function hashOf({ journalId, at, body }: Snapshot): Buffer {
  return createHash('sha256').update(`${journalId} ${at} `).update(body).digest();
}

export function writeSnapshot(database: Database.Database, snapshot: Snapshot): void {
  database.transaction(() => {
    database.prepare('INSERT OR REPLACE INTO snapshots VALUES (?, ?, ?, ?)').run(snapshot.journalId, snapshot.at, hashOf(snapshot), snapshot.body);
    database.prepare('DELETE FROM snapshots WHERE journal_id NOT IN (SELECT journal_id FROM snapshots ORDER BY journal_id DESC LIMIT ?)').run(kept);
  }).immediate();
}

/** The newest snapshot whose hash is right, and those above it whose hash is not. */
export function readNewestSnapshot(database: Database.Database): SnapshotFound {
  const damaged: number[] = [];
  const rows = database.prepare('SELECT journal_id AS journalId, at, hash, body FROM snapshots ORDER BY journal_id DESC');
  for (const row of rows.iterate() as Iterable<SnapshotRow>) {
    const snapshot: Snapshot = { journalId: row.journalId, at: row.at, body: ownBytes(row.body) };
    if (hashOf(snapshot).equals(row.hash)) return { snapshot, damaged };
    damaged.push(row.journalId);
  }
  return { snapshot: undefined, damaged };
}

interface SnapshotRow {
  readonly journalId: number;
  readonly at: number;
  readonly hash: Buffer;
  readonly body: Buffer<ArrayBuffer>;
}

/** Bytes alone in their buffer, so that the buffer can change threads; copied only where they are not. */
function ownBytes(body: Buffer<ArrayBuffer>): Uint8Array<ArrayBuffer> {
  const alone = body.byteLength === body.buffer.byteLength;
  return alone ? new Uint8Array(body.buffer) : new Uint8Array(body);
}
