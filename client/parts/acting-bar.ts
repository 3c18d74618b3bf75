import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { base } from '../look/base.ts';
import { PersonRequest } from './person-menu.ts';

/** Says under whose name acknowledging goes on record here for the moment, for how long, and ends it. */
export class ActingBar extends LitElement {
  static override properties = { name: { attribute: false }, leftMs: { attribute: false } };

  static override styles = [base, css`
    div { display: flex; gap: 0.4rem 1.2rem; align-items: center; flex-wrap: wrap; border: 2px solid var(--ink); border-radius: 6px; padding: 0.4rem 0.5rem 0.4rem 0.9rem; margin-bottom: 0.7rem; background: var(--sheet); }
    p { flex: 1 1 14rem; overflow-wrap: anywhere; }
  `];

  declare name: string | undefined;
  /** Until it ends by itself, ms. */
  declare leftMs: number;

  protected override render(): TemplateResult {
    return html`${this.name === undefined ? nothing : html`<div role="group" aria-label="Acting by PIN">
      <p>Acknowledging as <b>${this.name}</b> for ${this.#left()}.</p>
      <button @click=${() => this.dispatchEvent(new PersonRequest('end-acting'))}>End now</button>
    </div>`}<span class="unseen" role="status">${this.name === undefined ? '' : `Now acknowledging as ${this.name}`}</span>`;
  }

  #left(): string {
    const seconds = Math.max(0, Math.ceil(this.leftMs / 1000));
    return seconds > 60 ? `${Math.floor(seconds / 60)} min ${seconds % 60} s` : `${seconds} s`;
  }
}

customElements.define('acting-bar', ActingBar);
