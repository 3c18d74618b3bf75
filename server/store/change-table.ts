import { createHash } from 'node:crypto';
import type Database from 'better-sqlite3';
import { canonicalJson } from '../../core/access/canonical-json.ts';
import type { Change } from '../../core/access/change.ts';

/** A place in the record: its number and the hash that stands for it and all before it. */
export interface ChainHead {
  /** 0: nothing is recorded yet. */
  readonly id: number;
  /** SHA-256, 64 hexadecimal digits. */
  readonly hash: string;
}

export type ChainState =
  | { readonly kind: 'whole'; readonly head: ChainHead }
  | { readonly kind: 'broken'; readonly at: number; readonly why: 'missing' | 'altered' | 'cut-off' | 'not-as-noted' };

/** A record with its canonical JSON and the hash that chains it. */
export interface ChainedRow {
  readonly id: number;
  readonly body: string;
  readonly hash: Buffer;
}

/** What the first record is chained to. */
export const beginning = Buffer.alloc(32);

/** Adds a record; to be called within the transaction of what it records. `at` is wall time, ms since 1970-01-01 UTC. */
export function appendChange(database: Database.Database, change: Change, at: number): void {
  const last = database.prepare('SELECT hash FROM changes ORDER BY id DESC LIMIT 1').get() as Pick<ChainedRow, 'hash'> | undefined;
  const id = highestGiven(database) + 1;
  const body = canonicalJson({ id, at, ...change });
  database.prepare('INSERT INTO changes VALUES (?, ?, ?)').run(id, body, chainedHash(last?.hash ?? beginning, body));
}

/**
 * Follows the chain from its beginning. It finds a record altered, removed, put in or moved, and a tail cut off while
 * the counter of numbers stands. Someone who may write the file and writes the whole chain and the counter anew is
 * found only by a head noted elsewhere before.
 *
 * @param noted a head noted earlier, outside of the database
 */
export function checkChain(database: Database.Database, noted?: ChainHead): ChainState {
  const rows = database.prepare('SELECT id, body, hash FROM changes ORDER BY id').iterate() as IterableIterator<ChainedRow>;
  return followChain(rows, highestGiven(database), noted);
}

/** Follows a chain wherever it is kept. @param rows by rising id @param highest number that was ever given, 0 where that is not known */
export function followChain(rows: Iterable<ChainedRow>, highest: number, noted?: ChainHead): ChainState {
  let head: { id: number; hash: Buffer } = { id: 0, hash: beginning };
  for (const row of rows) {
    if (row.id !== head.id + 1) return { kind: 'broken', at: head.id + 1, why: 'missing' };
    if (!row.hash.equals(chainedHash(head.hash, row.body))) return { kind: 'broken', at: row.id, why: 'altered' };
    if (row.id === noted?.id && row.hash.toString('hex') !== noted.hash) return { kind: 'broken', at: row.id, why: 'not-as-noted' };
    head = row;
  }
  if (head.id < Math.max(highest, noted?.id ?? 0)) return { kind: 'broken', at: head.id + 1, why: 'cut-off' };
  return { kind: 'whole', head: { id: head.id, hash: head.hash.toString('hex') } };
}

function highestGiven(database: Database.Database): number {
  return (database.prepare("SELECT seq FROM sqlite_sequence WHERE name = 'changes'").pluck().get() as number | undefined) ?? 0;
}

/** What stands for a record and all before it. */
export function chainedHash(before: Buffer, body: string): Buffer {
  return createHash('sha256').update(before).update(body).digest();
}
