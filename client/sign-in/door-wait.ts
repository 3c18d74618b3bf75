import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { interval, type Subscription } from 'rxjs';
import { Refusal } from '../ask.ts';

/** Counts down how long no further try is taken, after a refusal that says so. */
export class DoorWait implements ReactiveController {
  leftS = 0;
  readonly #host: ReactiveControllerHost;
  #beat: Subscription | undefined;

  constructor(host: ReactiveControllerHost) {
    this.#host = host;
    host.addController(this);
  }

  hostDisconnected(): void {
    this.#beat?.unsubscribe();
  }

  /** Begins to count if the refusal says how long; throws it on. */
  readonly heed = (cause: unknown): never => {
    if (cause instanceof Refusal && cause.retryAfterS !== undefined) this.#begin(Math.ceil(cause.retryAfterS));
    throw cause;
  };

  #begin(seconds: number): void {
    this.#beat?.unsubscribe();
    this.leftS = seconds;
    this.#beat = interval(1000).subscribe(() => {
      this.leftS -= 1;
      if (this.leftS <= 0) this.#beat?.unsubscribe();
      this.#host.requestUpdate();
    });
  }
}
