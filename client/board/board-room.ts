import type { ReactiveController, ReactiveControllerHost } from 'lit';

/** What the board has to draw in, px. */
export interface Room {
  readonly width: number;
  /** From the top of the lanes to the lower end of the window. */
  readonly height: number;
  /** Size of ordinary type. */
  readonly typePx: number;
}

/** Measures the board's room when the window or the board changes size, and draws anew when it did. */
export class BoardRoom implements ReactiveController {
  room: Room | undefined;
  readonly #host: ReactiveControllerHost & HTMLElement;
  #observer: ResizeObserver | undefined;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  hostConnected(): void {
    this.#observer = new ResizeObserver(() => {
      this.#measure();
    });
    this.#observer.observe(this.#host);
    this.#observer.observe(document.documentElement);
    addEventListener('resize', this.#measure);
  }

  hostUpdated(): void {
    this.#measure();
  }

  hostDisconnected(): void {
    this.#observer?.disconnect();
    removeEventListener('resize', this.#measure);
  }

  readonly #measure = (): void => {
    const list = this.#host.shadowRoot?.querySelector('.lanes');
    const typePx = Number.parseFloat(getComputedStyle(document.documentElement).fontSize);
    const top = (list ?? this.#host).getBoundingClientRect().top + scrollY;
    const next = { width: this.#host.clientWidth, height: Math.max(0, innerHeight - top), typePx };
    const old = this.room;
    if (old?.width === next.width && Math.abs(old.height - next.height) < 1 && old.typePx === next.typePx) return;
    this.room = next;
    this.#host.requestUpdate();
  };
}
