import { deserialize, serialize } from 'node:v8';
import type { Plant } from '../../core/plant/plant.ts';
import { Monitor } from '../../core/monitor/monitor.ts';
import { monitorFrom, snapshotForm, snapshotOf, type MonitorSnapshot } from '../../core/monitor/monitor-snapshot.ts';
import { BinaryFrameReader } from '../../core/protocol/binary-frame-reader.ts';
import { storedLimits } from '../../core/protocol/limits.ts';
import type { EpochMs } from '../../core/units.ts';
import type { Entry } from '../store/entry.ts';
import type { Store } from '../store/store.ts';
import { isKind, noteOf, type PlantNote } from './journal-form.ts';
import type { PlantReader } from './judge.ts';

/** A state rebuilt from the store. */
export interface Recovered {
  readonly monitor: Monitor;
  readonly lastId: number;
  /** Plant file in force at the last entry; undefined for an empty store. */
  readonly plant: PlantNote | undefined;
  /** Journal entries replayed behind the snapshot, records in them, and newer snapshots that could not be read. */
  readonly replayed: number;
  readonly records: number;
  readonly damagedSnapshots: number;
}

/** A monitor's state as bytes for the store. */
export function snapshotBytes(monitor: Monitor): Uint8Array<ArrayBuffer> {
  return new Uint8Array(serialize(snapshotOf(monitor)));
}

const emptyPlant: Plant = { name: '', timeZone: 'UTC', shifts: [], lines: [], products: [], guarantees: [] };

/** Brings back the state an uninterrupted run would have: the newest snapshot, then the journal behind it, in order. */
export async function recover(store: Store, readPlant: PlantReader): Promise<Recovered> {
  const { snapshot, damaged } = await store.newestSnapshot();
  const replay = new Replay(store, readPlant);
  await replay.learnNames();
  let from = 1;
  if (snapshot !== undefined && (await replay.begin(snapshot.body, snapshot.journalId))) from = snapshot.journalId + 1;
  for await (const batch of store.readJournal(from)) for (const entry of batch) replay.take(entry);
  return { ...replay.result(), damagedSnapshots: damaged.length };
}

class Replay {
  readonly #store: Store;
  readonly #readPlant: PlantReader;
  readonly #reader = new BinaryFrameReader(storedLimits);
  readonly #names = new Map<number, string>();
  #monitor = new Monitor(emptyPlant, '');
  #plant: PlantNote | undefined;
  #lastId = 0;
  #replayed = 0;
  #records = 0;

  constructor(store: Store, readPlant: PlantReader) {
    this.#store = store;
    this.#readPlant = readPlant;
  }

  /** @returns whether the snapshot could be taken up; if not, the whole journal is to be replayed */
  async begin(body: Uint8Array, journalId: number): Promise<boolean> {
    const state = deserialize(body) as MonitorSnapshot;
    if (state.form !== snapshotForm) return false;
    const plant = await this.#plantAt(journalId);
    if (plant?.version !== state.plantVersion) return false;
    this.#plant = plant;
    this.#monitor = monitorFrom(this.#readPlant(plant.text, plant.version), plant.version, state);
    this.#lastId = journalId;
    return true;
  }

  take(entry: Entry): void {
    this.#lastId = entry.id;
    this.#replayed += 1;
    this.#records += entry.records;
    const at = entry.at as EpochMs;
    if (isKind(entry, 'frame')) this.#frame(entry);
    else if (isKind(entry, 'plant')) {
      this.#plant = noteOf(entry);
      this.#monitor.advance(at);
      this.#monitor = monitorFrom(this.#readPlant(this.#plant.text, this.#plant.version), this.#plant.version, snapshotOf(this.#monitor));
    } else if (isKind(entry, 'act')) this.#monitor.act(noteOf(entry), at);
    else if (isKind(entry, 'refused')) {
      const { stations, frames } = noteOf(entry);
      this.#monitor.noteRefused(stations, frames, at);
    } else this.#monitor.advance(at);
    this.#monitor.decisions(); // They are in the store already, in the same group as the entry.
  }

  result(): Omit<Recovered, 'damagedSnapshots'> {
    return { monitor: this.#monitor, lastId: this.#lastId, plant: this.#plant, replayed: this.#replayed, records: this.#records };
  }

  #frame(entry: Entry): void {
    const frame = this.#reader.read(entry.body);
    const name = this.#names.get(entry.sourceId ?? 0);
    if (!frame.ok || name === undefined) throw new Error(`journal entry ${entry.id} cannot be read: ${frame.ok ? 'its source is unknown' : frame.fault.sentence}`);
    this.#monitor.takeFrame(name, frame.value, this.#plant?.clock === 'records' ? undefined : (entry.at as EpochMs));
  }

  async learnNames(): Promise<void> {
    for (const source of await this.#store.sources.list()) this.#names.set(source.id, source.name);
  }

  async #plantAt(journalId: number): Promise<PlantNote | undefined> {
    const [newest] = await this.#store.entriesOf('plant', { before: journalId + 1, limit: 1 });
    return newest !== undefined && isKind(newest, 'plant') ? noteOf(newest) : undefined;
  }
}
