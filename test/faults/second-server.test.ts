import { createServer } from 'node:net';
import type { AddressInfo } from 'node:net';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { leakPlant } from '../server/plants.ts';
import { dataDirectory } from '../server/serving.ts';
import { endAll, ServerProcess, within } from './harness.ts';

let data: ReturnType<typeof dataDirectory>;

beforeEach(() => {
  data = dataDirectory(leakPlant);
});
afterEach(() => {
  endAll();
  data.remove();
});

describe('a second server', () => {
  it('[D3] on the same directory is refused in a sentence with exit code 3; after a kill of the first the directory opens again', async () => {
    const first = ServerProcess.start(data.path);
    const address = await first.address;
    const second = ServerProcess.start(data.path);
    expect(await within('the second server to end', second.ended)).toEqual({ code: 3, signal: null });
    expect(second.complaint).toBe(`The data directory ${data.path} is in use by another server: stop that one or choose another directory.\n`);
    expect((await fetch(`${address}/readyz`)).status).toBe(200);
    await first.kill();
    const third = ServerProcess.start(data.path);
    expect((await fetch(`${await third.address}/readyz`)).status).toBe(200);
    third.signal('SIGTERM');
    expect(await within('the third server to end', third.ended)).toEqual({ code: 0, signal: null });
  });

  it('on a taken port says so, lets go of its directory and ends with exit code 3', async () => {
    const taken = createServer();
    await new Promise<void>((resolve) => taken.listen(0, '127.0.0.1', resolve));
    try {
      const { port } = taken.address() as AddressInfo;
      const server = ServerProcess.start(data.path, ['--port', String(port)]);
      expect(await within('the server to end', server.ended)).toEqual({ code: 3, signal: null });
      expect(server.complaint).toMatch(/^The port is taken already; choose another with --port\. .*EADDRINUSE/);
    } finally {
      taken.close();
    }
  });
});
