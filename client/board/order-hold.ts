import type { ReactiveController } from 'lit';

/** How long after the pointer last moved over the board the lanes keep their places, ms. */
const holdMs = 8000;

/** Keeps the lanes where they are while a person points at one or has the focus in one. */
export class OrderHold implements ReactiveController {
  readonly #host: HTMLElement;
  readonly #now: () => number;
  #movedAt = Number.NEGATIVE_INFINITY;

  constructor(host: HTMLElement & { addController: (controller: ReactiveController) => void }, now: () => number) {
    this.#host = host;
    this.#now = now;
    host.addController(this);
  }

  get holds(): boolean {
    return this.#host.matches(':focus-within') || this.#now() - this.#movedAt < holdMs;
  }

  hostConnected(): void {
    this.#host.addEventListener('pointermove', this.#onMove, { passive: true });
    this.#host.addEventListener('pointerleave', this.#onLeave, { passive: true });
  }

  hostDisconnected(): void {
    this.#host.removeEventListener('pointermove', this.#onMove);
    this.#host.removeEventListener('pointerleave', this.#onLeave);
  }

  readonly #onMove = (): void => {
    this.#movedAt = this.#now();
  };

  readonly #onLeave = (): void => {
    this.#movedAt = Number.NEGATIVE_INFINITY;
  };
}
