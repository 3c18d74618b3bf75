import type { WebSocket } from 'ws';
import type { SourceLimits } from '../../core/protocol/limits.ts';
import type { RefusalCode } from '../../core/protocol/refusals.ts';
import type { Refusal } from '../../core/record/refusal.ts';
import type { Sender } from '../pipeline/arrival.ts';
import type { PlantServer } from '../pipeline/plant-server.ts';
import { hashOfToken } from '../store/source-token.ts';
import type { Store } from '../store/store.ts';
import { everyStation } from './allowed-stations.ts';
import { SourceConnection } from './source-connection.ts';

export interface SourceDeskSetting {
  readonly plant: PlantServer;
  readonly store: Store;
  readonly limits: SourceLimits;
  /** For the operators' measures. */
  readonly frameRead: (records: number) => void;
  readonly frameRefused: (sender: Sender, refusal: Refusal | undefined) => void;
}

/** All sources connected now; one connection a source. */
export class SourceDesk {
  readonly #setting: SourceDeskSetting;
  readonly #connections = new Map<number, { readonly connection: SourceConnection; readonly sender: Sender }>();
  /** Refused frames since the last report, by source. */
  readonly #refused = new Map<number, { readonly sender: Sender; frames: number }>();

  constructor(setting: SourceDeskSetting) {
    this.#setting = setting;
  }

  get connected(): number {
    return this.#connections.size;
  }

  isConnected(sender: Pick<Sender, 'id'>): boolean {
    return this.#connections.has(sender.id);
  }

  /** Whose token this is, if it is one in force; notes that it was used. */
  async senderOf(token: string): Promise<Sender | undefined> {
    const { store, plant } = this.#setting;
    const source = await store.sources.ofToken(token, Date.now());
    if (source === undefined) return undefined;
    await store.sources.used(source.id, plant.now);
    return { id: source.id, name: source.name, stations: source.stations, products: source.products, tokenHash: hashOfToken(token).toString('hex') };
  }

  connect(socket: WebSocket, sender: Sender): void {
    this.#connections.get(sender.id)?.connection.end('replaced');
    const { plant, limits, frameRead } = this.#setting;
    const connection = new SourceConnection(socket, sender, {
      inbox: plant.inbox,
      limits,
      nextOf: (source) => plant.monitor.sources.nextOf(source),
      now: () => plant.now,
      frameRead,
      frameRefused: (refusal) => this.noteRefused(sender, refusal),
    });
    this.#connections.set(sender.id, { connection, sender });
    const leave = plant.flow.add(connection.reading);
    socket.on('close', () => {
      leave();
      if (this.#connections.get(sender.id)?.connection === connection) this.#connections.delete(sender.id);
    });
  }

  /** Ends connections whose token is not taken any more: revoked, renewed, or its overlap over; also by the command line. */
  async endWithdrawn(): Promise<void> {
    if (this.#connections.size === 0) return;
    const held = new Set(await this.#setting.store.sources.heldHashes(Date.now()));
    for (const { connection, sender } of this.#connections.values()) {
      if (sender.tokenHash !== undefined && !held.has(sender.tokenHash)) connection.end('token-unknown');
    }
  }

  /** A frame or upload of this source was refused: counted as bad data with the next report. */
  noteRefused(sender: Sender, refusal: Refusal | undefined): void {
    this.#setting.frameRefused(sender, refusal);
    const known = this.#refused.get(sender.id);
    if (known) known.frames += 1;
    else this.#refused.set(sender.id, { sender, frames: 1 });
  }

  /** Hands the refusals counted since the last time to the monitor, one entry a source, however many they were. */
  reportRefused(): void {
    for (const { sender, frames } of this.#refused.values()) {
      const stations = sender.stations.includes(everyStation) ? this.#everyStation() : sender.stations;
      this.#setting.plant.inbox.put({ kind: 'refused', sender: { ...sender, stations }, frames });
    }
    this.#refused.clear();
  }

  /** Ends every connection with a refusal. */
  end(code: RefusalCode): void {
    for (const { connection } of this.#connections.values()) connection.end(code);
  }

  /** Makes durable and answers what was received, then tells the sources that the server stops. */
  async stop(reason: string): Promise<void> {
    for (const { connection } of this.#connections.values()) connection.takeNoMore();
    if (this.#setting.store.condition.kind === 'open') {
      this.reportRefused();
      await this.#setting.plant.settled().catch(() => undefined); // A failure has been told already, and nothing more can be made durable.
    }
    for (const { connection } of this.#connections.values()) connection.stopping(reason);
  }

  #everyStation(): readonly string[] {
    return this.#setting.plant.monitor.plant.lines.flatMap(({ stations }) => stations.map(({ id }) => id));
  }
}
