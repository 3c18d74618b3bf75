import type { CommitCalls } from './commit-calls.ts';
import type { ReadCalls } from './read-calls.ts';
import type { SourceRegister } from './source-register.ts';
import type { Calls } from './worker-answers.ts';
import type { WorkerChannel } from './worker-channel.ts';

/** The source register of a running server: changes go to the thread that writes, look-ups to the one that reads. */
export function remoteRegister(writing: WorkerChannel<CommitCalls & Calls>, reading: WorkerChannel<ReadCalls & Calls>): SourceRegister {
  return {
    add: (name, stations, at) => writing.call('addSource', { name, stations, at }),
    rotate: (name) => writing.call('rotateSource', name),
    revoke: (name, at) => writing.call('revokeSource', { name, at }),
    list: () => reading.call('listSources', undefined),
    ofToken: (token) => reading.call('sourceOfToken', token),
    used: (id, at) => writing.call('noteUse', { id, at }),
  };
}
