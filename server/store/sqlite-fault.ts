import Database from 'better-sqlite3';
import { StoreError, type StoreFault } from './store-error.ts';

/** Any failure as a StoreError: SQLite's result codes in the store's own words, its message kept. */
export function storeErrorOf(cause: unknown): StoreError {
  if (cause instanceof StoreError) return cause;
  if (cause instanceof Database.SqliteError) return new StoreError(faultOfCode(cause.code), `${cause.message} (${cause.code})`, { cause });
  return new StoreError('failed', cause instanceof Error ? cause.message : String(cause), { cause });
}

function faultOfCode(code: string): StoreFault {
  if (code === 'SQLITE_FULL') return 'disk-full';
  if (code.startsWith('SQLITE_CORRUPT') || code === 'SQLITE_NOTADB') return 'damaged';
  if (/^SQLITE_(IOERR|READONLY|CANTOPEN|PERM)/.test(code)) return 'input-output';
  return 'failed';
}
