import Database from 'better-sqlite3';

/** Milliseconds a connection waits for another one's write (the command line changes sources beside a running server). */
const waitMs = 5_000;
/**
 * Pages in the write-ahead log before they are copied into the database. Once the log has reached that size it is
 * written over in place, and waiting for the disk is quicker than while a file grows: 4 MiB are reached soon.
 */
const pagesToCheckpoint = 1_024;

/** A connection that writes: what it has committed survives loss of power. */
export function openToWrite(path: string, mostPages?: number): Database.Database {
  const database = new Database(path, { timeout: waitMs });
  database.pragma('page_size = 4096');
  database.pragma('journal_mode = WAL');
  database.pragma('synchronous = FULL');
  database.pragma(`wal_autocheckpoint = ${pagesToCheckpoint}`);
  if (mostPages !== undefined) database.pragma(`max_page_count = ${mostPages}`);
  return database;
}

/** A connection that only reads; it neither waits for the writer nor holds it up. */
export function openToRead(path: string): Database.Database {
  return new Database(path, { readonly: true, timeout: waitMs });
}
