// Runs every benchmark, one after the other, each in a process of its own, and prints what they found as markdown.
// Usage: node test/bench/run.mjs [--short] [name …]     e.g. node test/bench/run.mjs record-path restart
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';

const { values, positionals } = parseArgs({ options: { short: { type: 'boolean', default: false } }, allowPositionals: true });

/** `short`: arguments for a run of seconds, whose figures only tell that the benchmark works. `plain`: prints text, no tables. */
const benches = [
  { name: 'record-path', title: 'From the socket to evidence', short: ['--short'] },
  { name: 'acknowledged', title: 'Durable and acknowledged', short: ['--short'] },
  { name: 'alarm-latency', title: 'From the record to the alarm on a dashboard', short: ['--short'] },
  { name: 'restart', title: 'Restart', short: ['--short'] },
  { name: 'many-guarantees', title: 'Many guarantees at once', short: ['--short'] },
  { name: 'protocol', title: 'Reading frames', short: [], plain: true },
  { name: 'windows', title: 'Windows', short: [], plain: true },
  { name: 'store', title: 'The store alone', short: ['--records', '1000000', '--rounds', '1'], plain: true },
  { name: 'bounds', title: 'Bounds', short: [], plain: true },
  { name: 'batch', title: 'Bounds in batches', short: ['10000'] },
  { name: 'delay-table', title: 'Delays of the alarm rules', short: ['2000'] },
  { name: 'measurement-bounds', title: 'Bounds about measurements', short: [], plain: true },
];

const unknown = positionals.filter((name) => !benches.some((bench) => bench.name === name));
if (unknown.length > 0) {
  console.error(`no benchmark is named ${unknown.join(', ')}; expected ${benches.map(({ name }) => name).join(', ')}`);
  process.exit(2);
}
let failed = 0;
for (const { name, title, short, plain } of benches) {
  if (positionals.length > 0 && !positionals.includes(name)) continue;
  const file = fileURLToPath(new URL(`${name}.mjs`, import.meta.url));
  const { status, stdout } = spawnSync(process.execPath, [file, ...(values.short ? short : [])], { encoding: 'utf8', stdio: ['ignore', 'pipe', 'inherit'], maxBuffer: 16_777_216 });
  console.log(`## ${title}\n\n${plain ? `\`\`\`\n${stdout.trim()}\n\`\`\`\n` : stdout.trim()}\n`);
  if (status !== 0) failed += 1;
}
process.exit(failed === 0 ? 0 : 1);
