import type { AccessFile } from '../access/access-file.ts';
import type { CommitCalls } from './commit-calls.ts';
import type { ReadCalls } from './read-calls.ts';
import type { Calls } from './worker-answers.ts';
import type { WorkerChannel } from './worker-channel.ts';

/** Access data of a running server: written by the thread that writes, read by the other. */
export function remoteAccess(writing: WorkerChannel<CommitCalls & Calls>, reading: WorkerChannel<ReadCalls & Calls>): AccessFile {
  return {
    items: () => reading.call('accessItems', undefined),
    write: (write) => writing.call('writeAccess', write),
    changes: (query) => reading.call('changes', query),
  };
}
