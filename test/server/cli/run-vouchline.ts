import { spawn } from 'node:child_process';
import { mainFile } from '../../faults/harness.ts';

/** What a command said and how it ended. */
export interface Said {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

/** A command of the built program, with standard input of the test's own. */
export interface Running {
  readonly said: Promise<Said>;
  /** All it wrote on standard error so far. */
  readonly complaint: () => string;
  readonly write: (text: string) => void;
  readonly end: () => void;
  readonly signal: (signal: NodeJS.Signals) => void;
}

export function starting(words: readonly string[], environment: Readonly<Record<string, string>> = {}): Running {
  const { VOUCHLINE_TOKEN: _token, VOUCHLINE_TO: _to, ...outer } = process.env;
  const child = spawn(process.execPath, [mainFile, ...words], { env: { ...outer, ...environment } });
  let out = '';
  let err = '';
  child.stdout.on('data', (data: Buffer) => (out += data.toString()));
  child.stderr.on('data', (data: Buffer) => (err += data.toString()));
  child.stdin.on('error', () => undefined); // The command may end before it has read everything.
  const said = new Promise<Said>((resolve) => child.on('close', (code) => resolve({ code, out, err })));
  return { said, complaint: () => err, write: (text) => child.stdin.write(text), end: () => child.stdin.end(), signal: (signal) => child.kill(signal) };
}

/** Runs a command of the built program to its end. */
export function vouchline(words: readonly string[], environment: Readonly<Record<string, string>> = {}): Promise<Said> {
  const running = starting(words, environment);
  running.end();
  return running.said;
}
