import { Subscription } from 'rxjs';
import type { Logger } from 'pino';
import type { Act, ActFault } from '../../core/monitor/act.ts';
import type { Monitor } from '../../core/monitor/monitor.ts';
import type { PlantClock } from '../clock/plant-clock.ts';
import { Flow } from '../ingest/flow.ts';
import { plantOfChecked, type PlantFileText } from '../plant-file.ts';
import type { Store } from '../store/store.ts';
import { Inbox } from './inbox.ts';
import { Judge, type Outcome } from './judge.ts';
import { throughPlant } from './pipeline.ts';
import { recover, snapshotBytes } from './recover.ts';

const mebibyte = 1_048_576;

export interface PlantServerSetting {
  readonly store: Store;
  readonly plant: PlantFileText;
  /** undefined: the plant clock follows the records. */
  readonly clock: PlantClock | undefined;
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
  #snapshotId = 0;
  #fail: (cause: Error) => void = () => undefined;
  /** Rejects when nothing can be made durable any more. */
  readonly #failed: Promise<never>;

  // Started by `start` alone.
  private constructor(setting: PlantServerSetting, judge: Judge) {
    this.#setting = setting;
    this.#judge = judge;
    const { store, onOutcome, onFailure } = setting;
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
        error: (cause: unknown) => {
          this.#fail(cause as Error);
          onFailure(cause as Error);
        },
      }),
    );
    this.#running.add(this.inbox.arrivals$.subscribe(() => this.flow.weigh(store.waitingBytes)));
  }

  /** Brings back the stored state and takes up the plant file, if it is another one than stored. */
  static async start(setting: PlantServerSetting): Promise<PlantServer> {
    const { store, plant, clock, log } = setting;
    const recovered = await recover(store, plantOfChecked);
    const { monitor, lastId, replayed, records, damagedSnapshots } = recovered;
    if (damagedSnapshots > 0) log.warn({ damagedSnapshots }, 'newer snapshots could not be read; an older state was brought up to date from the journal');
    log.info({ entries: replayed, records, lastId }, 'state brought back');
    const server = new PlantServer(setting, new Judge(monitor, lastId, clock, plantOfChecked));
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
  usePlant({ text, version }: PlantFileText): Promise<void> {
    return this.#unlessFailed((done) => this.inbox.put({ kind: 'plant', text, version, done }));
  }

  act(act: Act): Promise<ActFault | undefined> {
    return this.#unlessFailed((done) => this.inbox.put({ kind: 'act', act, done }));
  }

  /** Resolves when everything that came before is durable. */
  settled(): Promise<void> {
    return this.#unlessFailed((done) => this.inbox.put({ kind: 'barrier', done }));
  }

  /** Keeps the whole state, if anything came since the last time. */
  async keepSnapshot(): Promise<void> {
    const { lastId } = this.#judge;
    if (lastId === this.#snapshotId) return;
    this.#snapshotId = lastId;
    await this.#setting.store.keepSnapshot({ journalId: lastId, at: this.now, body: snapshotBytes(this.monitor) });
  }

  /** Takes nothing more, makes durable what came, keeps the state. After a failure there is nothing left to do. */
  async stop(): Promise<void> {
    if (this.#setting.store.condition.kind === 'open') {
      await this.settled();
      await this.keepSnapshot();
    }
    this.inbox.close();
    this.#running.unsubscribe();
  }

  /** @throws the failure, where one comes before the arrival is answered */
  #unlessFailed<T>(put: (done: (answer: T) => void) => void): Promise<T> {
    return Promise.race([new Promise<T>((resolve) => put(resolve)), this.#failed]);
  }
}
