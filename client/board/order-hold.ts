import type { ReactiveController } from 'lit';

/** How long the lanes keep their places after the pointer last moved over them, and after a key was last used in one; ms. */
const pointedMs = 8000;
const keyedMs = 30_000;

/** Keeps the lanes where they are while a person points at one or works in one by keyboard. */
export class OrderHold implements ReactiveController {
  readonly #host: HTMLElement;
  readonly #now: () => number;
  #movedAt = Number.NEGATIVE_INFINITY;
  #keyedAt = Number.NEGATIVE_INFINITY;

  constructor(host: HTMLElement & { addController: (controller: ReactiveController) => void }, now: () => number) {
    this.#host = host;
    this.#now = now;
    host.addController(this);
  }

  get holds(): boolean {
    const now = this.#now();
    return now - this.#movedAt < pointedMs || (now - this.#keyedAt < keyedMs && this.#host.matches(':focus-within'));
  }

  hostConnected(): void {
    this.#host.addEventListener('pointermove', this.#onMove, { passive: true });
    this.#host.addEventListener('pointerleave', this.#onLeave, { passive: true });
    this.#host.addEventListener('focusin', this.#onKey);
    this.#host.addEventListener('keydown', this.#onKey);
  }

  hostDisconnected(): void {
    this.#host.removeEventListener('pointermove', this.#onMove);
    this.#host.removeEventListener('pointerleave', this.#onLeave);
    this.#host.removeEventListener('focusin', this.#onKey);
    this.#host.removeEventListener('keydown', this.#onKey);
  }

  readonly #onMove = (): void => {
    this.#movedAt = this.#now();
  };

  readonly #onKey = (): void => {
    this.#keyedAt = this.#now();
  };

  readonly #onLeave = (): void => {
    this.#movedAt = Number.NEGATIVE_INFINITY;
  };
}
