import { checkSource } from './source-check.ts';
import type { Source, SourceRegister, TokenGrant } from './source-register.ts';
import { hashOfToken, newToken } from './source-token.ts';
import { StoreError } from './store-error.ts';

/** Sources of a memory disk, by name; the hash of the token where it has one. */
export type KeptSources = Map<string, KeptSource>;

interface KeptSource {
  source: Source;
  hash: string | undefined;
  /** Of the token before the last renewal. */
  old: string | undefined;
}

const hashesOf = ({ source, hash, old }: KeptSource, at: number): string[] => [
  ...(hash === undefined ? [] : [hash]),
  ...(old === undefined || (source.oldUntil ?? 0) <= at ? [] : [old]),
];

const hexOf = (token: string): string => hashOfToken(token).toString('hex');

/** @param run how the store runs a call: refuses when closed, turns a throw into a rejection */
export function memoryRegister(kept: KeptSources, run: <T>(act: () => T) => Promise<T>): SourceRegister {
  const named = (name: string): KeptSource => {
    const found = kept.get(name);
    if (found === undefined) throw new StoreError('unknown-source', `name: no source is called ${JSON.stringify(name)}.`);
    return found;
  };
  const grant = (source: Source, old: string | undefined): TokenGrant => {
    const token = newToken();
    kept.set(source.name, { source, hash: hexOf(token), old });
    return { source, token };
  };
  return {
    add: ({ name, stations, products = [], at }) =>
      run(() => {
        checkSource(name, stations, products);
        if (kept.has(name)) throw new StoreError('name-taken', `name: ${name} is taken by another source (revoked ones keep theirs); choose another, or rotate its token.`);
        return grant({ id: kept.size + 1, name, stations: [...new Set(stations)], products: [...new Set(products)], created: at, lastUsed: undefined, revoked: undefined, oldUntil: undefined }, undefined);
      }),
    rotate: ({ name, oldUntil }) =>
      run(() => {
        const { source, hash } = named(name);
        return grant({ ...source, revoked: undefined, oldUntil }, oldUntil === undefined ? undefined : hash);
      }),
    revoke: (name, at) =>
      run(() => {
        const { source } = named(name);
        const revoked = { ...source, revoked: source.revoked ?? at, oldUntil: undefined };
        kept.set(name, { source: revoked, hash: undefined, old: undefined });
        return revoked;
      }),
    list: () => run(() => [...kept.values()].map(({ source }) => source).sort((a, b) => (a.name < b.name ? -1 : 1))),
    ofToken: (token, at) => run(() => [...kept.values()].find((one) => hashesOf(one, at).includes(hexOf(token)))?.source),
    heldHashes: (at) => run(() => [...kept.values()].flatMap((one) => hashesOf(one, at))),
    used: (id, at) =>
      run(() => {
        const found = [...kept.values()].find(({ source }) => source.id === id);
        if (found === undefined) throw new StoreError('unknown-source', `source: no source has the id ${id}.`);
        found.source = { ...found.source, lastUsed: at };
      }),
  };
}
