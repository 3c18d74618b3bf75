import type { ReactiveController, ReactiveControllerHost } from 'lit';
import type { PlainPage } from './route.ts';

type FetchedPage = Exclude<PlainPage, 'alarms'>;

/** Pages that are fetched when they are first opened, so that the board stays small. */
const fetchers: Readonly<Record<FetchedPage, () => Promise<unknown>>> = {
  'sign-in': () => import('./sign-in/sign-in-page.ts'),
  join: () => import('./sign-in/join-page.ts'),
  display: () => import('./sign-in/display-page.ts'),
  account: () => import('./account/account-page.ts'),
  people: () => import('./people/people-page.ts'),
  displays: () => import('./displays/displays-page.ts'),
  sources: () => import('./sources/sources-page.ts'),
  changes: () => import('./changes/changes-page.ts'),
};

/** Fetches pages and knows how each stands. */
export class FetchedPages implements ReactiveController {
  readonly #host: ReactiveControllerHost;
  readonly #stand = new Map<FetchedPage, 'coming' | 'here' | 'failed'>();

  constructor(host: ReactiveControllerHost) {
    this.#host = host;
    host.addController(this);
  }

  hostConnected(): void {
    this.#host.requestUpdate();
  }

  /** How a page stands; begins to fetch it where that is not done yet. */
  standOf(page: FetchedPage): 'coming' | 'here' | 'failed' {
    const stand = this.#stand.get(page);
    if (stand === undefined) void this.#fetch(page);
    return stand ?? 'coming';
  }

  async #fetch(page: FetchedPage): Promise<void> {
    this.#stand.set(page, 'coming');
    try {
      await fetchers[page]();
      this.#stand.set(page, 'here');
    } catch {
      this.#stand.set(page, 'failed'); // told on the page: after an update of the server its old parts are gone
    }
    this.#host.requestUpdate();
  }
}
