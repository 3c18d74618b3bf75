import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Entry } from '../../../server/store/entry.ts';
import { hashOfToken } from '../../../server/store/source-token.ts';
import { StoreError, type StoreFault } from '../../../server/store/store-error.ts';
import type { Store, StoreOptions } from '../../../server/store/store.ts';
import { alarm, ended, entries, entry, evidence, group, minute, morning } from './examples.ts';

/** A place where stores can be opened one after the other. */
export interface StorePlace {
  open(options?: StoreOptions): Promise<Store>;
  /** Ends what is still open and clears the place away. */
  clear(): Promise<void>;
}

export const withFault = (fault: StoreFault): unknown => expect.objectContaining({ constructor: StoreError, fault });

export async function allEntries(store: Store, fromId = 1, batchBytes?: number): Promise<Entry[]> {
  const all: Entry[] = [];
  for await (const batch of store.readJournal(fromId, batchBytes)) all.push(...batch);
  return all;
}

const day = { from: morning, to: morning + 86_400_000 };

/** What every store promises. */
export function storeContract(name: string, makePlace: () => StorePlace): void {
  describe(name, () => {
    let place: StorePlace;
    let store: Store;
    beforeEach(async () => {
      place = makePlace();
      store = await place.open();
    });
    afterEach(() => place.clear());
    const reopen = async (): Promise<void> => {
      await store.close();
      store = await place.open();
    };

    it('starts empty', async () => {
      expect(store.lastId).toBe(0);
      expect(store.condition).toEqual({ kind: 'open' });
      expect(await store.newestSnapshot()).toEqual({ snapshot: undefined, damaged: [] });
      expect(await allEntries(store)).toEqual([]);
      expect(await store.openAlarms()).toEqual([]);
      expect(await store.sources.list()).toEqual([]);
    });

    it('keeps access data and the record of changes together, over a restart', async () => {
      const made = { kind: 'account', who: 'Ines', what: 'account mette', before: null, after: { roles: ['viewer'] }, why: 'new in maintenance', entry: null } as const;
      await store.access.write({ put: [{ kind: 'account', id: 'mette', body: '{"n":1}' }, { kind: 'session', id: 's', body: '{}' }], changes: [made, { ...made, kind: 'invitation', who: 'Olaf', why: '' }] });
      await store.access.write({ put: [{ kind: 'account', id: 'mette', body: '{"n":2}' }], drop: [{ kind: 'session', id: 's' }], changes: [{ ...made, what: 'account olaf' }] });
      await reopen();
      expect(await store.access.items()).toEqual([{ kind: 'account', id: 'mette', body: '{"n":2}' }]);
      const all = { from: 0, to: Number.MAX_SAFE_INTEGER, limit: 10 };
      const found = await store.access.changes(all);
      expect(found.map(({ id, kind }) => [id, kind])).toEqual([[3, 'account'], [2, 'invitation'], [1, 'account']]);
      expect(found[2]).toMatchObject({ ...made, hash: expect.stringMatching(/^[0-9a-f]{64}$/) as string });
      expect((await store.access.changes({ ...all, kind: 'invitation' })).map(({ id }) => id)).toEqual([2]);
      expect((await store.access.changes({ ...all, holds: 'MAINTENANCE' })).map(({ id }) => id)).toEqual([3, 1]);
      expect((await store.access.changes({ ...all, before: 3, limit: 1 })).map(({ id }) => id)).toEqual([2]);
      expect(await store.access.changes({ ...all, to: 1 })).toEqual([]);
      await expect(store.access.changes({ ...all, limit: 0 })).rejects.toEqual(withFault('bad-request'));
    });

    it('gives entries back in order, whole, after a restart', async () => {
      const kept = [
        entry(1, { kind: 'plant', sourceId: undefined, firstSequence: undefined, records: 0, body: new TextEncoder().encode('lines: []') }),
        ...entries(2, 6),
        entry(9, { kind: 'tick', sourceId: undefined, firstSequence: undefined, records: 0, body: new Uint8Array() }),
        entry(10, { kind: 'act', firstSequence: undefined }),
        entry(11, { kind: 'refused', firstSequence: Number.MAX_SAFE_INTEGER }),
      ];
      await Promise.all([store.commit(group({ entries: kept.slice(0, 4) })), store.commit(group({ entries: kept.slice(4) }))]);
      expect(store.lastId).toBe(11);
      await reopen();
      expect(store.lastId).toBe(11);
      expect(await allEntries(store)).toEqual(kept);
      expect(await allEntries(store, 7)).toEqual(kept.slice(6));
    });

    it('resolves commits in the order of the calls and owes nothing afterwards', async () => {
      const order: number[] = [];
      await Promise.all(entries(1, 200).map((one) => store.commit(group({ entries: [one] })).then(() => order.push(one.id))));
      expect(order).toEqual(entries(1, 200).map(({ id }) => id));
      expect(store.waitingBytes).toBe(0);
    });

    it('refuses ids that do not rise, keeps nothing of that group and stays open', async () => {
      await store.commit(group({ entries: entries(1, 3) }));
      for (const wrong of [[entry(3)], [entry(4), entry(4)], [entry(4.5)], [entry(NaN)]]) {
        await expect(store.commit(group({ entries: wrong }))).rejects.toEqual(withFault('not-rising'));
      }
      await store.commit(group({ entries: [entry(4)] }));
      expect((await allEntries(store)).map(({ id }) => id)).toEqual([1, 2, 3, 4]);
    });

    it('lists rare entries newest first, in pages', async () => {
      await store.commit(group({ entries: [...entries(1, 3), entry(4, { kind: 'plant' }), entry(5, { kind: 'act' }), entry(6, { kind: 'plant' }), entry(7)] }));
      expect((await store.entriesOf('plant', { limit: 10 })).map(({ id }) => id)).toEqual([6, 4]);
      expect(await store.entriesOf('plant', { limit: 1, before: 6 })).toEqual([entry(4, { kind: 'plant' })]);
      await expect(store.entriesOf('act', { limit: 0 })).rejects.toEqual(withFault('bad-request'));
    });

    it('finds happenings by time, guarantee, kind and page, newest first', async () => {
      const told = [
        { journalId: 1, happening: evidence('leak-a', morning) },
        { journalId: 1, happening: { kind: 'alarm' as const, at: evidence('', morning + 1).at, change: 'raised' as const, alarm: alarm(1) } },
        { journalId: 2, happening: evidence('flaws-b', morning + 2) },
        { journalId: 3, happening: evidence('leak-a', morning + 3) },
      ];
      await store.commit(group({ entries: entries(1, 3), happenings: told }));
      await reopen();
      const all = await store.happenings({ ...day, limit: 10 });
      expect(all.map(({ journalId, happening }) => ({ journalId, happening }))).toEqual([...told].reverse());
      const ids = async (query: object): Promise<number[]> => (await store.happenings({ ...day, limit: 10, ...query })).map(({ happening }) => happening.at - morning);
      expect(await ids({ guarantee: 'leak-a' })).toEqual([3, 1, 0]);
      expect(await ids({ guarantee: 'leak-a', kind: 'evidence' })).toEqual([3, 0]);
      expect(await ids({ from: morning + 1, to: morning + 3 })).toEqual([2, 1]);
      expect(await ids({ limit: 2, before: all[1]!.id })).toEqual([1, 0]);
      await expect(ids({ from: 5, to: 5 })).rejects.toEqual(withFault('bad-request'));
    });

    it('keeps the newest form of each alarm', async () => {
      await store.commit(group({ alarms: [alarm(1), alarm(2), alarm(3)] }));
      await store.commit(group({ alarms: [alarm(2, ended), alarm(4)] }));
      await store.commit(group({ alarms: [alarm(1, ended), alarm(3, { kind: 'returned', returnedAt: morning })] }));
      await reopen();
      expect(await store.openAlarms()).toEqual([alarm(3, { kind: 'returned', returnedAt: morning }), alarm(4)]);
      expect(await store.endedAlarms({ limit: 10 })).toEqual([alarm(2, ended), alarm(1, ended)]);
      expect(await store.endedAlarms({ limit: 10, before: 2 })).toEqual([alarm(1, ended)]);
    });

    it('adds to minutes what was counted and replaces what was computed', async () => {
      await store.commit(group({ minutes: [minute('leak-a', 0), minute('leak-a', 0, { inspected: 50, bound: 0.5 }), minute('leak-b', 0)] }));
      await store.commit(group({ minutes: [minute('leak-a', 0, { inspected: 7.5, nonconforming: 0, estimate: NaN, bound: undefined, opposite: 0.1, state: 'unknown' })] }));
      expect(await store.history({ ...day, guarantee: 'leak-a', points: 10_000 })).toEqual({
        guarantee: 'leak-a',
        ...day,
        stepMs: 60_000,
        at: [morning],
        inspected: [157.5],
        nonconforming: [2],
        estimate: [null],
        bound: [null],
        opposite: [0.1],
        state: ['unknown'],
      });
    });

    it('tells a history in at most so many steps', async () => {
      const minutes = [0, 1, 2, 3, 4, 9, 10].map((ofShift) => minute('leak-a', ofShift, { bound: ofShift }));
      await store.commit(group({ minutes }));
      const told = await store.history({ guarantee: 'leak-a', from: morning + 59_999, to: morning + 10 * 60_000, points: 3 });
      expect(told).toMatchObject({ from: morning, stepMs: 240_000, at: [0, 240_000, 480_000].map((ms) => morning + ms) });
      expect(told).toMatchObject({ inspected: [400, 100, 100], bound: [3, 4, 9], opposite: [null, null, null] });
      await expect(store.history({ ...day, guarantee: 'leak-a', points: 0 })).rejects.toEqual(withFault('bad-request'));
    });

    it('keeps the two newest snapshots', async () => {
      await store.commit(group({ entries: entries(1, 9) }));
      for (const journalId of [0, 3, 9, 9]) await store.keepSnapshot({ journalId, at: morning + journalId, body: new Uint8Array([journalId, 1]) });
      await reopen();
      expect(await store.newestSnapshot()).toEqual({ snapshot: { journalId: 9, at: morning + 9, body: new Uint8Array([9, 1]) }, damaged: [] });
      await expect(store.keepSnapshot({ journalId: 10, at: morning, body: new Uint8Array() })).rejects.toEqual(withFault('not-rising'));
    });

    it('knows sources by their token alone', async () => {
      const { source, token } = await store.sources.add({ name: 'leak-tester-a', stations: ['leak-a', 'leak-a', 'final-a'], at: morning });
      expect(source).toEqual({ id: 1, name: 'leak-tester-a', stations: ['leak-a', 'final-a'], products: [], created: morning, lastUsed: undefined, revoked: undefined, oldUntil: undefined });
      expect(token).toMatch(/^vouchline_[\w-]{43}$/);
      expect(await store.sources.ofToken(token, morning)).toEqual(source);
      expect(await store.sources.ofToken(`${token.slice(0, -2)}zz`, morning)).toBeUndefined();
      await store.sources.used(1, morning + 5);
      expect(await store.sources.list()).toEqual([{ ...source, lastUsed: morning + 5 }]);
    });

    it('replaces and revokes tokens, and brings a revoked source back', async () => {
      const first = await store.sources.add({ name: 'filler', stations: ['fill'], at: morning });
      const second = await store.sources.rotate({ name: 'filler' });
      expect(second.token).not.toBe(first.token);
      expect(await store.sources.ofToken(first.token, morning)).toBeUndefined();
      expect(await store.sources.ofToken(second.token, morning)).toEqual(first.source);
      expect(await store.sources.revoke('filler', morning + 1)).toEqual({ ...first.source, revoked: morning + 1 });
      expect(await store.sources.revoke('filler', morning + 2)).toMatchObject({ revoked: morning + 1 });
      expect(await store.sources.ofToken(second.token, morning)).toBeUndefined();
      await expect(store.sources.add({ name: 'filler', stations: ['fill'], at: morning })).rejects.toEqual(withFault('name-taken'));
      const third = await store.sources.rotate({ name: 'filler' });
      await reopen();
      expect(await store.sources.ofToken(third.token, morning)).toEqual(first.source);
    });

    it('takes the old token beside the new one until its time is over, and neither after a revocation', async () => {
      const first = await store.sources.add({ name: 'filler', stations: ['fill'], products: ['FK-250'], at: morning });
      const second = await store.sources.rotate({ name: 'filler', oldUntil: morning + 10 });
      expect(second.source).toMatchObject({ products: ['FK-250'], oldUntil: morning + 10 });
      expect([await store.sources.ofToken(first.token, morning + 9), await store.sources.ofToken(first.token, morning + 10)]).toEqual([second.source, undefined]);
      expect(await store.sources.ofToken(second.token, morning + 10)).toEqual(second.source);
      const hash = (token: string): string => hashOfToken(token).toString('hex');
      expect([...(await store.sources.heldHashes(morning + 9))].sort()).toEqual([hash(first.token), hash(second.token)].sort());
      expect(await store.sources.heldHashes(morning + 10)).toEqual([hash(second.token)]);
      await store.sources.revoke('filler', morning + 5);
      expect([await store.sources.heldHashes(morning), await store.sources.ofToken(first.token, morning)]).toEqual([[], undefined]);
    });

    it('says what is wrong with a source', async () => {
      await expect(store.sources.add({ name: 'two words', stations: ['fill'], at: 0 })).rejects.toThrow('name: "two words", expected 1 to 64 letters');
      await expect(store.sources.add({ name: 'filler', stations: [], at: 0 })).rejects.toThrow('stations: none given');
      await expect(store.sources.add({ name: 'filler', stations: [''], at: 0 })).rejects.toThrow('station: "", expected');
      await expect(store.sources.rotate({ name: 'nobody' })).rejects.toEqual(withFault('unknown-source'));
      await expect(store.sources.revoke('nobody', 0)).rejects.toEqual(withFault('unknown-source'));
      await expect(store.sources.used(5, 0)).rejects.toEqual(withFault('unknown-source'));
    });

    it('[D3] lets one server in at a time', async () => {
      await expect(place.open()).rejects.toEqual(withFault('in-use'));
      await store.commit(group({ entries: [entry(1)] }));
      await reopen();
      expect(store.lastId).toBe(1);
    });

    it('makes durable what was given before it closes, and takes nothing after', async () => {
      const given = store.commit(group({ entries: entries(1, 500) }));
      await Promise.all([given, store.close(), store.close()]);
      expect(store.condition).toEqual({ kind: 'closed' });
      await expect(store.commit(group())).rejects.toEqual(withFault('closed'));
      await expect(store.openAlarms()).rejects.toEqual(withFault('closed'));
      await expect(store.sources.list()).rejects.toEqual(withFault('closed'));
      store = await place.open();
      expect(store.lastId).toBe(500);
    });
  });
}
