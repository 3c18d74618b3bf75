import type { CommitCalls } from './commit-calls.ts';
import { packGroups, type WaitingGroup } from './packed-group.ts';
import type { Snapshot } from './store.ts';
import type { Calls } from './worker-answers.ts';
import type { WorkerChannel } from './worker-channel.ts';

/** Transactions given to the thread at once: one it works on and one it finds ready when that is done. */
const mostUnderWay = 2;

interface Settle {
  readonly resolve: () => void;
  readonly reject: (cause: unknown) => void;
}

type Waiting = Settle & ({ readonly kind: 'group'; readonly group: WaitingGroup } | { readonly kind: 'snapshot'; readonly snapshot: Snapshot });

/** The part of the channel that is needed to commit. */
export type Committing = Pick<WorkerChannel<CommitCalls & Calls>, 'call'>;

export interface CommitLimits {
  readonly groupBytes: number;
  readonly groupEntries: number;
}

/** Groups and snapshots on their way to the committing thread, in order; groups that wait share a transaction. */
export class CommitQueue {
  readonly #channel: Committing;
  readonly #limits: CommitLimits;
  readonly #waiting: Waiting[] = [];
  #underWay = 0;
  #waitingBytes = 0;
  /** The newest group or snapshot given; all before it are settled when it is. */
  #last: Promise<void> | undefined;

  constructor(channel: Committing, limits: CommitLimits) {
    this.#channel = channel;
    this.#limits = limits;
  }

  /** Bytes of what is not durable yet, with what is under way. */
  get waitingBytes(): number {
    return this.#waitingBytes;
  }

  /** Resolves when nothing is under way or waits any more, whatever became of it. */
  async idle(): Promise<void> {
    while (this.#last !== undefined) {
      const last = this.#last;
      await last.catch(() => undefined);
      if (this.#last === last) this.#last = undefined;
    }
  }

  commit(group: WaitingGroup): Promise<void> {
    return this.#add(group.bytes, (settle) => ({ kind: 'group', group, ...settle }));
  }

  keepSnapshot(snapshot: Snapshot): Promise<void> {
    return this.#add(snapshot.body.length, (settle) => ({ kind: 'snapshot', snapshot, ...settle }));
  }

  #add(bytes: number, waiting: (settle: Settle) => Waiting): Promise<void> {
    this.#waitingBytes += bytes;
    const settled = new Promise<void>((resolve, reject) => this.#waiting.push(waiting({ resolve, reject })));
    this.#send();
    this.#last = settled.finally(() => {
      this.#waitingBytes -= bytes;
    });
    return this.#last;
  }

  #send(): void {
    while (this.#underWay < mostUnderWay && this.#waiting.length > 0) {
      const batch = this.#next();
      this.#underWay += 1;
      void this.#post(batch).then(
        () => this.#done(batch, (waiting) => waiting.resolve()),
        (cause: unknown) => this.#done(batch, (waiting) => waiting.reject(cause)),
      );
    }
  }

  #done(batch: readonly Waiting[], settle: (waiting: Waiting) => void): void {
    this.#underWay -= 1;
    batch.forEach(settle);
    this.#send();
  }

  /** One snapshot, or the groups before the next snapshot as far as one transaction may grow. */
  #next(): readonly Waiting[] {
    let bytes = 0;
    let entries = 0;
    let count = 0;
    for (const waiting of this.#waiting) {
      if (waiting.kind === 'snapshot') break;
      bytes += waiting.group.bytes;
      entries += waiting.group.entries.length;
      if (count > 0 && (bytes > this.#limits.groupBytes || entries > this.#limits.groupEntries)) break;
      count += 1;
    }
    return this.#waiting.splice(0, Math.max(1, count));
  }

  async #post(batch: readonly Waiting[]): Promise<void> {
    const groups: WaitingGroup[] = [];
    for (const waiting of batch) {
      if (waiting.kind === 'snapshot') return this.#channel.call('keepSnapshot', waiting.snapshot, [waiting.snapshot.body.buffer]);
      groups.push(waiting.group);
    }
    const packed = packGroups(groups);
    return this.#channel.call('commit', packed, [packed.entries.figures.buffer, packed.entries.bodies.buffer]);
  }
}
