import type { Entry } from './entry.ts';
import { unpackEntries, type PackedEntries } from './packed-entries.ts';

/** Batches of the journal in order; the next one is asked for before the present one is handed out. */
export async function* journalBatches(fromId: number, read: (fromId: number) => Promise<PackedEntries>): AsyncGenerator<readonly Entry[], void, undefined> {
  let coming = read(fromId);
  for (;;) {
    const entries = unpackEntries(await coming);
    const newest = entries.at(-1);
    if (newest === undefined) return;
    coming = read(newest.id + 1);
    // Should the reader of the batches stop here, nobody awaits the next one: its failure is nobody's.
    coming.catch(() => undefined);
    yield entries;
  }
}
