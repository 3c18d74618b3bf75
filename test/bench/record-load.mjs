// Load for the record path: sources that send as fast as the server takes them, in a process of their own.
import WebSocket from 'ws';
import { sourceProtocol } from '../../.build/core/protocol/source-messages.js';
import { answering } from './forked.mjs';
import { framesOf } from './frames.mjs';

const variants = 4;

/**
 * One source and its streams; it numbers its frames over all of them. It sends as many frames as it may have in flight
 * in one go, as a source does whose records waited for the last acknowledgement, so that both servers read the same bursts.
 */
class Source {
  #socket;
  #pools;
  #records;
  #acknowledged;
  #next = 1;
  #done = 1;
  #turn = 0;
  #wake = () => undefined;

  constructor(socket, pools, records, acknowledged) {
    this.#socket = socket;
    this.#pools = pools;
    this.#records = records;
    this.#acknowledged = acknowledged;
    socket.on('message', (data) => {
      const message = JSON.parse(data.toString());
      if (message.type === 'refused') throw new Error(`refused: ${data}`);
      this.#done = message.next;
      this.#wake();
    });
  }

  async send(frames, window) {
    for (let left = frames; left > 0; left -= window) {
      await this.#burst(Math.min(left, window));
      if (this.#acknowledged) await this.#answered();
    }
    if (this.#acknowledged) return;
    this.#socket.send('done');
    await this.#answered();
  }

  /** Resolves when the burst has been given to the kernel. */
  #burst(frames) {
    const wire = this.#socket._socket;
    return new Promise((resolve) => {
      wire.cork();
      for (let frame = 1; frame <= frames; frame += 1) this.#socket.send(this.#numbered(), { compress: false }, frame === frames ? resolve : undefined);
      wire.uncork();
    });
  }

  /** @returns false if the window is full */
  sendOne(window) {
    if (this.#acknowledged && (this.#next - this.#done) / this.#records >= window) return false;
    this.#socket.send(this.#numbered(), { compress: false });
    return true;
  }

  #numbered() {
    const pool = this.#pools[this.#turn % this.#pools.length];
    const variant = Math.floor(this.#turn / this.#pools.length) % variants;
    const first = this.#next;
    this.#turn += 1;
    this.#next += this.#records;
    return pool.numbered(variant, first);
  }

  async #answered() {
    while (this.#done < this.#next) await new Promise((resolve) => (this.#wake = resolve));
  }
}

const open = new Map();

async function connect({ name, port, shape, form, records, connections, streams, acknowledged, tokens }) {
  const sources = [];
  for (let index = 0; index < connections; index += 1) {
    const mine = Array.from({ length: streams }, (_, stream) => stream).filter((stream) => stream % connections === index);
    const pools = mine.map((stream) => framesOf({ shape, form, stream, records, variants }));
    const [path, headers] = tokens ? ['source', { authorization: `Bearer ${tokens[index]}` }] : [index, {}];
    const socket = new WebSocket(`ws://127.0.0.1:${port}/${path}`, sourceProtocol, { perMessageDeflate: false, headers });
    await new Promise((resolve, reject) => socket.once(acknowledged ? 'message' : 'open', resolve).once('error', reject));
    sources.push(new Source(socket, pools, records, acknowledged));
  }
  open.set(name, sources);
}

/** Sends frames at an even pace; a source whose window is full skips its turn. @returns records sent in the time */
async function pace({ name, framesASecond, seconds, window }) {
  const sources = open.get(name);
  const begin = performance.now();
  let [sent, turn] = [0, 0];
  while (performance.now() - begin < seconds * 1_000) {
    const due = Math.floor(((performance.now() - begin) / 1_000) * framesASecond);
    for (let ready = sources.length; sent < due && ready > 0; turn += 1) {
      if (sources[turn % sources.length].sendOne(window)) sent += 1;
      else ready -= 1;
    }
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
  return sent;
}

answering({
  connect,
  pace,
  send: ({ name, frames, window }) => Promise.all(open.get(name).map((source) => source.send(frames, window))).then(() => undefined),
});
