import { Subject, type Observable } from 'rxjs';
import type { Arrival } from './arrival.ts';

/** Arrivals that do not wait for the end of the turn: a source's usual window of frames. */
const mostAtOnce = 64;

/**
 * Where everything comes in that is to be judged. What arrives within one turn of the event loop leaves as one
 * batch, so that judging and writing are paid for once a batch; much of it leaves at once, while it is in the caches.
 */
export class Inbox {
  readonly arrivals$: Observable<readonly Arrival[]>;
  /** Private edge: sockets, requests and timers have no common event source of their own. */
  readonly #batches = new Subject<readonly Arrival[]>();
  #waiting: Arrival[] = [];
  #scheduled = false;
  #closed = false;

  constructor() {
    this.arrivals$ = this.#batches.asObservable();
  }

  /** @returns false if the inbox is closed: the arrival is not taken */
  put(arrival: Arrival): boolean {
    if (this.#closed) return false;
    this.#waiting.push(arrival);
    if (this.#waiting.length >= mostAtOnce) this.#flush();
    else if (!this.#scheduled) {
      this.#scheduled = true;
      setImmediate(() => {
        this.#scheduled = false;
        this.#flush();
      });
    }
    return true;
  }

  /** Takes nothing more; what waits still leaves, then the stream completes. */
  close(): void {
    this.#closed = true;
    this.#flush();
    this.#batches.complete();
  }

  #flush(): void {
    if (this.#waiting.length === 0) return;
    const batch = this.#waiting;
    this.#waiting = [];
    this.#batches.next(batch);
  }
}
