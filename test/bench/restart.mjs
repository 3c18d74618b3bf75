// Restart with 10,000,000 stored records in frames of 1,000 verdicts with a time each, 200 streams and guarantees.
// Full rebuild: journal, checks, evidence and alarms of every record, in a fresh process, beside a fresh process that reads
// the same rows with the same database driver and decodes their columns with nothing checked. Then the real program's
// start with a snapshot, from starting the process to its answer that it is ready.
// Usage: node test/bench/restart.mjs [--records 10000000] [--rounds 5] [--short]
import { spawn, spawnSync } from 'node:child_process';
import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { median, table, tellMachine } from './measure.mjs';
import { plantText } from './plant-text.mjs';

const { values } = parseArgs({ options: { records: { type: 'string', default: '10000000' }, rounds: { type: 'string', default: '5' }, short: { type: 'boolean', default: false } } });
const records = values.short ? 1_000_000 : Number(values.records);
const rounds = values.short ? 3 : Number(values.rounds);
const data = '.data/bench-restart';
const streams = 200;

function step(name) {
  const how = JSON.stringify({ step: name, data, streams, records, perFrame: 1_000, shape: 'verdicts, a time each' });
  const { status, stdout, stderr } = spawnSync(process.execPath, [fileURLToPath(new URL('restart-step.mjs', import.meta.url)), how], { encoding: 'utf8' });
  if (status !== 0) throw new Error(stderr);
  return JSON.parse(stdout);
}

/** Milliseconds from starting the program until /readyz says yes. */
async function ready(port) {
  const begin = performance.now();
  const program = spawn(process.execPath, ['.build/server/cli/main.js', 'serve', '--data', data, '--port', String(port), '--access', 'open', '--log-level', 'silent'], { stdio: ['ignore', 'ignore', 'inherit'] });
  const ended = new Promise((resolve) => program.once('exit', resolve));
  try {
    for (;;) {
      const answer = await fetch(`http://127.0.0.1:${port}/readyz`).catch(() => undefined);
      if (answer?.ok) return performance.now() - begin;
      if (program.exitCode !== null) throw new Error(`the server ended with code ${program.exitCode}`);
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
  } finally {
    program.kill('SIGTERM');
    await ended;
  }
}

rmSync(data, { recursive: true, force: true });
mkdirSync(data, { recursive: true });
writeFileSync(join(data, 'plant.yaml'), plantText(streams));
step('fill');
const taken = { scan: [], rebuild: [], resume: [], ready: [] };
for (let round = 0; round < rounds; round += 1) {
  for (const name of ['scan', 'rebuild']) {
    const said = step(name);
    if (said.seen !== records) throw new Error(`${name} saw ${said.seen} records of ${records}`);
    taken[name].push(said);
  }
}
step('snapshot');
for (let round = 0; round < rounds; round += 1) {
  taken.resume.push(step('resume'));
  taken.ready.push(await ready(17_000 + (process.pid % 2_000)));
}
rmSync(data, { recursive: true, force: true });

tellMachine();
const of = (name, figure) => taken[name].map((said) => said[figure]);
const ratio = median(taken.scan.map(({ cpuMs }, round) => taken.rebuild[round].cpuMs / cpuMs));
const wallRatio = median(taken.scan.map(({ ms }, round) => taken.rebuild[round].ms / ms));
const start = median(taken.ready);
console.log(`${records} stored records in ${records / 1_000} frames, ${streams} guarantees, medians of ${rounds} fresh processes\n`);
table(['figure', 'measured', 'goal', 'reached'], [
  ['read and decode the same rows', `${median(of('scan', 'ms')).toFixed(0)} ms (${median(of('scan', 'cpuMs')).toFixed(0)} ms of processor time)`, '', ''],
  ['full rebuild', `${median(of('rebuild', 'ms')).toFixed(0)} ms (${median(of('rebuild', 'cpuMs')).toFixed(0)} ms of processor time)`, '', ''],
  ['full rebuild as times of reading, wall time', wallRatio.toFixed(2), '≤ 2', wallRatio <= 2 ? 'yes' : 'no'],
  ['full rebuild as times of reading, processor time', ratio.toFixed(2), '', ''],
  ['store opened, plant file read, snapshot taken up', `${median(of('resume', 'ms')).toFixed(0)} ms (${median(of('resume', 'cpuMs')).toFixed(0)} ms of processor time)`, '', ''],
  ['program started until ready, with a snapshot', `${start.toFixed(0)} ms`, '≤ 1,000 ms', start <= 1_000 ? 'yes' : 'no'],
]);
