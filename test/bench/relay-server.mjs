// The ceiling of an alarm's way: a bare ws server that decodes the load's frames and passes a probe's message on to the viewer.
// Beside it, on the same disk, a file is appended to and flushed, as a commit would be.
import { closeSync, fdatasync, mkdirSync, openSync, rmSync, writeSync } from 'node:fs';
import { dirname } from 'node:path';
import { WebSocketServer } from 'ws';
import { sourceProtocol } from '../../.build/core/protocol/source-messages.js';
import { decodeBinary } from './bare-decode.mjs';
import { answering } from './forked.mjs';

const path = process.argv[2];
mkdirSync(dirname(path), { recursive: true });
const file = openSync(path, 'w');
const page = Buffer.alloc(4_096, 7);
const server = new WebSocketServer({ host: '127.0.0.1', port: 0, perMessageDeflate: false, handleProtocols: (offered) => (offered.has(sourceProtocol) ? sourceProtocol : [...offered][0]) });
const viewers = new Set();

server.on('connection', (socket, { url }) => {
  if (url === '/viewer') viewers.add(socket);
  socket.on('message', (data, isBinary) => {
    if (isBinary && url !== '/probe') decodeBinary(data, 'verdicts');
    else if (url === '/probe') for (const viewer of viewers) viewer.send(data);
  });
});

/** Milliseconds of flushes, one every 5 ms for so long. */
async function flush(seconds) {
  const taken = [];
  const end = performance.now() + seconds * 1_000;
  while (performance.now() < end) {
    const begin = performance.now();
    writeSync(file, page);
    await new Promise((resolve, reject) => fdatasync(file, (error) => (error ? reject(error) : resolve())));
    taken.push(performance.now() - begin);
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
  return taken;
}

await new Promise((resolve) => server.once('listening', resolve));
answering({ flush }, { port: server.address().port }, () => {
  closeSync(file);
  rmSync(path);
});
