import Database from 'better-sqlite3';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Change } from '../../../core/access/change.ts';
import { appendChange, checkChain, type ChainHead } from '../../../server/store/change-table.ts';
import { migrate } from '../../../server/store/migrate.ts';
import { addSource, revokeSource, rotateSource } from '../../../server/store/source-table.ts';
import { morning } from './examples.ts';

const change = (alarm: number): Change => ({ kind: 'acknowledge', who: 'Ines', what: `alarm ${alarm}`, before: 'unacknowledged', after: 'acknowledged', why: 'die changed', entry: alarm });

let database: Database.Database;
beforeEach(() => {
  database = new Database(':memory:');
  migrate(database);
  for (let alarm = 1; alarm <= 5; alarm++) appendChange(database, change(alarm), morning + alarm);
});

function headNow(): ChainHead {
  const state = checkChain(database);
  if (state.kind === 'broken') throw new Error(`broken at ${state.at}`);
  return state.head;
}

/** What someone does who has the file and knows SQL. */
function pastTheTriggers(sql: string): void {
  database.exec(`DROP TRIGGER changes_stay; DROP TRIGGER changes_stay_as_they_are; ${sql}`);
}

describe('the record of changes', () => {
  it('is whole as written, and from nothing on', () => {
    expect(headNow()).toMatchObject({ id: 5, hash: expect.stringMatching(/^[0-9a-f]{64}$/) as string });
    const empty = new Database(':memory:');
    migrate(empty);
    expect(checkChain(empty)).toEqual({ kind: 'whole', head: { id: 0, hash: '0'.repeat(64) } });
  });

  it('is not changed by a slip', () => {
    expect(() => database.exec("UPDATE changes SET body = '{}' WHERE id = 2")).toThrow('only added to');
    expect(() => database.exec('DELETE FROM changes')).toThrow('only added to');
    expect(headNow().id).toBe(5);
  });

  it.each([
    ['a name altered', "UPDATE changes SET body = replace(body, 'Ines', 'Olaf') WHERE id = 3", { at: 3, why: 'altered' }],
    ['one taken out', 'DELETE FROM changes WHERE id = 2', { at: 2, why: 'missing' }],
    ['the first taken out', 'DELETE FROM changes WHERE id = 1', { at: 1, why: 'missing' }],
    ['one taken out and the rest moved up', 'DELETE FROM changes WHERE id = 2; UPDATE changes SET id = id - 1 WHERE id > 2', { at: 2, why: 'altered' }],
    ['one put in at the end', "INSERT INTO changes (body, hash) SELECT body, hash FROM changes WHERE id = 5", { at: 6, why: 'altered' }],
    ['the last cut off', 'DELETE FROM changes WHERE id = 5', { at: 5, why: 'cut-off' }],
    ['all cut off', 'DELETE FROM changes', { at: 1, why: 'cut-off' }],
    ['a hash altered', 'UPDATE changes SET hash = zeroblob(32) WHERE id = 4', { at: 4, why: 'altered' }],
  ])('shows %s', (_what, sql, found) => {
    pastTheTriggers(sql);
    expect(checkChain(database)).toEqual({ kind: 'broken', ...found });
  });

  it('goes on after a tail was cut off and still shows where', () => {
    pastTheTriggers('DELETE FROM changes WHERE id > 3');
    appendChange(database, change(9), morning);
    expect(checkChain(database)).toEqual({ kind: 'broken', at: 4, why: 'missing' });
  });

  it('written anew as a whole is found by a noted head, and by nothing else', () => {
    const noted = headNow();
    appendChange(database, change(6), morning);
    expect(checkChain(database, noted)).toMatchObject({ kind: 'whole', head: { id: 6 } });
    pastTheTriggers("DELETE FROM changes; DELETE FROM sqlite_sequence WHERE name = 'changes'");
    for (let alarm = 1; alarm <= 4; alarm++) appendChange(database, change(alarm + 10), morning);
    expect(checkChain(database)).toMatchObject({ kind: 'whole' });
    expect(checkChain(database, noted)).toEqual({ kind: 'broken', at: 5, why: 'cut-off' });
    appendChange(database, change(15), morning);
    expect(checkChain(database, noted)).toEqual({ kind: 'broken', at: 5, why: 'not-as-noted' });
  });

  it('holds what was done to sources, without their tokens, and nothing of what was refused', () => {
    const { token } = addSource(database, { name: 'filler', stations: ['fill'], at: morning });
    rotateSource(database, { name: 'filler' });
    revokeSource(database, 'filler', morning + 1);
    expect(() => addSource(database, { name: 'filler', stations: ['fill'], at: morning })).toThrow('taken');
    expect(() => rotateSource(database, { name: 'nobody' })).toThrow('nobody');
    const rows = database.prepare('SELECT body FROM changes WHERE id > 5 ORDER BY id').pluck().all() as string[];
    expect(rows.map((row) => JSON.parse(row) as Change)).toMatchObject([
      { kind: 'source-made', who: 'command line', what: 'source filler', before: null, after: { stations: ['fill'], revoked: null } },
      { kind: 'token-renewed', before: { revoked: null }, after: { revoked: null } },
      { kind: 'token-withdrawn', before: { revoked: null }, after: { revoked: morning + 1 } },
    ]);
    expect(rows.join('')).not.toContain(token);
    expect(headNow().id).toBe(8);
  });
});
