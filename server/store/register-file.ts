import type Database from 'better-sqlite3';
import { dataDirectory, type DataDirectory } from './data-directory.ts';
import { openToWrite } from './database.ts';
import { lockDirectory } from './directory-lock.ts';
import { migrate, schemaVersion, schemaVersionOf } from './migrate.ts';
import type { SourceRegister } from './source-register.ts';
import { addSource, heldHashes, listSources, noteUse, revokeSource, rotateSource, sourceOfToken } from './source-table.ts';
import { storeErrorOf } from './sqlite-fault.ts';

export interface RegisterFile extends SourceRegister {
  close(): void;
}

/**
 * The source register of a data directory for the command line, also beside a running server, which finds the changes
 * within a second. Without a server it makes the directory and brings the schema up to date.
 *
 * @throws StoreError 'in-use' (a server of another version has it), 'newer-schema', 'damaged', 'input-output'
 */
export function openRegisterFile(directory: string): RegisterFile {
  const database = openMigrated(dataDirectory(directory));
  return {
    add: (source) => promised(() => addSource(database, source)),
    rotate: (renewal) => promised(() => rotateSource(database, renewal)),
    revoke: (name, at, doer) => promised(() => revokeSource(database, name, at, doer)),
    list: () => promised(() => listSources(database)),
    ofToken: (token, at) => promised(() => sourceOfToken(database, token, at)),
    heldHashes: (at) => promised(() => heldHashes(database, at)),
    used: (id, at) => promised(() => noteUse(database, id, at)),
    close: () => void database.close(),
  };
}

function openMigrated(files: DataDirectory): Database.Database {
  let database: Database.Database | undefined;
  let unlock: (() => void) | undefined;
  try {
    database = openToWrite(files.database);
    if (schemaVersionOf(database) !== schemaVersion) {
      unlock = lockDirectory(files);
      migrate(database);
    }
    return database;
  } catch (cause) {
    database?.close();
    throw storeErrorOf(cause);
  } finally {
    unlock?.();
  }
}

const promised = <T>(act: () => T): Promise<T> =>
  new Promise((resolve, reject) => {
    try {
      resolve(act());
    } catch (cause) {
      reject(storeErrorOf(cause));
    }
  });
