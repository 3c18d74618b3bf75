import type { ReactiveController, ReactiveControllerHost } from 'lit';

/** Width of its host in whole px; draws anew when it changes, so that drawings are made for their size. */
export class ElementWidth implements ReactiveController {
  px = 0;
  readonly #host: ReactiveControllerHost & HTMLElement;
  #observer: ResizeObserver | undefined;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  hostConnected(): void {
    this.#observer = new ResizeObserver(() => {
      const px = Math.floor(this.#host.clientWidth);
      if (px === this.px) return;
      this.px = px;
      this.#host.requestUpdate();
    });
    this.#observer.observe(this.#host);
  }

  hostDisconnected(): void {
    this.#observer?.disconnect();
  }
}
