import { fileURLToPath } from 'node:url';
import { expect, it } from 'vitest';
import { workerUrl } from '../../../server/store/worker-url.ts';
import { withFault } from './store-contract.ts';

const top = new URL('../../../', import.meta.url);

it('sends code run from its source to the compiled thread, and compiled code to its neighbour', () => {
  const compiled = new URL('.build/server/store/commit-worker.js', top).href;
  expect(workerUrl('commit-worker', new URL('server/store/sqlite-store.ts', top).href).href).toBe(compiled);
  expect(workerUrl('commit-worker', new URL('.build/server/store/sqlite-store.js', top).href).href).toBe(compiled);
});

it('says what to do when nothing was compiled', () => {
  const ask = (): URL => workerUrl('no-such-thread', new URL('server/store/sqlite-store.ts', top).href);
  expect(ask).toThrow(withFault('not-built'));
  expect(ask).toThrow(`${fileURLToPath(new URL('.build/server/store/no-such-thread.js', top))} is missing: run "npm run build"`);
});
