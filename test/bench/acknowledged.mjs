// Durable and acknowledged: frames of 1,000 records from a source's socket until the last acknowledgement is back, beside one
// process that appends the same bytes and flushes after each frame. Wall time: it is the disk that both wait for.
// Usage: node test/bench/acknowledged.mjs [--rounds 7] [--frames 1000] [--short]
import { closeSync, fdatasyncSync, mkdirSync, openSync, rmSync, writeSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { forked } from './forked.mjs';
import { framesOf, shapes } from './frames.mjs';
import { median, table, tellMachine } from './measure.mjs';

const { values } = parseArgs({ options: { rounds: { type: 'string', default: '7' }, frames: { type: 'string', default: '1000' }, short: { type: 'boolean', default: false } } });
const rounds = values.short ? 3 : Number(values.rounds);
const frames = values.short ? 300 : Number(values.frames);
const records = 1_000;
const window = 64;

const seconds = async (act) => {
  const begin = process.hrtime.bigint();
  await act();
  return Number(process.hrtime.bigint() - begin) / 1e9;
};

function append(pool) {
  mkdirSync('.data', { recursive: true });
  const file = openSync('.data/bench-append', 'w');
  for (let frame = 0; frame < frames; frame += 1) {
    writeSync(file, pool.numbered(frame % 4, 1 + frame * records));
    fdatasyncSync(file);
  }
  closeSync(file);
}

async function race(shape, groupEntries) {
  const { kind } = shapes[shape];
  const whole = await forked('whole-server.mjs', [JSON.stringify({ data: '.data/bench-acknowledged', streams: 1, kind, probes: 0, sources: 1, groupEntries })], ['--expose-gc']);
  const load = await forked('record-load.mjs');
  await load.ask('connect', { name: 'plant', port: whole.told.port, tokens: whole.told.tokens, shape, form: 'binary', records, connections: 1, streams: 1, acknowledged: true });
  const pool = framesOf({ shape, form: 'binary', stream: 0, records, variants: 4 });
  const taken = { bare: [], plant: [] };
  for (let round = -1; round < rounds; round += 1) {
    const bare = await seconds(() => append(pool));
    const plant = await seconds(() => load.ask('send', { name: 'plant', frames, window }));
    if (round < 0) continue;
    taken.bare.push(bare);
    taken.plant.push(plant);
  }
  await load.end();
  await whole.end();
  rmSync('.data/bench-append', { force: true });
  return taken;
}

tellMachine();
const rows = [];
for (const shape of Object.keys(shapes)) {
  for (const [name, groupEntries, goal] of [['1,000', 1, '≥ 0.6'], ['as many as wait', undefined, '']]) {
    const { bare, plant } = await race(shape, groupEntries);
    const ratios = bare.map((one, round) => one / plant[round]);
    const ratio = median(ratios);
    const rate = (of) => ((frames * records) / median(of) / 1e6).toFixed(2);
    rows.push([shape, name, rate(bare), rate(plant), `${ratio.toFixed(2)} (${Math.min(...ratios).toFixed(2)} to ${Math.max(...ratios).toFixed(2)})`, goal, goal && (ratio >= 0.6 ? 'yes' : 'no')]);
  }
}
console.log(`One source, 1,000 records a frame, ${window} frames in flight, ${frames} frames a round, medians of ${rounds} rounds, million records a second\n`);
table(['records', 'records a commit', 'append + fdatasync', 'acknowledged', 'share of bare', 'goal', 'reached'], rows);
