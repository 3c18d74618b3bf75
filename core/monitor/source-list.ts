import { SourceLedger, type LedgerSnapshot } from './source-ledger.ts';

export type SourceListSnapshot = readonly (LedgerSnapshot & { readonly name: string })[];

interface Known {
  readonly index: number;
  readonly ledger: SourceLedger;
}

/** The sources a monitor has heard of, in the order in which it did; their indexes are used inside windows. */
export class SourceList {
  readonly #names: string[] = [];
  readonly #known = new Map<string, Known>();

  of(name: string): Known {
    const known = this.#known.get(name);
    if (known) return known;
    const added = { index: this.#names.length, ledger: new SourceLedger() };
    this.#names.push(name);
    this.#known.set(name, added);
    return added;
  }

  /** The sequence a source is to send next; 1 for one never heard. */
  nextOf(name: string): number {
    return this.#known.get(name)?.ledger.next ?? 1;
  }

  nameOf(index: number): string {
    return this.#names[index] ?? '';
  }

  snapshot(): SourceListSnapshot {
    return this.#names.map((name) => ({ name, ...this.of(name).ledger.snapshot() }));
  }

  restore(from: SourceListSnapshot): void {
    for (const { name, ...ledger } of from) this.of(name).ledger.restore(ledger);
  }
}
