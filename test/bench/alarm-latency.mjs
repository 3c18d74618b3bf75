// From sending the record that takes a bound over its line to the alarm at a dashboard's socket, under 100,000 records a
// second, beside a bare ws server that passes the same message on under the same load, and bare flushes on the same disk.
// The alarm is sent after its record is durable; there is no commit interval: a commit begins as soon as the last one is done.
// Usage: node test/bench/alarm-latency.mjs [--rounds 4] [--probes 150] [--short]
import { parseArgs } from 'node:util';
import { forked } from './forked.mjs';
import { median, percentile, table, tellMachine } from './measure.mjs';

const { values } = parseArgs({ options: { rounds: { type: 'string', default: '4' }, probes: { type: 'string', default: '150' }, short: { type: 'boolean', default: false } } });
const rounds = values.short ? 2 : Number(values.rounds);
const probes = values.short ? 60 : Number(values.probes);
const [streams, sources, records, framesASecond] = [200, 9, 100, 1_000];
const window = 64;

const setting = { data: '.data/bench-alarms', streams, kind: 'verdicts', probes: probes * (rounds + 1), sources: sources + 1 };
const whole = await forked('whole-server.mjs', [JSON.stringify(setting)], ['--expose-gc']);
const relay = await forked('relay-server.mjs', ['.data/bench-flushes']);
const load = await forked('record-load.mjs');
const probe = await forked('alarm-probe.mjs');
const what = { shape: 'verdicts, steady pace', form: 'binary', records, connections: sources, streams };
await load.ask('connect', { ...what, name: 'plant', port: whole.told.port, tokens: whole.told.tokens, acknowledged: true });
await load.ask('connect', { ...what, name: 'bare', port: relay.told.port, acknowledged: false });
await probe.ask('connectPlant', { port: whole.told.port, token: whole.told.tokens.at(-1), probes: setting.probes });
await probe.ask('connectBare', { port: relay.told.port });

const taken = { plant: [], bare: [], flush: [] };
const seconds = Math.ceil((probes * 18) / 1_000) + 1;
let sent = 0;
for (let round = -1; round < rounds; round += 1) {
  for (const through of ['bare', 'plant']) {
    const [heard, passed, flushed] = await Promise.all([
      probe.ask('run', { through, count: probes }),
      load.ask('pace', { name: through, framesASecond, seconds, window }),
      through === 'bare' ? relay.ask('flush', seconds) : [],
    ]);
    if (round < 0) continue;
    taken[through].push(...heard);
    taken.flush.push(...flushed);
    if (through === 'plant') sent += passed;
  }
}
for (const one of [probe, load, relay, whole]) await one.end();

tellMachine();
const p99 = (of) => percentile(of, 0.99);
const most = 2 * (p99(taken.bare) + p99(taken.flush));
const row = (name, of) => [name, String(of.length), `${median(of).toFixed(2)}`, `${p99(of).toFixed(2)}`];
console.log(`Alarm latency under ${Math.round((sent * records) / rounds / seconds)} records a second, ms\n`);
table(['way', 'samples', 'p50', 'p99'], [
  row('bare: source, ws, viewer', taken.bare),
  row('bare: append and fdatasync', taken.flush),
  row('alarm: source, evidence, disk, dashboard', taken.plant),
]);
table(['goal: 2 × (bare p99 + commit interval 0 + fdatasync p99)', 'alarm p99', 'reached'], [[`≤ ${most.toFixed(2)} ms`, `${p99(taken.plant).toFixed(2)} ms`, p99(taken.plant) <= most ? 'yes' : 'no']]);
