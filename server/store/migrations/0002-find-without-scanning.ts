import type Database from 'better-sqlite3';

/** Whether an alarm is ended becomes a column; rare journal entries, a guarantee's happenings and alarms get indexes. */
export function findWithoutScanning(database: Database.Database): void {
  database.exec(`
    ALTER TABLE alarms ADD COLUMN ended INTEGER NOT NULL DEFAULT 0;
    UPDATE alarms SET ended = 1 WHERE json_extract(body, '$.state.kind') = 'ended';
    CREATE INDEX alarms_by_end ON alarms (ended, id);
    CREATE INDEX happenings_of_guarantee ON happenings (guarantee, at);
    CREATE INDEX journal_without_frames ON journal (kind, id) WHERE kind > 1;
  `);
}
