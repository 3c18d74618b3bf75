import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { isDoor, routeOf, type Route } from './route.ts';

/**
 * Follows the page's address: links inside the page change it without loading anew, back and forward work. What stands
 * behind # is a secret of a link: it is taken out of the address at once.
 */
export class PageAddress implements ReactiveController {
  route: Route = routeOf(location.pathname);
  /** What stood behind # when the page was come to; empty if nothing did. */
  secret = '';
  readonly #host: ReactiveControllerHost & HTMLElement;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    this.#takeSecret();
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

  get isDoor(): boolean {
    return isDoor(this.route);
  }

  /** @param how  'instead': going back does not lead here again */
  go(path: string, how: 'next' | 'instead' = 'next'): void {
    if (how === 'instead') history.replaceState(null, '', path);
    else if (path !== location.pathname) history.pushState(null, '', path);
    this.#follow();
    scrollTo(0, 0);
    void this.#host.updateComplete.then(() => {
      const main = this.#host.shadowRoot?.querySelector<HTMLElement>('main');
      if (main?.matches(':focus-within') === false) main.focus();
    });
  }

  #takeSecret(): void {
    const secret = location.hash.slice(1);
    const { kind } = this.route;
    this.secret = secret;
    if (secret !== '' && (kind === 'join' || kind === 'display')) history.replaceState(null, '', location.pathname);
  }

  /** A changed # is a step in the history too. */
  readonly #follow = (): void => {
    this.route = routeOf(location.pathname);
    if (location.hash !== '' || (this.route.kind !== 'join' && this.route.kind !== 'display')) this.#takeSecret();
    this.#host.requestUpdate();
  };

  readonly #onClick = (event: MouseEvent): void => {
    if (event.defaultPrevented || event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey) return;
    const link = event.composedPath().find((node) => node instanceof HTMLAnchorElement);
    if (link === undefined || link.origin !== location.origin || link.target !== '' || link.hash !== '') return;
    if (link.pathname.startsWith('/api/')) return; // a file or a way out, not a page
    event.preventDefault();
    this.go(link.pathname);
  };
}
