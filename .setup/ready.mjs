// Makes a fresh clone ready: installs what package-lock.json names, builds what is older than its sources.
// Uses nothing but Node, so that it can run before anything is installed. Progress goes to standard error.
import { spawnSync } from 'node:child_process';
import { chmodSync, cpSync, existsSync, mkdirSync, readdirSync, readFileSync, statSync, utimesSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

const top = fileURLToPath(new URL('..', import.meta.url));
const built = join(top, '.build');
const force = process.argv.includes('--build');
const quiet = process.argv.includes('--quiet');
const say = (text) => quiet || process.stderr.write(`${text}\n`);

/** Runs a command with its output on standard error (standard output belongs to what runs afterwards). */
function run(command, args, env = {}) {
  const done = spawnSync(command, args, {
    cwd: top,
    env: { ...process.env, ...env },
    stdio: ['ignore', quiet ? 'pipe' : 2, quiet ? 'pipe' : 2],
    shell: process.platform === 'win32',
  });
  if (done.status !== 0) {
    if (quiet) process.stderr.write(`${done.stdout ?? ''}${done.stderr ?? ''}`);
    process.stderr.write(`\nCould not finish: ${command} ${args.join(' ')} (exit code ${done.status})\n`);
    process.exit(done.status ?? 1);
  }
}

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major > 20 || (major === 20 && minor >= 19)) return;
  process.stderr.write(`Vouchline needs Node.js 20.19 or newer; this is ${process.versions.node}.\n`);
  process.exit(1);
}

function install() {
  const lock = join(top, 'package-lock.json');
  const installed = join(top, 'node_modules', '.package-lock.json'); // npm writes it at the end of every install
  if (existsSync(installed) && statSync(installed).mtimeMs >= statSync(lock).mtimeMs) return;
  say('Installing packages (the database driver is compiled here, which takes a minute or two) …');
  // The driver is compiled from the registry's source: no binary is fetched from elsewhere.
  run('npm', ['ci', '--no-audit', '--no-fund'], { npm_config_build_from_source: 'true' });
  const now = new Date();
  utimesSync(installed, now, now);
}

function* filesIn(folder) {
  for (const entry of readdirSync(folder, { withFileTypes: true })) {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) yield* filesIn(path);
    else yield path;
  }
}

function newest(paths) {
  let time = 0;
  for (const path of paths) time = Math.max(time, statSync(path).mtimeMs);
  return time;
}

const settings = ['package-lock.json', 'tsconfig.json'].map((name) => join(top, name));
const parts = [
  {
    name: 'server',
    sources: () => [...filesIn(join(top, 'core')), ...filesIn(join(top, 'server')), ...filesIn(join(top, 'test/check-values')), ...settings],
    build() {
      run('npx', ['tsc', '-p', 'server']);
      for (const folder of ['core', 'server']) {
        for (const path of filesIn(join(top, folder))) {
          if (/\.(ts|js|cjs|mjs)$/.test(path) || /tsconfig\.json$/.test(path)) continue;
          const target = join(built, relative(top, path));
          mkdirSync(join(target, '..'), { recursive: true });
          cpSync(path, target);
        }
      }
      chmodSync(join(built, 'server/cli/main.js'), 0o755);
    },
  },
  {
    name: 'client',
    sources: () => [...filesIn(join(top, 'core')), ...filesIn(join(top, 'client')), ...settings],
    build: () => run('npx', ['vite', 'build', '--config', 'client/vite.config.ts', '--logLevel', 'warn']),
  },
];

checkNode();
install();
mkdirSync(built, { recursive: true });
for (const part of parts) {
  const stamp = join(built, `.${part.name}-built`);
  const began = Date.now();
  if (!force && existsSync(stamp) && statSync(stamp).mtimeMs >= newest(part.sources())) continue;
  say(`Building the ${part.name} …`);
  part.build();
  writeFileSync(stamp, `${new Date(began).toISOString()}\n`);
  utimesSync(stamp, began / 1000, began / 1000); // A source edited during the build is newer than the stamp.
}
