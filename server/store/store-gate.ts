import type { Group } from './group.ts';
import { StoreError } from './store-error.ts';
import type { StoreCondition } from './store.ts';

/** Whether a store takes groups, and which ids it may still take; the same rules for every store. */
export class StoreGate {
  /** Newest id given to the store. */
  #given: number;
  #condition: StoreCondition = { kind: 'open' };
  readonly #onRefused: ((error: StoreError) => void) | undefined;

  constructor(lastId: number, onRefused: ((error: StoreError) => void) | undefined) {
    this.#given = lastId;
    this.#onRefused = onRefused;
  }

  get condition(): StoreCondition {
    return this.#condition;
  }

  /** @returns why nothing can be taken or read; undefined while the store is open */
  closed(): StoreError | undefined {
    return this.#condition.kind === 'closed' ? new StoreError('closed', 'The store is closed.') : undefined;
  }

  /** @throws StoreError 'closed', 'refused' */
  checkOpen(): void {
    const closed = this.closed();
    if (closed !== undefined) throw closed;
    if (this.#condition.kind === 'refused') {
      throw new StoreError('refused', `An earlier write failed (${this.#condition.error.message}): nothing is taken until the server is started again.`);
    }
  }

  /** @throws StoreError 'closed', 'refused', 'not-rising' */
  checkGroup({ entries }: Group): void {
    this.checkOpen();
    let last = this.#given;
    for (const { id } of entries) {
      if (!(Number.isSafeInteger(id) && id > last)) {
        throw new StoreError('not-rising', `Journal id ${id} after ${last}: expected a whole number above it.`);
      }
      last = id;
    }
    this.#given = last;
  }

  /** @throws StoreError 'closed', 'refused', 'not-rising' */
  checkSnapshot(journalId: number): void {
    this.checkOpen();
    if (!(Number.isSafeInteger(journalId) && journalId >= 0 && journalId <= this.#given)) {
      throw new StoreError('not-rising', `Snapshot of journal id ${journalId}: expected a whole number from 0 to ${this.#given}, the newest entry.`);
    }
  }

  refuse(error: StoreError): void {
    if (this.#condition.kind !== 'open') return;
    this.#condition = { kind: 'refused', error };
    this.#onRefused?.(error);
  }

  close(): void {
    this.#condition = { kind: 'closed' };
  }
}
