// From the socket to evidence, without storage: records a second of processor time, as a share of a bare ws server that
// receives and decodes the same frames. 200 streams, each with its guarantee; the load comes from a process of its own.
// Usage: node test/bench/record-path.mjs [--rounds 9] [--connections 10] [--only text] [--short] [--profile directory]
import { parseArgs } from 'node:util';
import { forked } from './forked.mjs';
import { median, table, tellMachine } from './measure.mjs';
import { shapes } from './frames.mjs';

const { values } = parseArgs({
  options: { rounds: { type: 'string', default: '9' }, connections: { type: 'string', default: '10' }, only: { type: 'string', default: '' }, short: { type: 'boolean', default: false }, profile: { type: 'string' } },
});
const rounds = values.short ? 3 : Number(values.rounds);
const connections = Number(values.connections);
const streams = 200;
const window = 64;
/** Rounds not counted, until the compiler has settled. */
const warmRounds = 5;

const [steady, each, measured] = Object.keys(shapes);
const cases = [
  { form: 'binary', records: 1_000, shape: each, frames: 1_000, goal: 0.5 },
  { form: 'binary', records: 1_000, shape: measured, frames: 600, goal: 0.5 },
  { form: 'binary', records: 1_000, shape: steady, frames: 4_000, goal: 0.5 },
  { form: 'json', records: 100, shape: each, frames: 1_500, goal: 0.75 },
  { form: 'json', records: 100, shape: steady, frames: 3_000, goal: 0.75 },
  { form: 'binary', records: 1, shape: steady, frames: 4_000, goal: 0.75 },
  { form: 'json', records: 1, shape: steady, frames: 3_000, goal: 0.75 },
].filter((one) => `${one.form} ${one.records} ${one.shape}`.includes(values.only));

/** Microseconds of processor time a record, one server after the other, round by round. */
async function race({ form, records, shape, frames }) {
  const { kind } = shapes[shape];
  const flags = values.profile ? ['--cpu-prof', `--cpu-prof-dir=${values.profile}`] : [];
  const load = await forked('record-load.mjs');
  const servers = {};
  for (const who of ['bare', 'plant']) {
    servers[who] = await forked('record-server.mjs', [who, kind, streams, connections], flags);
    await load.ask('connect', { name: who, port: servers[who].told.port, shape, form, records, connections, streams, acknowledged: who === 'plant' });
  }
  const spent = { bare: [], plant: [] };
  let changes = 0;
  for (let round = -warmRounds; round < rounds; round += 1) {
    for (const who of ['bare', 'plant']) {
      const before = await servers[who].ask('begin');
      await load.ask('send', { name: who, frames, window });
      const after = await servers[who].ask('end');
      const taken = after.records - before.records;
      if (taken !== frames * records * connections) throw new Error(`${who} took ${taken} records of ${frames * records * connections}`);
      if (round >= 0) spent[who].push(after.microseconds / taken);
      changes = after.changes;
    }
  }
  for (const one of [load, servers.bare, servers.plant]) await one.end();
  return { spent, changes };
}

tellMachine();
const rows = [];
for (const one of cases) {
  const { spent, changes } = await race(one);
  const ratios = spent.bare.map((bare, round) => bare / spent.plant[round]);
  const ratio = median(ratios);
  rows.push([
    `${one.form}, ${one.records} a frame, ${one.shape}`,
    median(spent.bare).toFixed(4), median(spent.plant).toFixed(4),
    `${ratio.toFixed(2)} (${Math.min(...ratios).toFixed(2)} to ${Math.max(...ratios).toFixed(2)})`,
    `≥ ${one.goal}`, ratio >= one.goal ? 'yes' : 'no',
  ]);
  console.error(rows.at(-1).join(' | '), `${changes} changes told`);
}
console.log(`Socket to evidence, ${streams} streams over ${connections} connections, medians of ${rounds} rounds, µs of processor time a record\n`);
table(['frames', 'bare', 'to evidence', 'share of bare', 'goal', 'reached'], rows);
