import { parentPort } from 'node:worker_threads';
import type { Transferable } from 'node:worker_threads';
import { storeErrorOf } from './sqlite-fault.ts';
import type { StoreFault } from './store-error.ts';

/** What a thread can be asked, by name: one argument, one answer (or the promise of one). */
export type Calls = Readonly<Record<string, (argument: never) => unknown>>;

/** A call of a thread; `ask` is 1 or more and comes back with the answer. */
export interface Ask {
  readonly ask: number;
  readonly name: string;
  readonly argument: unknown;
}

/** `ask` 0 answers the start of the thread. */
export type Answer =
  | { readonly ask: number; readonly answer: unknown }
  | { readonly ask: number; readonly fault: StoreFault; readonly message: string };

/** Buffers a result hands over instead of copying; looked up by the result itself. */
const handedOver = new WeakMap<object, readonly Transferable[]>();

/** Marks buffers of a call's answer as handed over to the asking thread. */
export function handingOver<T extends object>(answer: T, buffers: readonly Transferable[]): T {
  handedOver.set(answer, buffers);
  return answer;
}

/**
 * Answers the calls of the thread that started this one, in the order they come in; the thread ends after 'close'.
 *
 * @param start opens what the calls need; its failure is the answer to the start
 */
export function answerCalls<T>(start: () => { readonly opened: T; readonly calls: Calls }): void {
  const port = parentPort;
  if (port === null) throw new Error('answerCalls: expected to run in a thread of its own.');
  const reply = (ask: number, answer: unknown): void => {
    const buffers = typeof answer === 'object' && answer !== null ? handedOver.get(answer) : undefined;
    port.postMessage({ ask, answer } satisfies Answer, buffers ?? []);
  };
  const fail = (ask: number, cause: unknown): void => {
    const { fault, message } = storeErrorOf(cause);
    port.postMessage({ ask, fault, message } satisfies Answer);
  };
  try {
    const { opened, calls } = start();
    port.on('message', ({ ask, name, argument }: Ask) => {
      try {
        const answer = (calls[name] as (argument: unknown) => unknown)(argument);
        if (answer instanceof Promise) answer.then((value) => reply(ask, value), (cause: unknown) => fail(ask, cause));
        else reply(ask, answer);
        if (name === 'close') port.close();
      } catch (cause) {
        fail(ask, cause);
      }
    });
    reply(0, opened);
  } catch (cause) {
    fail(0, cause);
    port.close();
  }
}
