import type { CommitCalls } from './commit-calls.ts';
import type { ReadCalls } from './read-calls.ts';
import type { SourceRegister } from './source-register.ts';
import type { Calls } from './worker-answers.ts';
import type { WorkerChannel } from './worker-channel.ts';

/** The source register of a running server: changes go to the thread that writes, look-ups to the one that reads. */
export function remoteRegister(writing: WorkerChannel<CommitCalls & Calls>, reading: WorkerChannel<ReadCalls & Calls>): SourceRegister {
  return {
    add: (source) => writing.call('addSource', source),
    rotate: (renewal) => writing.call('rotateSource', renewal),
    revoke: (name, at, doer) => writing.call('revokeSource', { name, at, doer }),
    list: () => reading.call('listSources', undefined),
    ofToken: (token, at) => reading.call('sourceOfToken', { token, at }),
    heldHashes: (at) => reading.call('heldHashes', at),
    used: (id, at) => writing.call('noteUse', { id, at }),
  };
}
