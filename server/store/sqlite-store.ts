import type { Alarm } from '../../core/alarm/alarm.ts';
import type { AccessFile } from '../access/access-file.ts';
import type { CommitCalls } from './commit-calls.ts';
import { CommitQueue } from './commit-queue.ts';
import type { CommitOpened, CommitStart } from './commit-worker.ts';
import { dataDirectory } from './data-directory.ts';
import type { Entry, EntryKind } from './entry.ts';
import type { Group } from './group.ts';
import { journalBatches } from './journal-batches.ts';
import { unpackEntries } from './packed-entries.ts';
import { waitingGroup } from './packed-group.ts';
import type { ReadCalls } from './read-calls.ts';
import { remoteAccess } from './remote-access.ts';
import { remoteRegister } from './remote-register.ts';
import type { SourceRegister } from './source-register.ts';
import { storeErrorOf } from './sqlite-fault.ts';
import { StoreError } from './store-error.ts';
import { StoreGate } from './store-gate.ts';
import type {
  HappeningFound,
  HappeningQuery,
  HistoryQuery,
  HistorySteps,
  Page,
  Snapshot,
  SnapshotFound,
  Store,
  StoreCondition,
  StoreOptions,
} from './store.ts';
import type { Calls } from './worker-answers.ts';
import { WorkerChannel } from './worker-channel.ts';
import { workerUrl } from './worker-url.ts';

type CommitChannel = WorkerChannel<CommitCalls & Calls>;
type ReadChannel = WorkerChannel<ReadCalls & Calls>;

const mebibyte = 1_048_576;

/**
 * Opens the store of a data directory: makes it where it is missing, brings its schema up to date, keeps every other
 * server out until `close`. One thread writes, one reads.
 *
 * @throws StoreError 'in-use', 'newer-schema', 'damaged', 'input-output', 'not-built'
 */
export async function openStore(directory: string, options: StoreOptions = {}): Promise<Store> {
  const files = dataDirectory(directory);
  const start: CommitStart = { directory: files, mostPages: options.mostPages };
  const writing = await WorkerChannel.start<CommitCalls & Calls, CommitOpened>(workerUrl('commit-worker', import.meta.url), start);
  try {
    const reading = await WorkerChannel.start<ReadCalls & Calls, undefined>(workerUrl('read-worker', import.meta.url), files);
    return new SqliteStore(writing.channel, reading.channel, writing.opened.lastId, options);
  } catch (cause) {
    await writing.channel.close();
    throw cause;
  }
}

class SqliteStore implements Store {
  readonly sources: SourceRegister;
  readonly access: AccessFile;
  readonly #writing: CommitChannel;
  readonly #reading: ReadChannel;
  readonly #queue: CommitQueue;
  readonly #gate: StoreGate;
  readonly #mostWaitingBytes: number;
  #lastId: number;
  #closing: Promise<void> | undefined;

  constructor(writing: CommitChannel, reading: ReadChannel, lastId: number, options: StoreOptions) {
    this.#writing = writing;
    this.#reading = reading;
    this.#lastId = lastId;
    this.#mostWaitingBytes = options.mostWaitingBytes ?? 256 * mebibyte;
    this.#gate = new StoreGate(lastId, options.onRefused);
    this.#queue = new CommitQueue(writing, { groupBytes: options.groupBytes ?? 4 * mebibyte, groupEntries: options.groupEntries ?? 4_096 });
    this.sources = remoteRegister(writing, reading);
    this.access = remoteAccess(writing, reading);
    void writing.ended.then(() => this.#gate.refuse(new StoreError('worker-ended', 'The committing thread has ended by itself.')));
  }

  get condition(): StoreCondition {
    return this.#gate.condition;
  }

  get lastId(): number {
    return this.#lastId;
  }

  get waitingBytes(): number {
    return this.#queue.waitingBytes;
  }

  async commit(group: Group): Promise<void> {
    this.#gate.checkGroup(group);
    const waiting = waitingGroup(group);
    await this.#durable(waiting.bytes, () => this.#queue.commit(waiting));
    this.#lastId = group.entries.at(-1)?.id ?? this.#lastId;
  }

  async keepSnapshot(snapshot: Snapshot): Promise<void> {
    this.#gate.checkSnapshot(snapshot.journalId);
    const { body } = snapshot;
    const alone = body.byteLength === body.buffer.byteLength ? body : body.slice();
    await this.#durable(0, () => this.#queue.keepSnapshot({ ...snapshot, body: alone }));
  }

  /** From its first failure on the store is refused: what is in memory is ahead of the disk. */
  async #durable(bytes: number, write: () => Promise<void>): Promise<void> {
    try {
      if (this.waitingBytes + bytes > this.#mostWaitingBytes) {
        throw new StoreError('overrun', `${this.waitingBytes + bytes} bytes wait for the disk, at most ${this.#mostWaitingBytes} may.`);
      }
      await write();
    } catch (cause) {
      const error = storeErrorOf(cause);
      this.#gate.refuse(error);
      throw error;
    }
  }

  newestSnapshot(): Promise<SnapshotFound> {
    return this.#reading.call('newestSnapshot', undefined);
  }

  readJournal(fromId: number, batchBytes = mebibyte): AsyncIterable<readonly Entry[]> {
    return journalBatches(fromId, (from) => this.#reading.call('journal', { fromId: from, batchBytes }));
  }

  async entriesOf(kind: Exclude<EntryKind, 'frame'>, page: Page): Promise<readonly Entry[]> {
    return unpackEntries(await this.#reading.call('entriesOf', { kind, page }));
  }

  history(query: HistoryQuery): Promise<HistorySteps> {
    return this.#reading.call('history', query);
  }

  happenings(query: HappeningQuery): Promise<readonly HappeningFound[]> {
    return this.#reading.call('happenings', query);
  }

  openAlarms(): Promise<readonly Alarm[]> {
    return this.#reading.call('openAlarms', undefined);
  }

  endedAlarms(page: Page): Promise<readonly Alarm[]> {
    return this.#reading.call('endedAlarms', page);
  }

  backup(path: string): Promise<void> {
    return this.#writing.call('backup', path);
  }

  close(): Promise<void> {
    return (this.#closing ??= this.#close());
  }

  async #close(): Promise<void> {
    this.#gate.close();
    await this.#queue.idle();
    await this.#reading.close();
    await this.#writing.close();
  }
}
