// A built server in a process that tells what it holds in memory when it is asked. Run with --expose-gc and an IPC channel.
import { serve } from '../../.build/server/serve.js';
import { logOf } from '../../.build/server/ops/log.js';
import { settle } from '../../.build/server/settings/settings.js';

const settings = settle({ data: process.argv[2], port: '0', access: 'open' }, {}, {});
const served = await serve({ settings, clock: { kind: 'records' }, demo: false, log: logOf('silent') });
process.on('message', () => {
  globalThis.gc();
  const { heapUsed, external } = process.memoryUsage();
  process.send({ bytes: heapUsed + external, handles: process.getActiveResourcesInfo().filter((name) => name === 'TCPSocketWrap').length });
});
process.on('disconnect', () => process.exit(0));
process.send({ address: served.address });
