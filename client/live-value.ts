import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { animationFrameScheduler, auditTime, type Observable, type SchedulerLike, type Subscription } from 'rxjs';

/** Holds the newest value of a stream while its host is on the page; at most one drawing per frame. */
export class LiveValue<T> implements ReactiveController {
  value: T | undefined;
  readonly #host: ReactiveControllerHost;
  readonly #newest$: Observable<T>;
  #subscription: Subscription | undefined;

  constructor(host: ReactiveControllerHost, values$: Observable<T>, frames: SchedulerLike = animationFrameScheduler) {
    this.#host = host;
    this.#newest$ = values$.pipe(auditTime(0, frames));
    host.addController(this);
  }

  hostConnected(): void {
    this.#subscription = this.#newest$.subscribe((value) => {
      this.value = value;
      this.#host.requestUpdate();
    });
  }

  hostDisconnected(): void {
    this.#subscription?.unsubscribe();
  }
}
