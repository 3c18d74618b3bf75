import { Subscription } from 'rxjs';
import type { Logger } from 'pino';
import type { Act, ActFault } from '../../core/monitor/act.ts';
import type { Monitor } from '../../core/monitor/monitor.ts';
import type { PlantClock } from '../clock/plant-clock.ts';
import { Flow } from '../ingest/flow.ts';
import { plantOfChecked, type PlantFileText } from '../plant-file.ts';
import type { Store } from '../store/store.ts';
import { Inbox } from './inbox.ts';
import { Judge, type Outcome, type PlantReader } from './judge.ts';
import { throughPlant } from './pipeline.ts';
import { recover, snapshotBytes } from './recover.ts';

const mebibyte = 1_048_576;

export interface PlantServerSetting {
  readonly store: Store;
  readonly plant: PlantFileText;
  /** undefined: the plant clock follows the records. */
  readonly clock: PlantClock | undefined;
  /** Journal entries after which a snapshot is kept, whatever the time: 1 or more. */
  readonly snapshotEntries: number;
  readonly log: Logger;
  /** Told what became durable, in order. */
  readonly onOutcome: (outcome: Outcome) => void;
  /** Told once if nothing can be made durable any more. */
  readonly onFailure: (cause: Error) => void;
}

/** The monitor with its inbox and its store: everything between the sockets and the disk. */
export class PlantServer {
  readonly inbox = new Inbox();
  readonly flow = new Flow(32 * mebibyte, 8 * mebibyte);
  readonly #setting: PlantServerSetting;
  readonly #judge: Judge;
  readonly #running = new Subscription();
  #snapshotId: number;
  #snapshotUnderWay = false;
  #givenUp = false;
  #fail: (cause: Error) => void = () => undefined;
  /** Rejects when nothing can be made durable any more. */
  readonly #failed: Promise<never>;

  // Started by `start` alone.
  private constructor(setting: PlantServerSetting, judge: Judge, snapshotId: number) {
    this.#setting = setting;
    this.#judge = judge;
    this.#snapshotId = snapshotId;
    const { store, onOutcome } = setting;
    this.#failed = new Promise((_resolve, reject) => {
      this.#fail = reject;
    });
    this.#failed.catch(() => undefined); // Told by onFailure as well: nobody has to wait for it.
    this.#running.add(
      throughPlant(this.inbox.arrivals$, judge, store).subscribe({
        next: (outcome) => {
          this.flow.weigh(store.waitingBytes);
          onOutcome(outcome);
        },
        error: (cause: unknown) => this.giveUp(cause as Error),
      }),
    );
    this.#running.add(
      this.inbox.arrivals$.subscribe(() => {
        this.flow.weigh(store.waitingBytes);
        this.#keepSnapshotIfMuch();
      }),
    );
  }

  /** Brings back the stored state and takes up the plant file, if it is another one than stored. */
  static async start(setting: PlantServerSetting): Promise<PlantServer> {
    const { store, plant, clock, log } = setting;
    // A large plant file takes longer to read than a snapshot: the one in hand is not read again.
    const readPlant: PlantReader = (text, version) => (version === plant.version ? plant.plant : plantOfChecked(text, version));
    const recovered = await recover(store, readPlant);
    const { monitor, lastId, replayed, records, damagedSnapshots } = recovered;
    if (damagedSnapshots > 0) log.warn({ damagedSnapshots }, 'newer snapshots could not be read; an older state was brought up to date from the journal');
    log.info({ entries: replayed, records, lastId }, 'state brought back');
    const server = new PlantServer(setting, new Judge(monitor, lastId, clock, readPlant), lastId - replayed);
    const follows = clock ? 'time' : 'records';
    if (recovered.plant?.version !== plant.version || recovered.plant.clock !== follows) await server.usePlant(plant);
    return server;
  }

  get monitor(): Monitor {
    return this.#judge.monitor;
  }

  /** The plant clock now, ms. */
  get now(): number {
    return this.#judge.now;
  }

  /** Takes up another plant file; resolves when that is durable. */
  usePlant({ text, version }: PlantFileText, who = 'server', why = ''): Promise<void> {
    return this.#unlessFailed((done) => this.inbox.put({ kind: 'plant', text, version, who, why, done }));
  }

  act(act: Act): Promise<ActFault | undefined> {
    return this.#unlessFailed((done) => this.inbox.put({ kind: 'act', act, done }));
  }

  /** Resolves when everything that came before is durable. */
  settled(): Promise<void> {
    return this.#unlessFailed((done) => this.inbox.put({ kind: 'barrier', done }));
  }

  /** Nothing can be made durable any more: tells whoever waits, once. */
  giveUp(cause: Error): void {
    if (this.#givenUp) return;
    this.#givenUp = true;
    this.#fail(cause);
    this.#setting.onFailure(cause);
  }

  /** Keeps the whole state, if anything came since the last time. */
  async keepSnapshot(): Promise<void> {
    const { lastId } = this.#judge;
    if (lastId === this.#snapshotId) return;
    this.#snapshotId = lastId;
    await this.#setting.store.keepSnapshot({ journalId: lastId, at: this.now, body: snapshotBytes(this.monitor) });
  }

  /** Between two batches the monitor's state is that of the newest entry; one snapshot at a time. */
  #keepSnapshotIfMuch(): void {
    const { store, snapshotEntries, log } = this.#setting;
    if (this.#snapshotUnderWay || this.#judge.lastId - this.#snapshotId < snapshotEntries || store.condition.kind !== 'open') return;
    this.#snapshotUnderWay = true;
    this.keepSnapshot()
      .catch((cause: unknown) => log.error({ err: cause }, 'a snapshot was not kept'))
      .finally(() => {
        this.#snapshotUnderWay = false;
      });
  }

  /** Takes nothing more, makes durable what came, keeps the state. After a failure there is nothing left to do. */
  async stop(): Promise<void> {
    if (this.#setting.store.condition.kind === 'open') {
      await this.#settledAndKept().catch((cause: unknown) => this.#setting.log.error({ err: cause }, 'the state was not kept'));
    }
    this.inbox.close();
    this.#running.unsubscribe();
  }

  async #settledAndKept(): Promise<void> {
    await this.settled();
    await this.keepSnapshot();
  }

  /** @throws the failure, where one comes before the arrival is answered */
  #unlessFailed<T>(put: (done: (answer: T) => void) => void): Promise<T> {
    return Promise.race([new Promise<T>((resolve) => put(resolve)), this.#failed]);
  }
}
