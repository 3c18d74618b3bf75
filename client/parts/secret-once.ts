import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { base } from '../look/base.ts';

/** A link or token that is shown this once, with a button that copies it. */
export class SecretOnce extends LitElement {
  static override properties = { secret: { attribute: false }, label: {}, note: {}, said: { state: true } };

  static override styles = [base, css`
    section { border: 2px solid var(--ink); border-radius: 8px; padding: 0.8rem 1rem 0.95rem; background: var(--raised); display: grid; gap: 0.5rem; }
    label { font-weight: 700; }
    .line { display: grid; grid-template-columns: minmax(0, 1fr) auto; gap: 0.5rem; margin-top: 0.3rem; }
    input { font-family: ui-monospace, 'DejaVu Sans Mono', monospace; font-size: 0.93rem; text-overflow: ellipsis; }
    p { text-wrap: pretty; }
    @media (max-width: 480px) { .line { grid-template-columns: minmax(0, 1fr); } }
  `];

  /** Empty: nothing is shown. */
  declare secret: string;
  declare label: string;
  declare note: string;
  declare said: string;

  constructor() {
    super();
    this.secret = '';
    this.said = '';
  }

  protected override willUpdate(changed: Map<string, unknown>): void {
    if (changed.has('secret')) this.said = '';
  }

  protected override updated(changed: Map<string, unknown>): void {
    if (!changed.has('secret') || this.secret === '') return;
    this.scrollIntoView({ block: 'nearest' });
    this.renderRoot.querySelector('button')?.focus();
  }

  protected override render(): TemplateResult | typeof nothing {
    if (this.secret === '') return nothing;
    return html`<section aria-label=${this.label}>
      <div><label for="secret">${this.label}</label>
        <div class="line"><input id="secret" readonly .value=${this.secret} aria-describedby="note" @focus=${(event: FocusEvent) => { if (event.target instanceof HTMLInputElement) event.target.select(); }} />
          <button type="button" class="first" @click=${this.#copy}>Copy</button></div></div>
      <p id="note">Shown this once: only a fingerprint of it is kept. ${this.note}</p>
      <p role="status">${this.said}</p>
    </section>`;
  }

  readonly #copy = async (): Promise<void> => {
    try {
      await navigator.clipboard.writeText(this.secret);
      this.said = 'Copied.';
    } catch {
      // Over plain HTTP a browser gives no access to the clipboard; the person's own keys still do.
      this.renderRoot.querySelector('input')?.select();
      this.said = 'Selected; copy it with Ctrl and C.';
    }
  };
}

customElements.define('secret-once', SecretOnce);

declare global {
  interface HTMLElementTagNameMap {
    'secret-once': SecretOnce;
  }
}
