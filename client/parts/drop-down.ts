import { css, type ReactiveController, type ReactiveControllerHost } from 'lit';

/** A summary whose panel hangs below it. */
export const dropDownStyle = css`
  :host { position: relative; }
  summary { list-style: none; cursor: pointer; padding: 0.35rem 0.75rem; border-radius: 5px; font-weight: 650; user-select: none; }
  summary::-webkit-details-marker { display: none; }
  summary::after { content: ''; display: inline-block; margin-left: 0.45em; border: 0.3em solid transparent; border-top-color: currentColor; border-bottom: 0; vertical-align: 0.12em; }
  summary:hover { background: var(--raised); }
  .panel {
    position: absolute; right: 0; top: calc(100% + 0.3rem); z-index: 8; width: 19rem; background: var(--raised); border: 1px solid var(--edge);
    border-radius: 8px; padding: 0.9rem 1rem 1rem; display: grid; gap: 0.85rem; box-shadow: 0 8px 24px rgb(0 0 0 / 0.18);
  }
  @media (max-width: 760px) { summary { padding: 0.75rem; } }
  :host([wall]) summary, :host([wall]) .panel { font-size: 0.85rem; }
`;

/** Closes its host's drop-down with Escape, and when the focus or a followed link leaves it. */
export class DropDown implements ReactiveController {
  readonly #host: ReactiveControllerHost & HTMLElement;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  hostConnected(): void {
    this.#host.addEventListener('keydown', this.#onKey);
    this.#host.addEventListener('focusout', this.#onLeave);
  }

  hostDisconnected(): void {
    this.#host.removeEventListener('keydown', this.#onKey);
    this.#host.removeEventListener('focusout', this.#onLeave);
  }

  readonly close = (): void => {
    this.#host.shadowRoot?.querySelector('details')?.removeAttribute('open');
  };

  readonly #onKey = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape') return;
    this.close();
    this.#host.shadowRoot?.querySelector('summary')?.focus();
  };

  readonly #onLeave = (event: FocusEvent): void => {
    const { relatedTarget } = event;
    if (relatedTarget instanceof Node && relatedTarget !== this.#host && this.#host.shadowRoot?.contains(relatedTarget) === false) this.close();
  };
}
