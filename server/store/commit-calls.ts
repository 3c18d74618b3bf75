import { existsSync } from 'node:fs';
import type Database from 'better-sqlite3';
import type { AccessWrite } from '../access/access-file.ts';
import { writeAccess } from './access-table.ts';
import { makePrivate } from './data-directory.ts';
import { groupWriter } from './group-writer.ts';
import type { PackedGroup } from './packed-group.ts';
import { writeSnapshot } from './snapshot-table.ts';
import { addSource, noteUse, revokeSource, rotateSource } from './source-table.ts';
import type { NewSource, Renewal, Source, SourceDoer, TokenGrant } from './source-register.ts';
import { storeErrorOf } from './sqlite-fault.ts';
import { StoreError } from './store-error.ts';
import type { Snapshot } from './store.ts';
import type { Calls } from './worker-answers.ts';

/** What the committing thread can be asked. A type, not an interface: it has to be a Calls. */
export type CommitCalls = {
  readonly commit: (group: PackedGroup) => void;
  readonly keepSnapshot: (snapshot: Snapshot) => void;
  readonly addSource: (source: NewSource) => TokenGrant;
  readonly rotateSource: (renewal: Renewal) => TokenGrant;
  readonly revokeSource: (source: { readonly name: string; readonly at: number; readonly doer: SourceDoer | undefined }) => Source;
  readonly noteUse: (use: { readonly id: number; readonly at: number }) => void;
  readonly writeAccess: (write: AccessWrite) => void;
  readonly backup: (path: string) => Promise<void>;
  readonly close: (nothing: undefined) => void;
};

/** @param close gives back database and lock */
export function commitCalls(database: Database.Database, close: () => void): CommitCalls & Calls {
  return {
    ...journalCalls(database),
    addSource: (source) => addSource(database, source),
    rotateSource: (renewal) => rotateSource(database, renewal),
    revokeSource: ({ name, at, doer }) => revokeSource(database, name, at, doer),
    noteUse: ({ id, at }) => noteUse(database, id, at),
    writeAccess: (write) => writeAccess(database, write, Date.now()),
    backup: (path) => backupTo(database, path),
    close,
  };
}

/** Once a commit has failed nothing more is written: what follows builds on what is missing. */
function journalCalls(database: Database.Database): Pick<CommitCalls, 'commit' | 'keepSnapshot'> {
  const write = groupWriter(database);
  let failed: StoreError | undefined;
  const unlessFailed = (act: () => void): void => {
    if (failed !== undefined) throw new StoreError('refused', `An earlier write failed (${failed.message}): nothing is taken until the server is started again.`);
    try {
      act();
    } catch (cause) {
      failed = storeErrorOf(cause);
      throw failed;
    }
  };
  return {
    commit: (group) => unlessFailed(() => write(group)),
    keepSnapshot: (snapshot) => unlessFailed(() => writeSnapshot(database, snapshot)),
  };
}

async function backupTo(database: Database.Database, path: string): Promise<void> {
  if (existsSync(path)) throw new StoreError('input-output', `The file ${path} exists: name one that does not.`);
  makePrivate(path);
  await database.backup(path);
}
