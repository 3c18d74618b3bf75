import { spawn, type ChildProcess } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import type { ServerMessage } from '../../core/protocol/source-messages.ts';
import { sourceTalk, type Talk } from '../server/serving.ts';

/** The program as it is installed: built, started by Node. */
export const mainFile = fileURLToPath(new URL('../../.build/server/cli/main.js', import.meta.url));

export interface Ended {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
}

/** A server in a process of its own, on a free port of 127.0.0.1, its clock following the records. */
export class ServerProcess {
  readonly ended: Promise<Ended>;
  /** Where it answers; rejects if it ends before it says so. */
  readonly address: Promise<string>;
  /** All it wrote on standard error. */
  complaint = '';
  readonly #child: ChildProcess;

  private constructor(child: ChildProcess) {
    this.#child = child;
    this.ended = new Promise((resolve) => child.on('close', (code, signal) => resolve({ code, signal })));
    child.stderr?.on('data', (data: Buffer) => {
      this.complaint += data.toString();
    });
    let said = '';
    this.address = new Promise((resolve, reject) => {
      child.stdout?.on('data', (data: Buffer) => {
        said += data.toString();
        const found = /Vouchline is at (\S+)\n/.exec(said);
        if (found?.[1] !== undefined) resolve(found[1]);
      });
      void this.ended.then(({ code, signal }) => reject(new Error(`the server ended (${code ?? signal ?? ''}) before it answered: ${this.complaint}`)));
    });
    this.address.catch(() => undefined); // Whoever waits for it is told.
  }

  /** @param flags beside --data, --port and --clock */
  static start(data: string, flags: readonly string[] = []): ServerProcess {
    return ServerProcess.run(process.execPath, [mainFile, ...serveFlags(data), ...flags]);
  }

  /** Runs it through another program, e.g. a shell that sets limits first. */
  static run(program: string, words: readonly string[]): ServerProcess {
    const child = spawn(program, words, { stdio: ['ignore', 'pipe', 'pipe'] });
    running.add(child);
    child.on('close', () => running.delete(child));
    return new ServerProcess(child);
  }

  get alive(): boolean {
    return this.#child.exitCode === null && this.#child.signalCode === null;
  }

  signal(signal: NodeJS.Signals): void {
    this.#child.kill(signal);
  }

  /** As `kill -9`, or a loss of power to this process. */
  async kill(): Promise<void> {
    this.signal('SIGKILL');
    await this.ended;
  }
}

export const serveFlags = (data: string): readonly string[] => ['serve', '--data', data, '--port', '0', '--clock', 'records', '--access', 'open', '--log-level', 'error'];

const running = new Set<ChildProcess>();

/** Ends what a failed test left running. */
export function endAll(): void {
  for (const child of running) child.kill('SIGKILL');
}

/** Looks again and again until `look` gives something; a test that waits too long fails with what it waited for. */
export async function eventually<T>(what: string, look: () => T | undefined | Promise<T | undefined>, mostMs = 10_000): Promise<T> {
  const deadline = performance.now() + mostMs;
  for (;;) {
    const found = await look();
    if (found !== undefined) return found;
    if (performance.now() > deadline) throw new Error(`waited ${mostMs} ms in vain for: ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
}

/** The promise, or a failure after so long. */
export async function within<T>(what: string, promise: Promise<T>, mostMs = 10_000): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error(`waited ${mostMs} ms in vain for: ${what}`)), mostMs);
  });
  try {
    return await Promise.race([promise, late]);
  } finally {
    clearTimeout(timer);
  }
}

/** The connection ended before the message came. */
export class ConnectionEnded extends Error {}

/** The next message, or ConnectionEnded. */
export function heard(talk: Talk<ServerMessage>): Promise<ServerMessage> {
  return within('a message of the server', Promise.race([talk.next(), talk.closed.then(({ code }) => Promise.reject(new ConnectionEnded(`closed with ${code}`)))]), 20_000);
}

/** A source's connection behind its welcome. */
export async function connectedSource(address: string, token: string): Promise<{ readonly talk: Talk<ServerMessage>; readonly next: number }> {
  const talk = sourceTalk(address, token);
  const welcome = await heard(talk);
  if (welcome.type !== 'welcome') throw new Error(`a welcome comes first, not ${JSON.stringify(welcome)}`);
  return { talk, next: welcome.next };
}

export async function getJson<T>(url: string): Promise<T> {
  const answer = await fetch(url);
  if (!answer.ok) throw new Error(`${url}: ${answer.status} ${await answer.text()}`);
  return (await answer.json()) as T;
}

export function postJson(url: string, body: unknown): Promise<Response> {
  return fetch(url, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) });
}
