import { spawn, type ChildProcessWithoutNullStreams } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openStore } from '../../../server/store/sqlite-store.ts';
import { withFault } from './store-contract.ts';

const writer = fileURLToPath(new URL('./crash-writer.mjs', import.meta.url));
let directory: string;
const started: ChildProcessWithoutNullStreams[] = [];

beforeEach(() => {
  directory = mkdtempSync(join(tmpdir(), 'vouchline-crash-'));
});
afterEach(() => {
  for (const child of started.splice(0)) child.kill('SIGKILL');
  rmSync(directory, { recursive: true });
});

function start(): ChildProcessWithoutNullStreams {
  const child = spawn(process.execPath, [writer, directory]);
  started.push(child);
  child.stderr.pipe(process.stderr);
  return child;
}

/** Lets a writer acknowledge `commits` more commits, kills it in the middle of the next ones and tells the newest id it acknowledged. */
async function killedAfter(commits: number): Promise<number> {
  const child = start();
  let lines = 0;
  let text = '';
  for await (const chunk of child.stdout as AsyncIterable<Buffer>) {
    text += chunk.toString();
    lines = text.split('\n').length - 1;
    if (lines > commits) child.kill('SIGKILL');
  }
  const whole = text.split('\n').slice(0, -1);
  expect(whole[0]).toBe('open');
  return Math.max(0, ...whole.slice(1).map(Number));
}

describe('a killed server', () => {
  it('[D1][D2] loses nothing it acknowledged and keeps groups whole, again and again', async () => {
    for (const commits of [0, 7, 60, 200, 33]) {
      const acknowledged = await killedAfter(commits);
      const store = await openStore(directory);
      expect(store.lastId).toBeGreaterThanOrEqual(acknowledged);
      let next = 1;
      for await (const batch of store.readJournal(1)) {
        for (const { id, body } of batch) {
          expect(id).toBe(next);
          expect(body.length).toBe(500 + (id % 5) * 3_000);
          expect(body.every((byte, place) => byte === (place + id) % 256)).toBe(true);
          next += 1;
        }
      }
      expect(next - 1).toBe(store.lastId);
      expect(store.lastId % 2).toBe(0);
      const told = await store.history({ guarantee: 'leak-a', from: 0, to: 60_000, points: 1 });
      expect(told.inspected).toEqual(store.lastId === 0 ? [] : [store.lastId]);
      const { snapshot, damaged } = await store.newestSnapshot();
      expect(damaged).toEqual([]);
      expect(snapshot === undefined || snapshot.journalId <= store.lastId).toBe(true);
      await store.close();
    }
  });

  it('leaves no stale lock, while a living one keeps every other out', async () => {
    const child = start();
    await once(child.stdout, 'data');
    await expect(openStore(directory)).rejects.toEqual(withFault('in-use'));
    await expect(openStore(directory)).rejects.toThrow(`${directory} is in use by another server`);
    child.kill('SIGKILL');
    await once(child, 'exit');
    const store = await openStore(directory);
    const second = start();
    const [said] = (await once(second.stdout, 'data')) as [Buffer];
    expect(said.toString()).toBe('refused in-use\n');
    await store.close();
  });
});
