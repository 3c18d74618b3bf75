import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { memoryDisk, openMemoryStore } from '../../../server/store/memory-store.ts';
import { openStore } from '../../../server/store/sqlite-store.ts';
import type { Store } from '../../../server/store/store.ts';
import { storeContract, type StorePlace } from './store-contract.ts';

storeContract('store on SQLite', () => sqlitePlace());
storeContract('store in memory', () => memoryPlace());

function sqlitePlace(): StorePlace {
  const directory = mkdtempSync(join(tmpdir(), 'vouchline-store-'));
  const opened: Store[] = [];
  return {
    open: async (options) => {
      const store = await openStore(directory, options);
      opened.push(store);
      return store;
    },
    clear: async () => {
      await Promise.all(opened.map((store) => store.close()));
      rmSync(directory, { recursive: true });
    },
  };
}

function memoryPlace(): StorePlace {
  const disk = memoryDisk();
  return {
    open: (options) =>
      new Promise((resolve) => {
        resolve(openMemoryStore(disk, options));
      }),
    clear: () => Promise.resolve(),
  };
}
