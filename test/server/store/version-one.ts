import type Database from 'better-sqlite3';
import { alarm, ended, entry, evidence, minute, morning } from './examples.ts';

/** Schema version 1, written out as the first program made it; never edited, so that migrations are tested from there. */
const schema = `
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
  PRAGMA user_version = 1;
`;

/** A database as version 1 left it, with a little of everything in it. */
export function versionOne(database: Database.Database): void {
  database.exec(schema);
  const journal = database.prepare('INSERT INTO journal VALUES (?, ?, ?, ?, ?, ?, ?)');
  for (const { id, at, sourceId, firstSequence, records, body } of [1, 2, 3].map((id) => entry(id))) {
    journal.run(id, at, id === 2 ? 4 : 1, sourceId, firstSequence, records, body);
  }
  const happening = evidence('leak-a', morning);
  database.prepare('INSERT INTO happenings VALUES (1, 3, ?, ?, ?, ?)').run(morning, 'leak-a', 'evidence', JSON.stringify(happening));
  const alarms = database.prepare('INSERT INTO alarms VALUES (?, ?, ?)');
  for (const one of [alarm(1, ended), alarm(2)]) alarms.run(one.id, one.guarantee, JSON.stringify(one));
  const { guarantee, at, inspected, nonconforming, estimate, bound, state } = minute('leak-a', 0);
  database.prepare('INSERT INTO minutes VALUES (?, ?, ?, ?, ?, ?, NULL, ?)').run(guarantee, at, inspected, nonconforming, estimate, bound, state);
  database.prepare("INSERT INTO sources VALUES (1, 'filler', '[\"fill\"]', NULL, ?, NULL, NULL)").run(morning);
}
