import { workerData } from 'node:worker_threads';
import type Database from 'better-sqlite3';
import { commitCalls } from './commit-calls.ts';
import type { DataDirectory } from './data-directory.ts';
import { openToWrite } from './database.ts';
import { lockDirectory } from './directory-lock.ts';
import { migrate } from './migrate.ts';
import { answerCalls } from './worker-answers.ts';

/** What the committing thread is started with. */
export interface CommitStart {
  readonly directory: DataDirectory;
  readonly mostPages: number | undefined;
}

/** What it answers once it has the directory: the newest durable journal id, 0 when there is none. */
export interface CommitOpened {
  readonly lastId: number;
}

answerCalls(() => {
  const { directory, mostPages } = workerData as CommitStart;
  const unlock = lockDirectory(directory);
  let database: Database.Database | undefined;
  const close = (): void => {
    database?.close();
    unlock();
  };
  try {
    database = openToWrite(directory.database, mostPages);
    migrate(database);
    const lastId = database.prepare('SELECT coalesce(max(id), 0) FROM journal').pluck().get() as number;
    return { opened: { lastId } satisfies CommitOpened, calls: commitCalls(database, close) };
  } catch (cause) {
    close();
    throw cause;
  }
});
