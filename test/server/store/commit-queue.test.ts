import { describe, expect, it } from 'vitest';
import { CommitQueue, type Committing } from '../../../server/store/commit-queue.ts';
import { waitingGroup, type PackedGroup } from '../../../server/store/packed-group.ts';
import { entry, group } from './examples.ts';

/** A committing thread that answers when told, first asked first answered. */
function heldThread(): { readonly asked: string[]; readonly channel: Committing; answer(error?: Error): Promise<void> } {
  const asked: string[] = [];
  const open: { resolve: () => void; reject: (error: Error) => void }[] = [];
  const call = (name: string, argument: unknown): Promise<unknown> => {
    asked.push(name === 'commit' ? `commit ${(argument as PackedGroup).entries.figures.length / 7}` : name);
    return new Promise<void>((resolve, reject) => open.push({ resolve, reject }));
  };
  return {
    asked,
    channel: { call } as Committing,
    answer: (error) => {
      const { resolve, reject } = open.shift()!;
      if (error === undefined) resolve();
      else reject(error);
      return new Promise((done) => setImmediate(done));
    },
  };
}

const one = (id: number) => waitingGroup(group({ entries: [entry(id)] }));
const two = (id: number) => waitingGroup(group({ entries: [entry(id), entry(id + 1)] }));

describe('commit queue', () => {
  it('merges what waits while two transactions are under way', async () => {
    const thread = heldThread();
    const queue = new CommitQueue(thread.channel, { groupBytes: 1e6, groupEntries: 100 });
    const all = [1, 2, 3, 4, 5].map((id) => queue.commit(one(id)));
    expect(queue.waitingBytes).toBe([1, 2, 3, 4, 5].reduce((bytes, id) => bytes + one(id).bytes, 0));
    for (let times = 0; times < 3; times += 1) await thread.answer();
    await Promise.all(all);
    expect(thread.asked).toEqual(['commit 1', 'commit 1', 'commit 3']);
    expect(queue.waitingBytes).toBe(0);
  });

  it('bounds a transaction by entries and by bytes, but takes one group however large', async () => {
    for (const limits of [{ groupBytes: 1e6, groupEntries: 3 }, { groupBytes: one(1).bytes * 3.5, groupEntries: 100 }]) {
      const thread = heldThread();
      const queue = new CommitQueue(thread.channel, limits);
      const all = [one(1), one(2), two(3), one(5), two(6), one(8)].map((waiting) => queue.commit(waiting));
      for (let times = 0; times < 4; times += 1) await thread.answer();
      await Promise.all(all);
      expect(thread.asked).toEqual(['commit 1', 'commit 1', 'commit 3', 'commit 3']);
    }
    const thread = heldThread();
    const queue = new CommitQueue(thread.channel, { groupBytes: 1, groupEntries: 1 });
    void queue.commit(two(1));
    await thread.answer();
    expect(thread.asked).toEqual(['commit 2']);
  });

  it('keeps a snapshot in its place between groups', async () => {
    const thread = heldThread();
    const queue = new CommitQueue(thread.channel, { groupBytes: 1e6, groupEntries: 100 });
    const snapshot = { journalId: 4, at: 0, body: new Uint8Array(3) };
    const all = [queue.commit(one(1)), queue.commit(one(2)), queue.commit(one(3)), queue.commit(one(4)), queue.keepSnapshot(snapshot), queue.commit(one(5)), queue.commit(one(6))];
    for (let times = 0; times < 5; times += 1) await thread.answer();
    await Promise.all(all);
    expect(thread.asked).toEqual(['commit 1', 'commit 1', 'commit 2', 'keepSnapshot', 'commit 2']);
  });

  it('rejects every group of a transaction that failed', async () => {
    const thread = heldThread();
    const queue = new CommitQueue(thread.channel, { groupBytes: 1e6, groupEntries: 100 });
    const settled = Promise.allSettled([1, 2, 3, 4].map((id) => queue.commit(one(id))));
    await thread.answer();
    await thread.answer();
    await thread.answer(new Error('no room'));
    expect((await settled).map(({ status }) => status)).toEqual(['fulfilled', 'fulfilled', 'rejected', 'rejected']);
    expect(queue.waitingBytes).toBe(0);
    await queue.idle();
  });
});
