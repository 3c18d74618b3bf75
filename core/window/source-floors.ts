/** Plain copy of the floors: [source, sequence] pairs, by source. */
export interface SourceFloorsSnapshot {
  readonly newest: ReadonlyArray<readonly [source: number, sequence: number]>;
  readonly floors: ReadonlyArray<readonly [source: number, sequence: number]>;
}

/**
 * What each source had sent when the evidence was restarted. A late record at or below its source's floor was
 * inspected before the restart and must not count after it.
 */
export class SourceFloors {
  readonly #newest = new Map<number, number>();
  #floors = new Map<number, number>();

  /** Notes that a record of the source came. */
  note(source: number, sequence: number): void {
    if (!((this.#newest.get(source) ?? -1) >= sequence)) this.#newest.set(source, sequence);
  }

  /** Restart: everything noted so far lies below, and everything in `seen` (marks have sequences, too). */
  raise(seen: Iterable<readonly [source: number, sequence: number]>): void {
    for (const [source, sequence] of seen) this.note(source, sequence);
    this.#floors = new Map(this.#newest);
  }

  /** Whether the record came, or would have come, before the last restart. */
  covers(source: number, sequence: number): boolean {
    return this.#floors.size > 0 && sequence <= (this.#floors.get(source) ?? 0);
  }

  snapshot(): SourceFloorsSnapshot {
    const bySource = (pairs: Map<number, number>): [number, number][] => [...pairs].sort((a, b) => a[0] - b[0]);
    return { newest: bySource(this.#newest), floors: bySource(this.#floors) };
  }

  restore(snapshot: SourceFloorsSnapshot): void {
    this.#newest.clear();
    for (const [source, sequence] of snapshot.newest) this.#newest.set(source, sequence);
    this.#floors = new Map(snapshot.floors);
  }
}
