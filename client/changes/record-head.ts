import { css, html, LitElement, type TemplateResult } from 'lit';
import { base } from '../look/base.ts';
import { ownPage } from '../look/own-page.ts';
import { Loaded } from '../parts/loaded.ts';

export interface ChainHead {
  readonly id: number;
  readonly hash: string;
}

/** The newest link of the record's chain: noted elsewhere, it finds a record that was written anew as a whole. */
export class RecordHead extends LitElement {
  static override properties = { read: { attribute: false } };
  static override styles = [base, ownPage, css`
    .head { display: block; padding: 0.5rem 0.7rem; border: 1px solid var(--edge); border-radius: 5px; background: var(--raised); user-select: all; overflow-wrap: anywhere; }
  `];

  declare read: () => Promise<ChainHead>;
  readonly #head = new Loaded(this, () => this.read());

  /** Reads it again. */
  reload(): void {
    void this.#head.reload();
  }

  protected override render(): TemplateResult {
    return html`<section class="sheet part"><h2>Head of the record</h2>
      ${this.#head.view('The head', ({ id, hash }) => id === 0
        ? html`<p class="empty">Nothing is on record yet.</p>`
        : html`<code class="head">${id}:${hash}</code>
          <p>Note it elsewhere now and then, on paper or another machine. Every record carries the hash of the one before, so whatever is altered or taken out is found; only a head noted elsewhere finds a record that was written anew as a whole.</p>
          <p>Check it where the data lie:</p>
          <code class="head">vouchline check --data DIR --head ${id}:${hash}</code>`)}
    </section>`;
  }
}

customElements.define('record-head', RecordHead);

declare global {
  interface HTMLElementTagNameMap {
    'record-head': RecordHead;
  }
}
