import { html, type nothing, type ReactiveController, type ReactiveControllerHost, type TemplateResult } from 'lit';
import { reasonOf } from '../ask.ts';

type Load<T> =
  | { readonly kind: 'coming' }
  | { readonly kind: 'here'; readonly value: T }
  | { readonly kind: 'failed'; readonly why: string };

/** Something read from the server when its host comes onto the page, and again when told to. */
export class Loaded<T> implements ReactiveController {
  load: Load<T> = { kind: 'coming' };
  readonly #host: ReactiveControllerHost;
  readonly #read: () => Promise<T>;
  #asked = 0;

  /** @param read  resolves with what is shown; its failure is shown with a way to try again */
  constructor(host: ReactiveControllerHost, read: () => Promise<T>) {
    this.#host = host;
    this.#read = read;
    host.addController(this);
  }

  hostConnected(): void {
    void this.reload();
  }

  /** Reads again; what was shown stays until the answer is here. */
  async reload(): Promise<void> {
    this.#asked += 1;
    const asked = this.#asked;
    if (this.load.kind === 'failed') this.#show({ kind: 'coming' });
    const load = await this.#read().then((value): Load<T> => ({ kind: 'here', value }), (cause: unknown): Load<T> => ({ kind: 'failed', why: reasonOf(cause) }));
    if (asked === this.#asked) this.#show(load);
  }

  /** @param what  of what is read, for the failure's sentence: 'The displays' */
  view(what: string, here: (value: T) => TemplateResult | typeof nothing): TemplateResult | typeof nothing {
    switch (this.load.kind) {
      case 'coming':
        return html`<p class="quiet coming" role="status">Reading.</p>`;
      case 'failed':
        return html`<div class="failed" role="alert"><p>${what} could not be read: ${this.load.why}.</p><button type="button" @click=${() => { void this.reload(); }}>Try again</button></div>`;
      case 'here':
        return here(this.load.value);
    }
  }

  #show(load: Load<T>): void {
    this.load = load;
    this.#host.requestUpdate();
  }
}
