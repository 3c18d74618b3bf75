import type Database from 'better-sqlite3';

/**
 * The record of changes. Rows are only ever added: the triggers stop a slip, the chain of hashes finds what was done
 * past them. AUTOINCREMENT keeps the highest number ever given in a place of its own, so a tail cut off shows.
 */
export function recordOfChanges(database: Database.Database): void {
  database.exec(`
    CREATE TABLE changes (id INTEGER PRIMARY KEY AUTOINCREMENT, body TEXT NOT NULL, hash BLOB NOT NULL) STRICT;
    CREATE TRIGGER changes_stay_as_they_are BEFORE UPDATE ON changes BEGIN SELECT RAISE(ABORT, 'the record of changes is only added to'); END;
    CREATE TRIGGER changes_stay BEFORE DELETE ON changes BEGIN SELECT RAISE(ABORT, 'the record of changes is only added to'); END;
  `);
}
