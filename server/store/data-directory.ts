import { chmodSync, closeSync, mkdirSync, openSync, statSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { StoreError } from './store-error.ts';

/** Files of a data directory. */
export interface DataDirectory {
  readonly path: string;
  readonly database: string;
  readonly lock: string;
}

/**
 * Makes sure the directory and its files exist and that only their owner reads the files: they hold token hashes.
 * A directory made here is 0700, files are 0600 (SQLite gives its side files the mode of the database).
 *
 * @throws StoreError 'input-output' naming the directory
 */
export function dataDirectory(path: string): DataDirectory {
  const top = resolve(path);
  const files: DataDirectory = { path: top, database: join(top, 'vouchline.db'), lock: join(top, 'lock.db') };
  try {
    mkdirSync(top, { recursive: true, mode: 0o700 });
    for (const file of [files.database, files.lock]) makePrivate(file);
  } catch (cause) {
    const why = cause instanceof Error ? cause.message : String(cause);
    throw new StoreError('input-output', `The data directory ${top} cannot be used: ${why}`, { cause });
  }
  return files;
}

/** Makes a file where there is none and takes the rights of all but its owner away. */
export function makePrivate(file: string): void {
  closeSync(openSync(file, 'a', 0o600));
  if ((statSync(file).mode & 0o077) !== 0) chmodSync(file, 0o600);
}
