// What `vouchline bound --batch` adds to reading its requests: 100,000 exact bounds through the built program, against
// the same lines only parsed and written by a process of the same kind. The ratio is the figure; seconds are for people.
// Usage: node test/bench/batch.mjs [requests]
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { median, table, tellMachine } from './measure.mjs';

const requests = Number(process.argv[2] ?? 100_000);
const rounds = 5;
const program = fileURLToPath(new URL('../../.build/server/cli/main.js', import.meta.url));
const bare = `import { createInterface } from 'node:readline';
let answers = '';
for await (const line of createInterface({ input: process.stdin })) answers += JSON.stringify({ bound: JSON.parse(line).n }) + '\\n';
process.stdout.write(answers);`;

let state = 7;
const next = () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647;
const pick = (of) => of[Math.floor(next() * of.length)];
const lines = Array.from({ length: requests }, () => {
  const n = pick([20, 300, 5_000, 20_000, 1_000_000]);
  const nonconforming = Math.floor(next() * (n / 100 + 2));
  return JSON.stringify({ quantity: 'nonconforming-fraction', method: 'exact', n, nonconforming, confidence: pick([0.9, 0.95, 0.99, 0.999999]), side: pick(['upper', 'lower']) });
});
const input = `${lines.join('\n')}\n`;

function secondsOf(args) {
  const begin = performance.now();
  const { stdout, status } = spawnSync(process.execPath, args, { input, encoding: 'utf8', maxBuffer: 1e9 });
  const seconds = (performance.now() - begin) / 1000;
  if (status !== 0 || stdout.split('\n').length !== requests + 1 || stdout.includes('error')) throw new Error('the batch was not answered');
  return seconds;
}

const [answered, parsed] = [[], []];
for (let round = 0; round < rounds; round++) {
  answered.push(secondsOf([program, 'bound', '--batch']));
  parsed.push(secondsOf(['--input-type=module', '--eval', bare]));
}
tellMachine();
table(['', `seconds for ${requests} requests`], [
  ['`vouchline bound --batch`, exact bounds', median(answered).toFixed(2)],
  ['lines only parsed and written', median(parsed).toFixed(2)],
  ['ratio', (median(answered) / median(parsed)).toFixed(2)],
]);
