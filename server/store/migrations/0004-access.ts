import type Database from 'better-sqlite3';

/** Accounts, invitations, sessions and tokens: few, read whole at the start, so their bodies are JSON and need no columns. */
export function access(database: Database.Database): void {
  database.exec('CREATE TABLE access (kind TEXT NOT NULL, id TEXT NOT NULL, body TEXT NOT NULL, PRIMARY KEY (kind, id)) STRICT, WITHOUT ROWID');
}
