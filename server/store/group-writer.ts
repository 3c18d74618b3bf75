import type Database from 'better-sqlite3';
import { appendChange } from './change-table.ts';
import { kindCode, unpackEntries } from './packed-entries.ts';
import type { PackedGroup } from './packed-group.ts';

/** How a connection writes groups: one transaction each, durable when the call returns. */
export function groupWriter(database: Database.Database): (group: PackedGroup) => void {
  const entry = database.prepare('INSERT INTO journal VALUES (?, ?, ?, ?, ?, ?, ?)');
  const happening = database.prepare('INSERT INTO happenings (journal_id, at, guarantee, kind, body) VALUES (?, ?, ?, ?, ?)');
  const alarm = database.prepare(
    `INSERT INTO alarms (id, guarantee, ended, body) VALUES (?, ?, ?, ?)
     ON CONFLICT (id) DO UPDATE SET guarantee = excluded.guarantee, ended = excluded.ended, body = excluded.body`,
  );
  const minute = database.prepare(
    `INSERT INTO minutes VALUES (?, ?, ?, ?, ?, ?, ?, ?)
     ON CONFLICT (guarantee, at) DO UPDATE SET
       inspected = inspected + excluded.inspected, nonconforming = nonconforming + excluded.nonconforming,
       estimate = excluded.estimate, bound = excluded.bound, opposite = excluded.opposite, state = excluded.state`,
  );
  const write = database.transaction((group: PackedGroup) => {
    for (const { id, at, kind, sourceId, firstSequence, records, body } of unpackEntries(group.entries)) {
      entry.run(id, at, kindCode(kind), sourceId, firstSequence, records, body);
    }
    for (const row of group.happenings) happening.run(row.journalId, row.at, row.guarantee, row.kind, row.body);
    for (const row of group.alarms) alarm.run(row.id, row.guarantee, row.ended ? 1 : 0, row.body);
    for (const row of group.minutes) {
      minute.run(row.guarantee, row.at, row.inspected, row.nonconforming, row.estimate, row.bound, row.opposite, row.state);
    }
    for (const change of group.changes) appendChange(database, change, Date.now());
  });
  return (group) => {
    write.immediate(group);
  };
}
