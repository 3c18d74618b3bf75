import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { routeOf, type Route } from './route.ts';

/** Follows the page's address: links inside the page change it without loading anew, back and forward work. */
export class PageAddress implements ReactiveController {
  route: Route = routeOf(location.pathname);
  readonly #host: ReactiveControllerHost & HTMLElement;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  hostConnected(): void {
    addEventListener('popstate', this.#follow);
    this.#host.addEventListener('click', this.#onClick);
  }

  hostDisconnected(): void {
    removeEventListener('popstate', this.#follow);
    this.#host.removeEventListener('click', this.#onClick);
  }

  readonly #follow = (): void => {
    this.route = routeOf(location.pathname);
    this.#host.requestUpdate();
  };

  readonly #onClick = (event: MouseEvent): void => {
    if (event.defaultPrevented || event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey) return;
    const link = event.composedPath().find((node) => node instanceof HTMLAnchorElement);
    if (link === undefined || link.origin !== location.origin || link.target !== '' || link.hash !== '') return;
    event.preventDefault();
    if (link.pathname !== location.pathname) history.pushState(null, '', link.pathname);
    this.#follow();
    scrollTo(0, 0);
    void this.#host.updateComplete.then(() => this.#host.shadowRoot?.querySelector<HTMLElement>('main')?.focus());
  };
}
