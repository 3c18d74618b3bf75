import type { Alarm } from '../../core/alarm/alarm.ts';
import type { Happening } from '../../core/monitor/happening.ts';
import type { History } from '../../core/view/history.ts';
import type { AccessFile } from '../access/access-file.ts';
import type { Entry, EntryKind } from './entry.ts';
import type { Group } from './group.ts';
import type { SourceRegister } from './source-register.ts';
import type { StoreError } from './store-error.ts';

/** The monitor's whole state after the entry `journalId`. */
export interface Snapshot {
  /** 0 before the first entry. */
  readonly journalId: number;
  /** When it was taken, ms since 1970-01-01 UTC. */
  readonly at: number;
  readonly body: Uint8Array<ArrayBuffer>;
}

export interface SnapshotFound {
  /** The newest intact one; undefined where there is none: replay the whole journal. */
  readonly snapshot: Snapshot | undefined;
  /** Journal ids of newer snapshots that fail their checksum, newest first: to be logged. */
  readonly damaged: readonly number[];
}

export interface KeptRange {
  /** ms since 1970-01-01 UTC; from (included) to (not included). */
  readonly from: number;
  readonly to: number;
}

export interface HappeningQuery extends KeptRange {
  readonly guarantee?: string;
  readonly kind?: Happening['kind'];
  /** Page: only ids below this one. */
  readonly before?: number;
  /** 1 to 10,000. */
  readonly limit: number;
}

export interface HappeningFound {
  /** Whole, rising in the order of decision; for paging. */
  readonly id: number;
  readonly journalId: number;
  readonly happening: Happening;
}

export interface HistoryQuery extends KeptRange {
  readonly guarantee: string;
  /** At most so many steps, 1 to 10,000. */
  readonly points: number;
}

/** Columns of a History without its events. Steps in which nothing was written are left out. */
export type HistorySteps = Omit<History, 'events'>;

export interface Page {
  /** Only ids below this one. */
  readonly before?: number;
  /** 1 to 10,000. */
  readonly limit: number;
}

export type StoreCondition =
  | { readonly kind: 'open' }
  /** A commit failed: what is in memory is ahead of the disk, so nothing more is taken until a restart. */
  | { readonly kind: 'refused'; readonly error: StoreError }
  | { readonly kind: 'closed' };

export interface StoreOptions {
  /** A transaction takes waiting groups up to so many bytes or entries, at least one group. 4 MiB, 4,096. */
  readonly groupBytes?: number;
  readonly groupEntries?: number;
  /** More than this waiting refuses the store: pause the sockets long before. 256 MiB. */
  readonly mostWaitingBytes?: number;
  /** The database may not grow beyond so many pages of 4,096 bytes; unlimited when absent. */
  readonly mostPages?: number;
  /** Told once, when the store enters 'refused'. */
  readonly onRefused?: (error: StoreError) => void;
}

/** Where everything accepted is kept. One server per data directory; opened by `openStore` or `openMemoryStore`. */
export interface Store {
  readonly sources: SourceRegister;
  readonly access: AccessFile;
  readonly condition: StoreCondition;
  /** Newest journal id that was durable when the store was opened or became so since; 0 when empty. */
  readonly lastId: number;
  /** Bytes given to `commit` that are not durable yet: pause the sockets above a mark of your choice. */
  readonly waitingBytes: number;
  /**
   * Makes a group durable; resolves after it is. Groups become durable in the order of the calls. Bodies must not
   * change before it resolves.
   * @throws StoreError; from the first failure on every commit fails and the condition is 'refused'
   */
  commit(group: Group): Promise<void>;
  /** Keeps a snapshot behind the groups given before it, and the one before it; older ones go. The body's buffer is handed over (detached). */
  keepSnapshot(snapshot: Snapshot): Promise<void>;
  newestSnapshot(): Promise<SnapshotFound>;
  /** Entries with ids from `fromId` (included), in order, in batches of about `batchBytes` (1 MiB); the next batch is read while one is worked on. */
  readJournal(fromId: number, batchBytes?: number): AsyncIterable<readonly Entry[]>;
  /** Entries of one kind, newest first (plant versions, acts). */
  entriesOf(kind: Exclude<EntryKind, 'frame'>, page: Page): Promise<readonly Entry[]>;
  history(query: HistoryQuery): Promise<HistorySteps>;
  /** Newest first. */
  happenings(query: HappeningQuery): Promise<readonly HappeningFound[]>;
  /** All that are not ended, oldest first. */
  openAlarms(): Promise<readonly Alarm[]>;
  /** Newest first. */
  endedAlarms(page: Page): Promise<readonly Alarm[]>;
  /** Copies the whole store, as it is at the end of the copy, into a database file that does not exist yet. */
  backup(path: string): Promise<void>;
  /** Makes durable what waits, then ends; the directory is free when it resolves. May be called twice. */
  close(): Promise<void>;
}
