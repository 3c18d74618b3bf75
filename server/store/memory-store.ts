import type { Alarm } from '../../core/alarm/alarm.ts';
import type { AccessFile } from '../access/access-file.ts';
import type { Happening } from '../../core/monitor/happening.ts';
import type { Entry, EntryKind } from './entry.ts';
import type { Group, Minute } from './group.ts';
import { keepChanges, memoryAccess, type KeptAccess } from './memory-access.ts';
import { memoryHistory } from './memory-history.ts';
import { memoryRegister, type KeptSources } from './memory-register.ts';
import { guaranteeOf, waitingGroup } from './packed-group.ts';
import { checkHappeningQuery, checkPage } from './query-check.ts';
import type { SourceRegister } from './source-register.ts';
import { storeErrorOf } from './sqlite-fault.ts';
import { StoreError } from './store-error.ts';
import { StoreGate } from './store-gate.ts';
import type { HappeningFound, HappeningQuery, HistoryQuery, HistorySteps, Page, Snapshot, SnapshotFound, Store, StoreCondition, StoreOptions } from './store.ts';

/** What outlives a memory store: open another one on it to rehearse a restart. */
export interface MemoryDisk {
  readonly entries: Entry[];
  readonly happenings: HappeningFound[];
  readonly alarms: Map<number, Alarm>;
  /** By guarantee and minute. */
  readonly minutes: Map<string, Minute>;
  snapshots: Snapshot[];
  readonly sources: KeptSources;
  readonly access: KeptAccess;
  inUse: boolean;
  /** When set, the next write fails with it, as a full disk would. */
  failure: StoreError | undefined;
}

export function memoryDisk(): MemoryDisk {
  return { entries: [], happenings: [], alarms: new Map(), minutes: new Map(), snapshots: [], sources: new Map(), access: { items: new Map(), changes: [] }, inUse: false, failure: undefined };
}

/** A store without a disk, for tests: the same contract, kept as long as its MemoryDisk. @throws StoreError 'in-use' */
export function openMemoryStore(disk: MemoryDisk = memoryDisk(), options: StoreOptions = {}): Store {
  if (disk.inUse) throw new StoreError('in-use', 'The memory disk is in use by another server: close that one first.');
  disk.inUse = true;
  return new MemoryStore(disk, options);
}

class MemoryStore implements Store {
  readonly sources: SourceRegister;
  readonly access: AccessFile;
  /** Everything is durable at once. */
  readonly waitingBytes = 0;
  readonly #disk: MemoryDisk;
  readonly #gate: StoreGate;

  constructor(disk: MemoryDisk, options: StoreOptions) {
    this.#disk = disk;
    this.#gate = new StoreGate(this.lastId, options.onRefused);
    this.sources = memoryRegister(disk.sources, this.#run);
    this.access = memoryAccess(disk.access, this.#run);
  }

  get condition(): StoreCondition {
    return this.#gate.condition;
  }

  get lastId(): number {
    return this.#disk.entries.at(-1)?.id ?? 0;
  }

  commit(group: Group): Promise<void> {
    return this.#run(() => {
      this.#gate.checkGroup(group);
      this.#failIfAsked();
      this.#keep(group);
    });
  }

  #keep(group: Group): void {
    const { entries, happenings, alarms, minutes } = waitingGroup(group);
    this.#disk.entries.push(...entries.map((entry) => ({ ...entry, body: entry.body.slice() })));
    for (const { journalId, body } of happenings) {
      this.#disk.happenings.push({ id: this.#disk.happenings.length + 1, journalId, happening: JSON.parse(body) as Happening });
    }
    for (const { id, body } of alarms) this.#disk.alarms.set(id, JSON.parse(body) as Alarm);
    for (const minute of minutes) this.#keepMinute(minute);
    keepChanges(this.#disk.access, group.changes, Date.now());
  }

  #keepMinute(minute: Minute): void {
    const key = `${minute.guarantee} ${minute.at}`;
    const before = this.#disk.minutes.get(key);
    this.#disk.minutes.set(key, {
      ...minute,
      inspected: (before?.inspected ?? 0) + minute.inspected,
      nonconforming: (before?.nonconforming ?? 0) + minute.nonconforming,
    });
  }

  keepSnapshot(snapshot: Snapshot): Promise<void> {
    return this.#run(() => {
      this.#gate.checkSnapshot(snapshot.journalId);
      this.#failIfAsked();
      const others = this.#disk.snapshots.filter(({ journalId }) => journalId !== snapshot.journalId);
      const kept = { ...snapshot, body: snapshot.body.slice() };
      this.#disk.snapshots = [kept, ...others].sort((a, b) => b.journalId - a.journalId).slice(0, 2);
    });
  }

  #failIfAsked(): void {
    const { failure } = this.#disk;
    if (failure === undefined) return;
    this.#gate.refuse(failure);
    throw failure;
  }

  newestSnapshot(): Promise<SnapshotFound> {
    return this.#run(() => ({ snapshot: this.#disk.snapshots[0], damaged: [] }));
  }

  async *readJournal(fromId: number): AsyncGenerator<readonly Entry[], void, undefined> {
    const entries = await this.#run(() => this.#disk.entries.filter(({ id }) => id >= fromId));
    if (entries.length > 0) yield entries;
  }

  entriesOf(kind: Exclude<EntryKind, 'frame'>, page: Page): Promise<readonly Entry[]> {
    return this.#run(() => this.#page(page, this.#disk.entries.filter((entry) => entry.kind === kind)));
  }

  history(query: HistoryQuery): Promise<HistorySteps> {
    return this.#run(() => memoryHistory(this.#disk.minutes.values(), query));
  }

  happenings(query: HappeningQuery): Promise<readonly HappeningFound[]> {
    return this.#run(() => {
      checkHappeningQuery(query);
      const { from, to, guarantee, kind } = query;
      const wanted = ({ happening }: HappeningFound): boolean =>
        happening.at >= from &&
        happening.at < to &&
        (guarantee === undefined || guaranteeOf(happening) === guarantee) &&
        (kind === undefined || happening.kind === kind);
      return this.#page(query, this.#disk.happenings.filter(wanted));
    });
  }

  openAlarms(): Promise<readonly Alarm[]> {
    return this.#run(() => [...this.#disk.alarms.values()].filter(({ state }) => state.kind !== 'ended').sort((a, b) => a.id - b.id));
  }

  endedAlarms(page: Page): Promise<readonly Alarm[]> {
    return this.#run(() => this.#page(page, [...this.#disk.alarms.values()].filter(({ state }) => state.kind === 'ended')));
  }

  backup(_path: string): Promise<void> {
    return this.#run(() => {
      throw new StoreError('failed', 'A memory store has nothing to back up: expected a store with a data directory.');
    });
  }

  close(): Promise<void> {
    if (this.condition.kind !== 'closed') this.#disk.inUse = false;
    this.#gate.close();
    return Promise.resolve();
  }

  /** Newest first. */
  #page<T extends { readonly id: number }>(page: Page, all: readonly T[]): T[] {
    checkPage(page);
    const { before = Number.MAX_SAFE_INTEGER, limit } = page;
    return all.filter(({ id }) => id < before).sort((a, b) => b.id - a.id).slice(0, limit);
  }

  readonly #run = <T>(act: () => T): Promise<T> =>
    new Promise((resolve, reject) => {
      try {
        const closed = this.#gate.closed();
        if (closed !== undefined) throw closed;
        resolve(act());
      } catch (cause) {
        reject(storeErrorOf(cause));
      }
    });
}
