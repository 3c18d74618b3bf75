// 2,000 guarantees live at once under 100,000 records a second with dashboards watching: how long the server's event loop
// is held up (it samples every millisecond, which is part of the figures), and what a guarantee costs in memory.
// Usage: node test/bench/many-guarantees.mjs [--seconds 20] [--dashboards 20] [--guarantees 2000] [--short]
import { parseArgs } from 'node:util';
import WebSocket from 'ws';
import { liveProtocol } from '../../.build/core/live/message.js';
import { forked } from './forked.mjs';
import { pause, table, tellMachine } from './measure.mjs';

const { values } = parseArgs({
  options: { seconds: { type: 'string', default: '20' }, dashboards: { type: 'string', default: '20' }, guarantees: { type: 'string', default: '2000' }, short: { type: 'boolean', default: false } },
});
const seconds = values.short ? 6 : Number(values.seconds);
const [guarantees, watching] = [Number(values.guarantees), Number(values.dashboards)];
const [connections, records, framesASecond] = [10, 100, 1_000];
const window = 64;

const server = (streams, sources, data) => forked('whole-server.mjs', [JSON.stringify({ data, streams, kind: 'verdicts', probes: 0, sources })], ['--expose-gc']);

tellMachine();
const small = await server(1, 1, '.data/bench-one');
const one = small.told.heap;
await small.end();
const whole = await server(guarantees, connections, '.data/bench-many');
const { port, tokens, heap: fresh } = whole.told;
const load = await forked('record-load.mjs');
await load.ask('connect', { name: 'plant', port, tokens, shape: 'verdicts, steady pace', form: 'binary', records, connections, streams: guarantees, acknowledged: true });

const boards = Array.from({ length: watching }, () => new WebSocket(`ws://127.0.0.1:${port}/live`, liveProtocol));
let [updates, bytes] = [0, 0];
for (const board of boards) {
  board.on('open', () => board.send('{"type":"watch"}'));
  board.on('message', (data) => {
    updates += 1;
    bytes += data.length;
  });
}
await load.ask('pace', { name: 'plant', framesASecond, seconds: 3, window }); // the compiler settles, windows begin to fill
await whole.ask('begin');
[updates, bytes] = [0, 0];
const sent = await load.ask('pace', { name: 'plant', framesASecond, seconds, window });
const held = await whole.ask('end');
const each = updates / watching / seconds;
for (const board of boards) board.terminate();
await pause(200);
const full = await whole.ask('heap');
await load.end();
await whole.end();

const kib = (to) => ((to.heapUsed + to.arrayBuffers - one.heapUsed - one.arrayBuffers) / (guarantees - 1) / 1_024).toFixed(1);
console.log(`${guarantees} guarantees, ${Math.round((sent * records) / seconds)} records a second, ${watching} dashboards with ${each.toFixed(1)} updates a second each (${(bytes / updates / 1_024).toFixed(0)} KiB), ${seconds} s\n`);
table(['figure', 'measured', 'goal', 'reached'], [
  ['event loop delay p50', `${held.p50.toFixed(1)} ms`, '', ''],
  ['event loop delay p99', `${held.p99.toFixed(1)} ms`, '< 50 ms', held.p99 < 50 ? 'yes' : 'no'],
  ['event loop delay, largest', `${held.most.toFixed(1)} ms`, '', ''],
  ['processor time of the server', `${(held.microseconds / seconds / 1e4).toFixed(0)} % of one core`, '', ''],
  ['memory a guarantee, fresh', `${kib(fresh)} KiB`, '', ''],
  ['memory a guarantee, after the load', `${kib(full)} KiB`, '', ''],
]);
