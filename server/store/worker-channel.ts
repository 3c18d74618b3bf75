import { Worker, type Transferable } from 'node:worker_threads';
import { StoreError } from './store-error.ts';
import type { Answer, Ask, Calls } from './worker-answers.ts';

interface Waiting {
  readonly resolve: (answer: never) => void;
  readonly reject: (error: StoreError) => void;
}

/** Calls a thread that answers them with `answerCalls`. C: its calls. */
export class WorkerChannel<C extends Calls> {
  /** Resolves when the thread has ended. */
  readonly ended: Promise<void>;
  readonly #worker: Worker;
  readonly #waiting = new Map<number, Waiting>();
  #asked = 0;
  #over: StoreError | undefined;

  private constructor(url: URL, workerData: unknown) {
    this.#worker = new Worker(url, { workerData });
    this.#worker.on('message', (answer: Answer) => this.#settle(answer));
    this.#worker.on('error', (cause) => this.#end(new StoreError('worker-ended', `The store's thread failed: ${String(cause)}`, { cause })));
    this.#worker.on('messageerror', (cause) => this.#end(new StoreError('worker-ended', `An answer of the store's thread cannot be read: ${String(cause)}`, { cause })));
    this.ended = new Promise((resolve) => {
      this.#worker.on('exit', (code) => {
        this.#end(new StoreError('worker-ended', `The store's thread has ended (code ${code}).`));
        resolve();
      });
    });
  }

  /** @throws StoreError of the thread's start, after the thread has ended */
  static async start<C extends Calls, T>(url: URL, workerData: unknown): Promise<{ readonly channel: WorkerChannel<C>; readonly opened: T }> {
    const channel = new WorkerChannel<C>(url, workerData);
    try {
      const opened = await new Promise<T>((resolve, reject) => channel.#waiting.set(0, { resolve, reject }));
      return { channel, opened };
    } catch (error) {
      await channel.ended;
      throw error;
    }
  }

  /** @throws StoreError of the call, or 'worker-ended' */
  call<K extends keyof C & string>(name: K, argument: Parameters<C[K]>[0], transfer: readonly Transferable[] = []): Promise<Awaited<ReturnType<C[K]>>> {
    return new Promise((resolve, reject) => {
      if (this.#over !== undefined) {
        reject(this.#over);
        return;
      }
      const ask = ++this.#asked;
      this.#waiting.set(ask, { resolve, reject });
      this.#worker.postMessage({ ask, name, argument } satisfies Ask, transfer);
    });
  }

  /** Ends the thread by its own call 'close'; resolves when it has ended, also where it had ended by itself before. */
  async close(): Promise<void> {
    if (this.#over === undefined) {
      // A thread that ends while it is asked to end needs no answer: `ended` tells.
      this.call('close', undefined as never).catch(() => undefined);
      this.#over = new StoreError('closed', 'The store is closed.');
    }
    await this.ended;
  }

  #settle(answer: Answer): void {
    const waiting = this.#waiting.get(answer.ask);
    this.#waiting.delete(answer.ask);
    if ('fault' in answer) waiting?.reject(new StoreError(answer.fault, answer.message));
    else waiting?.resolve(answer.answer as never);
  }

  #end(error: StoreError): void {
    this.#over ??= error;
    for (const { reject } of this.#waiting.values()) reject(this.#over);
    this.#waiting.clear();
  }
}
