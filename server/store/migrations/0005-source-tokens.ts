import type Database from 'better-sqlite3';

/** Sources bound to products, and a token that still holds for a while after it was renewed. */
export function sourceTokens(database: Database.Database): void {
  database.exec(`
    ALTER TABLE sources ADD COLUMN products TEXT NOT NULL DEFAULT '[]';
    ALTER TABLE sources ADD COLUMN old_token_hash BLOB;
    ALTER TABLE sources ADD COLUMN old_until INTEGER;
    CREATE INDEX sources_by_old_token ON sources (old_token_hash) WHERE old_token_hash IS NOT NULL;
  `);
}
