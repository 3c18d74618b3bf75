import type Database from 'better-sqlite3';
import type { Change } from '../../core/access/change.ts';
import { appendChange } from './change-table.ts';
import { checkSource } from './source-check.ts';
import type { Source, TokenGrant } from './source-register.ts';
import { hashOfToken, newToken } from './source-token.ts';
import { StoreError } from './store-error.ts';

interface SourceRow {
  readonly id: number;
  readonly name: string;
  readonly stations: string;
  readonly created: number;
  readonly last_used: number | null;
  readonly revoked: number | null;
}

export function addSource(database: Database.Database, name: string, stations: readonly string[], at: number): TokenGrant {
  checkSource(name, stations);
  const token = newToken();
  const add = database.prepare(
    'INSERT INTO sources (name, stations, token_hash, created) VALUES (?, ?, ?, ?) ON CONFLICT (name) DO NOTHING',
  );
  return atOnce(database, () => {
    if (add.run(name, JSON.stringify([...new Set(stations)]), hashOfToken(token), at).changes === 0) {
      throw new StoreError('name-taken', `name: ${name} is taken by another source (revoked ones keep theirs); choose another, or rotate its token.`);
    }
    const source = sourceNamed(database, name);
    record(database, 'source-made', undefined, source);
    return { source, token };
  });
}

export function rotateSource(database: Database.Database, name: string): TokenGrant {
  const token = newToken();
  return atOnce(database, () => {
    const before = sourceNamed(database, name);
    database.prepare('UPDATE sources SET token_hash = ?, revoked = NULL WHERE name = ?').run(hashOfToken(token), name);
    const source = sourceNamed(database, name);
    record(database, 'token-renewed', before, source);
    return { source, token };
  });
}

export function revokeSource(database: Database.Database, name: string, at: number): Source {
  return atOnce(database, () => {
    const before = sourceNamed(database, name);
    database.prepare('UPDATE sources SET token_hash = NULL, revoked = coalesce(revoked, ?) WHERE name = ?').run(at, name);
    const source = sourceNamed(database, name);
    record(database, 'token-withdrawn', before, source);
    return source;
  });
}

/** The write lock comes first: the record's last hash is read under it. */
const atOnce = <T>(database: Database.Database, act: () => T): T => database.transaction(act).immediate();

/** Who is the command line: whoever may write the data directory. */
function record(database: Database.Database, kind: Change['kind'], before: Source | undefined, after: Source): void {
  const shown = (source: Source): Change['after'] => ({ stations: source.stations, revoked: source.revoked ?? null });
  appendChange(database, { kind, who: 'command line', what: `source ${after.name}`, before: before === undefined ? null : shown(before), after: shown(after), why: '', entry: null }, Date.now());
}

export function noteUse(database: Database.Database, id: number, at: number): void {
  if (database.prepare('UPDATE sources SET last_used = ? WHERE id = ?').run(at, id).changes === 0) {
    throw new StoreError('unknown-source', `source: no source has the id ${id}.`);
  }
}

export function listSources(database: Database.Database): Source[] {
  return (database.prepare('SELECT * FROM sources ORDER BY name').all() as SourceRow[]).map(sourceOf);
}

export function sourceOfToken(database: Database.Database, token: string): Source | undefined {
  const row = database.prepare('SELECT * FROM sources WHERE token_hash = ?').get(hashOfToken(token)) as SourceRow | undefined;
  return row && sourceOf(row);
}

function sourceNamed(database: Database.Database, name: string): Source {
  const row = database.prepare('SELECT * FROM sources WHERE name = ?').get(name) as SourceRow | undefined;
  if (row === undefined) throw new StoreError('unknown-source', `name: no source is called ${JSON.stringify(name)}.`);
  return sourceOf(row);
}

function sourceOf(row: SourceRow): Source {
  return {
    id: row.id,
    name: row.name,
    stations: JSON.parse(row.stations) as string[],
    created: row.created,
    lastUsed: row.last_used ?? undefined,
    revoked: row.revoked ?? undefined,
  };
}
