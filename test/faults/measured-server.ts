import { fork } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { within } from './harness.ts';

export interface Held {
  /** Heap and buffers after everything that can be let go is let go. */
  readonly bytes: number;
  /** Sockets of TCP connections open on the server's side. */
  readonly handles: number;
}

export interface MeasuredServer {
  readonly address: string;
  held(): Promise<Held>;
  alive(): boolean;
  end(): void;
}

/** A built server in a process of its own whose memory can be read. */
export async function measuredServer(data: string): Promise<MeasuredServer> {
  const child = fork(fileURLToPath(new URL('./measured-server.mjs', import.meta.url)), [data], { execArgv: ['--expose-gc'] });
  const told = <T>(what: string): Promise<T> =>
    within(what, new Promise<T>((resolve, reject) => {
      child.once('message', (message) => resolve(message as T));
      child.once('exit', (code) => reject(new Error(`the server ended with ${code ?? 'a signal'}`)));
    }), 20_000);
  const { address } = await told<{ address: string }>('the address');
  return {
    address,
    held() {
      child.send('held');
      return told<Held>('the memory held');
    },
    alive: () => child.exitCode === null && child.signalCode === null,
    end: () => child.kill('SIGKILL'),
  };
}
