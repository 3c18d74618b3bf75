import Database from 'better-sqlite3';
import type { DataDirectory } from './data-directory.ts';
import { StoreError } from './store-error.ts';

/**
 * Takes the directory for this server alone. The lock is an exclusive transaction held open on a small database of
 * its own: the operating system gives it back when the process ends, however it ends, so it never goes stale.
 *
 * @returns how to give it back
 * @throws StoreError 'in-use'
 */
export function lockDirectory(directory: DataDirectory): () => void {
  const lock = new Database(directory.lock, { timeout: 0 });
  try {
    lock.exec('BEGIN EXCLUSIVE');
  } catch (cause) {
    lock.close();
    throw new StoreError(
      'in-use',
      `The data directory ${directory.path} is in use by another server: stop that one or choose another directory.`,
      { cause },
    );
  }
  return () => lock.close();
}
