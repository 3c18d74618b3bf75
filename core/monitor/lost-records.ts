import type { Hole } from './source-ledger.ts';

interface Loss extends Hole {
  readonly source: number;
  /** Position of the evidence, and the plant clock, when the loss was declared. */
  readonly position: number;
  readonly at: number;
}

export type LostRecordsSnapshot = readonly Loss[];

/** Records declared lost that would belong to the present window of one guarantee. */
export class LostRecords {
  #losses: Loss[] = [];

  get records(): number {
    return this.#losses.reduce((sum, loss) => sum + loss.last - loss.first + 1, 0);
  }

  get none(): boolean {
    return this.#losses.length === 0;
  }

  declare(source: number, first: number, records: number, position: number, at: number): void {
    this.#losses.push({ source, first, last: first + records - 1, position, at });
  }

  /** Late records came after all. */
  fill(source: number, first: number, records: number): void {
    const last = first + records - 1;
    this.#losses = this.#losses.flatMap((loss) => {
      if (loss.source !== source || last < loss.first || first > loss.last) return [loss];
      const rest: Loss[] = [];
      if (loss.first < first) rest.push({ ...loss, last: first - 1 });
      if (last < loss.last) rest.push({ ...loss, first: last + 1 });
      return rest;
    });
  }

  /** Forgets losses that a window of the last units or of the last time has left behind. */
  forget(beforePosition: number, beforeAt: number): void {
    if (this.none) return;
    this.#losses = this.#losses.filter((loss) => loss.position > beforePosition && loss.at > beforeAt);
  }

  /** When the oldest of them was declared, ms; Infinity without one. */
  get oldestAt(): number {
    return this.#losses[0]?.at ?? Infinity;
  }

  clear(): void {
    this.#losses = [];
  }

  snapshot(): LostRecordsSnapshot {
    return [...this.#losses];
  }

  restore(from: LostRecordsSnapshot): void {
    this.#losses = [...from];
  }
}
