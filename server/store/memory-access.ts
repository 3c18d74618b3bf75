import { canonicalJson } from '../../core/access/canonical-json.ts';
import type { Change, RecordedChange } from '../../core/access/change.ts';
import type { AccessFile, AccessItem } from '../access/access-file.ts';
import { beginning, chainedHash } from './change-table.ts';
import { checkPage } from './query-check.ts';

/** Access data of a memory disk: items by kind and id, the record of changes in order. */
export interface KeptAccess {
  readonly items: Map<string, AccessItem>;
  readonly changes: RecordedChange[];
}

const keyOf = ({ kind, id }: Pick<AccessItem, 'kind' | 'id'>): string => JSON.stringify([kind, id]);

/** Adds to the record what the disk would have chained. */
export function keepChanges(kept: KeptAccess, changes: readonly Change[], at: number): void {
  for (const change of changes) {
    const last = kept.changes.at(-1);
    const id = (last?.id ?? 0) + 1;
    const hash = chainedHash(last === undefined ? beginning : Buffer.from(last.hash, 'hex'), canonicalJson({ id, at, ...change }));
    kept.changes.push({ ...change, id, at, hash: hash.toString('hex') });
  }
}

/** @param run how the store runs a call: refuses when closed, turns a throw into a rejection */
export function memoryAccess(kept: KeptAccess, run: <T>(act: () => T) => Promise<T>): AccessFile {
  return {
    items: () => run(() => [...kept.items.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, item]) => item)),
    write: ({ put = [], drop = [], changes = [] }) =>
      run(() => {
        for (const key of drop) kept.items.delete(keyOf(key));
        for (const item of put) kept.items.set(keyOf(item), item);
        keepChanges(kept, changes, Date.now());
      }),
    changes: (query) =>
      run(() => {
        checkPage(query);
        const { from, to, kind, holds = '', before = Number.MAX_SAFE_INTEGER, limit } = query;
        const wanted = (one: RecordedChange): boolean =>
          one.id < before && one.at >= from && one.at < to && (kind === undefined || one.kind === kind) &&
          `${one.who}\n${one.what}\n${one.why}`.toLowerCase().includes(holds.toLowerCase());
        return kept.changes.filter(wanted).reverse().slice(0, limit);
      }),
  };
}
