import { spawn, spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const mainFile = fileURLToPath(new URL('../../.build/server/cli/main.js', import.meta.url));

export interface Ran {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

/** Runs the built program to its end, as a shell would. */
export function vouchline(args: readonly string[], input: string | Buffer = ''): Ran {
  const { status, stdout, stderr } = spawnSync(process.execPath, [mainFile, ...args], { input, encoding: 'utf8', maxBuffer: 64 * 1024 * 1024 });
  return { code: status, out: stdout, err: stderr };
}

/** Starts the built program; `heard` is told what it says on standard error. */
export function startVouchline(args: readonly string[], heard: (text: string, stop: (signal: NodeJS.Signals) => void) => void): Promise<Ran> {
  const child = spawn(process.execPath, [mainFile, ...args], { stdio: ['ignore', 'pipe', 'pipe'] });
  let [out, err] = ['', ''];
  child.stdout.on('data', (data: Buffer) => (out += data.toString()));
  child.stderr.on('data', (data: Buffer) => {
    err += data.toString();
    heard(err, (signal) => child.kill(signal));
  });
  return new Promise((resolve) => child.on('close', (code) => resolve({ code, out, err })));
}
