import { setImmediate } from 'node:timers/promises';

/** A figure that comes nearer step by step, with the share of the way that is done, 0 to 1. */
interface Stepping {
  readonly done: number;
}

/** Stopped before it was finished, because somebody asked for it. */
export class Cancelled extends Error {
  constructor() {
    super('cancelled');
  }
}

/** How a long computation is watched. */
export interface RunWatch {
  readonly stop: AbortSignal;
  /** milliseconds from any fixed moment; the caller's clock */
  readonly now: () => number;
  /** told when it has taken longer than 300 ms, and then each quarter of a second */
  readonly progress: (done: number) => void;
}

const silentMs = 300;
const everyMs = 250;

/**
 * Runs a computation in its steps, letting signals and input through between them.
 *
 * @param enough whether the figure so far is good enough to stop
 * @throws Cancelled when the watch says stop
 */
export async function runLong<T extends Stepping>(steps: Generator<T, T, undefined>, watch: RunWatch, enough: (figure: T) => boolean): Promise<T> {
  let next = watch.now() + silentMs;
  for (;;) {
    if (watch.stop.aborted) throw new Cancelled();
    const { done, value } = steps.next();
    if (done === true || enough(value)) return value;
    if (watch.now() >= next) {
      watch.progress(value.done);
      next = watch.now() + everyMs;
    }
    await setImmediate();
  }
}
