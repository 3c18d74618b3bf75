import type Database from 'better-sqlite3';
import type { RecordedChange } from '../../core/access/change.ts';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { AccessItem, ChangeQuery } from '../access/access-file.ts';
import { readAccess } from './access-table.ts';
import { readChanges } from './change-read.ts';
import { readEndedAlarms, readOpenAlarms } from './alarm-read.ts';
import type { EntryKind } from './entry.ts';
import { readHappenings } from './happening-read.ts';
import { readHistory } from './history-read.ts';
import { journalReader, readEntriesOf } from './journal-read.ts';
import type { PackedEntries } from './packed-entries.ts';
import { readNewestSnapshot } from './snapshot-table.ts';
import type { Source } from './source-register.ts';
import { heldHashes, listSources, sourceOfToken } from './source-table.ts';
import type { HappeningFound, HappeningQuery, HistoryQuery, HistorySteps, Page, SnapshotFound } from './store.ts';
import { handingOver, type Calls } from './worker-answers.ts';

/** What the reading thread can be asked. A type, not an interface: it has to be a Calls. */
export type ReadCalls = {
  readonly journal: (asked: { readonly fromId: number; readonly batchBytes: number }) => PackedEntries;
  readonly entriesOf: (asked: { readonly kind: EntryKind; readonly page: Page }) => PackedEntries;
  readonly newestSnapshot: (nothing: undefined) => SnapshotFound;
  readonly history: (query: HistoryQuery) => HistorySteps;
  readonly happenings: (query: HappeningQuery) => readonly HappeningFound[];
  readonly openAlarms: (nothing: undefined) => readonly Alarm[];
  readonly endedAlarms: (page: Page) => readonly Alarm[];
  readonly listSources: (nothing: undefined) => readonly Source[];
  readonly sourceOfToken: (asked: { readonly token: string; readonly at: number }) => Source | undefined;
  readonly heldHashes: (at: number) => readonly string[];
  readonly accessItems: (nothing: undefined) => readonly AccessItem[];
  readonly changes: (query: ChangeQuery) => readonly RecordedChange[];
  readonly close: (nothing: undefined) => void;
};

/** @param close gives back the database */
export function readCalls(database: Database.Database, close: () => void): ReadCalls & Calls {
  const journal = journalReader(database);
  return {
    journal: ({ fromId, batchBytes }) => handedEntries(journal(fromId, batchBytes)),
    entriesOf: ({ kind, page }) => handedEntries(readEntriesOf(database, kind, page)),
    newestSnapshot: () => {
      const found = readNewestSnapshot(database);
      return handingOver(found, found.snapshot === undefined ? [] : [found.snapshot.body.buffer]);
    },
    history: (query) => readHistory(database, query),
    happenings: (query) => readHappenings(database, query),
    openAlarms: () => readOpenAlarms(database),
    endedAlarms: (page) => readEndedAlarms(database, page),
    listSources: () => listSources(database),
    sourceOfToken: ({ token, at }) => sourceOfToken(database, token, at),
    heldHashes: (at) => heldHashes(database, at),
    accessItems: () => readAccess(database),
    changes: (query) => readChanges(database, query),
    close,
  };
}

const handedEntries = (packed: PackedEntries): PackedEntries => handingOver(packed, [packed.figures.buffer, packed.bodies.buffer]);
