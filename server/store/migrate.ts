import type Database from 'better-sqlite3';
import { journalAndEvidence } from './migrations/0001-journal-and-evidence.ts';
import { findWithoutScanning } from './migrations/0002-find-without-scanning.ts';
import { recordOfChanges } from './migrations/0003-record-of-changes.ts';
import { access } from './migrations/0004-access.ts';
import { sourceTokens } from './migrations/0005-source-tokens.ts';
import { StoreError } from './store-error.ts';

/** Step n leads from schema version n to n + 1. */
const steps: readonly ((database: Database.Database) => void)[] = [journalAndEvidence, findWithoutScanning, recordOfChanges, access, sourceTokens];

/** The schema version this program reads and writes. */
export const schemaVersion = steps.length;

/** Schema version of a database; 0 when it is empty. */
export function schemaVersionOf(database: Database.Database): number {
  return database.pragma('user_version', { simple: true }) as number;
}

/**
 * Brings a database to this program's schema (or to `target`, for tests), each step whole or not at all.
 *
 * @throws StoreError 'newer-schema' for one that a newer program has written
 */
export function migrate(database: Database.Database, target = schemaVersion): void {
  const found = schemaVersionOf(database);
  if (found > schemaVersion) {
    throw new StoreError(
      'newer-schema',
      `The data were written by a newer version of Vouchline (schema ${found}; this program knows up to ${schemaVersion}): start that version, or restore a backup made before it.`,
    );
  }
  steps.slice(found, target).forEach((step, index) => {
    database.transaction(() => {
      step(database);
      database.pragma(`user_version = ${found + index + 1}`);
    }).immediate();
  });
}
