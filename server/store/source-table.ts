import type Database from 'better-sqlite3';
import type { Change } from '../../core/access/change.ts';
import { appendChange } from './change-table.ts';
import { checkSource } from './source-check.ts';
import type { NewSource, Renewal, Source, SourceDoer, TokenGrant } from './source-register.ts';
import { hashOfToken, newToken } from './source-token.ts';
import { StoreError } from './store-error.ts';

interface SourceRow {
  readonly id: number;
  readonly name: string;
  readonly stations: string;
  readonly created: number;
  readonly last_used: number | null;
  readonly revoked: number | null;
  readonly products: string;
  readonly old_until: number | null;
}

export function addSource(database: Database.Database, { name, stations, products = [], at, doer }: NewSource): TokenGrant {
  checkSource(name, stations, products);
  const token = newToken();
  const add = database.prepare(
    'INSERT INTO sources (name, stations, products, token_hash, created) VALUES (?, ?, ?, ?, ?) ON CONFLICT (name) DO NOTHING',
  );
  return atOnce(database, () => {
    if (add.run(name, JSON.stringify([...new Set(stations)]), JSON.stringify([...new Set(products)]), hashOfToken(token), at).changes === 0) {
      throw new StoreError('name-taken', `name: ${name} is taken by another source (revoked ones keep theirs); choose another, or rotate its token.`);
    }
    const source = sourceNamed(database, name);
    record(database, 'source-made', undefined, source, doer);
    return { source, token };
  });
}

export function rotateSource(database: Database.Database, { name, oldUntil, doer }: Renewal): TokenGrant {
  const token = newToken();
  return atOnce(database, () => {
    const before = sourceNamed(database, name);
    database
      .prepare('UPDATE sources SET old_token_hash = CASE WHEN @until IS NULL THEN NULL ELSE token_hash END, old_until = @until, token_hash = @hash, revoked = NULL WHERE name = @name')
      .run({ until: oldUntil ?? null, hash: hashOfToken(token), name });
    const source = sourceNamed(database, name);
    record(database, 'token-renewed', before, source, doer);
    return { source, token };
  });
}

export function revokeSource(database: Database.Database, name: string, at: number, doer?: SourceDoer): Source {
  return atOnce(database, () => {
    const before = sourceNamed(database, name);
    database.prepare('UPDATE sources SET token_hash = NULL, old_token_hash = NULL, old_until = NULL, revoked = coalesce(revoked, ?) WHERE name = ?').run(at, name);
    const source = sourceNamed(database, name);
    record(database, 'token-withdrawn', before, source, doer);
    return source;
  });
}

/** The write lock comes first: the record's last hash is read under it. */
const atOnce = <T>(database: Database.Database, act: () => T): T => database.transaction(act).immediate();

/** Where nobody is named it is the command line: whoever may write the data directory. */
function record(database: Database.Database, kind: Change['kind'], before: Source | undefined, after: Source, doer: SourceDoer = { who: 'command line', why: '' }): void {
  const shown = (source: Source): Change['after'] => ({
    stations: source.stations,
    ...(source.products.length === 0 ? {} : { products: source.products }),
    ...(source.oldUntil === undefined ? {} : { oldUntil: source.oldUntil }),
    revoked: source.revoked ?? null,
  });
  appendChange(database, { kind, ...doer, what: `source ${after.name}`, before: before === undefined ? null : shown(before), after: shown(after), entry: null }, Date.now());
}

export function noteUse(database: Database.Database, id: number, at: number): void {
  if (database.prepare('UPDATE sources SET last_used = ? WHERE id = ?').run(at, id).changes === 0) {
    throw new StoreError('unknown-source', `source: no source has the id ${id}.`);
  }
}

export function listSources(database: Database.Database): Source[] {
  return (database.prepare('SELECT * FROM sources ORDER BY name').all() as SourceRow[]).map(sourceOf);
}

export function sourceOfToken(database: Database.Database, token: string, at: number): Source | undefined {
  const hash = hashOfToken(token);
  const row = database.prepare('SELECT * FROM sources WHERE token_hash = ? OR (old_token_hash = ? AND old_until > ?)').get(hash, hash, at) as SourceRow | undefined;
  return row && sourceOf(row);
}

export function heldHashes(database: Database.Database, at: number): string[] {
  return database
    .prepare('SELECT lower(hex(token_hash)) FROM sources WHERE token_hash IS NOT NULL UNION ALL SELECT lower(hex(old_token_hash)) FROM sources WHERE old_token_hash IS NOT NULL AND old_until > ?')
    .pluck()
    .all(at) as string[];
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
    products: JSON.parse(row.products) as string[],
    created: row.created,
    lastUsed: row.last_used ?? undefined,
    revoked: row.revoked ?? undefined,
    oldUntil: row.old_until ?? undefined,
  };
}
