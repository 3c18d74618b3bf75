import type Database from 'better-sqlite3';

/** The journal and what was decided from it, snapshots, and the sources. */
export function journalAndEvidence(database: Database.Database): void {
  database.exec(`
    CREATE TABLE journal (
      id INTEGER PRIMARY KEY, at INTEGER NOT NULL, kind INTEGER NOT NULL,
      source INTEGER, first INTEGER, records INTEGER NOT NULL, body BLOB NOT NULL
    ) STRICT;
    CREATE TABLE happenings (
      id INTEGER PRIMARY KEY, journal_id INTEGER NOT NULL, at INTEGER NOT NULL,
      guarantee TEXT, kind TEXT NOT NULL, body TEXT NOT NULL
    ) STRICT;
    CREATE INDEX happenings_by_time ON happenings (at);
    CREATE TABLE alarms (id INTEGER PRIMARY KEY, guarantee TEXT NOT NULL, body TEXT NOT NULL) STRICT;
    CREATE TABLE minutes (
      guarantee TEXT NOT NULL, at INTEGER NOT NULL, inspected REAL NOT NULL, nonconforming REAL NOT NULL,
      estimate REAL, bound REAL, opposite REAL, state TEXT NOT NULL,
      PRIMARY KEY (guarantee, at)
    ) STRICT, WITHOUT ROWID;
    CREATE TABLE snapshots (journal_id INTEGER PRIMARY KEY, at INTEGER NOT NULL, hash BLOB NOT NULL, body BLOB NOT NULL) STRICT;
    CREATE TABLE sources (
      id INTEGER PRIMARY KEY AUTOINCREMENT, name TEXT NOT NULL UNIQUE, stations TEXT NOT NULL,
      token_hash BLOB UNIQUE, created INTEGER NOT NULL, last_used INTEGER, revoked INTEGER
    ) STRICT;
  `);
}
