import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { base } from '../look/base.ts';
import type { Settings } from '../settings.ts';

type Choice<K extends keyof Settings> = readonly [Settings[K], string];

/** How this browser shows things: unit of shares, grouping, light or dark, wall. Fires `vouchline-settings`. */
export class ViewPanel extends LitElement {
  static override properties = { settings: { attribute: false }, wall: { type: Boolean, reflect: true } };

  static override styles = [base, css`
    :host { position: relative; }
    summary { list-style: none; cursor: pointer; padding: 0.35rem 0.75rem; border-radius: 5px; font-weight: 650; user-select: none; }
    summary::-webkit-details-marker { display: none; }
    summary::after { content: ''; display: inline-block; margin-left: 0.45em; border: 0.3em solid transparent; border-top-color: currentColor; border-bottom: 0; vertical-align: 0.12em; }
    summary:hover { background: var(--raised); }
    .panel {
      position: absolute; right: 0; top: calc(100% + 0.3rem); z-index: 8; width: 19rem; background: var(--raised); border: 1px solid var(--edge);
      border-radius: 8px; padding: 0.9rem 1rem 1rem; display: grid; gap: 0.85rem; box-shadow: 0 8px 24px rgb(0 0 0 / 0.18);
    }
    fieldset { border: 0; margin: 0; padding: 0; }
    legend { padding: 0; font-size: 0.86rem; color: var(--quiet); margin-bottom: 0.25rem; }
    .choices { display: grid; grid-auto-flow: column; grid-auto-columns: 1fr; border: 1.5px solid var(--edge); border-radius: 5px; overflow: clip; }
    label { display: grid; place-items: center; padding: 0.32em 0.2em; cursor: pointer; font-weight: 600; position: relative; }
    label + label { border-left: 1px solid var(--edge); }
    input { position: absolute; opacity: 0; inset: 0; width: 100%; cursor: pointer; }
    label:has(:checked) { background: var(--button); color: var(--button-ink); }
    label:has(:focus-visible) { outline: 3px solid var(--focus); outline-offset: -3px; }
    @media (max-width: 760px) { summary { padding: 0.75rem; } label { padding-block: 0.75em; } }
    :host([wall]) summary { font-size: 0.85rem; }
    :host([wall]) .panel { font-size: 0.85rem; }
  `];

  declare settings: Settings | undefined;
  declare wall: boolean;

  protected override render(): TemplateResult | typeof nothing {
    const { settings } = this;
    if (settings === undefined) return nothing;
    return html`<details @keydown=${this.#onKey} @focusout=${this.#onLeave}>
      <summary>View</summary>
      <div class="panel">
        ${this.#choose('Shares of units', 'shareUnit', [['ppm', 'ppm'], ['%', '%'], ['1 in N', '1 in N']], settings)}
        ${this.#choose('Lanes', 'grouped', [[false, 'All together'], [true, 'By line']], settings)}
        ${this.#choose('Light', 'theme', [['auto', 'As the system'], ['light', 'Light'], ['dark', 'Dark']], settings)}
        ${this.#choose('Wall: large, few words', 'wall', [['auto', 'By size'], ['on', 'On'], ['off', 'Off']], settings)}
      </div>
    </details>`;
  }

  #choose<K extends keyof Settings>(name: string, key: K, choices: readonly Choice<K>[], settings: Settings): TemplateResult {
    return html`<fieldset><legend>${name}</legend><div class="choices">${choices.map(([value, words]) => html`<label>
      <input type="radio" name=${key} .checked=${settings[key] === value} @change=${() => {
        this.dispatchEvent(new CustomEvent<Partial<Settings>>('vouchline-settings', { bubbles: true, composed: true, detail: { [key]: value } }));
      }} />${words}</label>`)}</div></fieldset>`;
  }

  readonly #onKey = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape') return;
    this.#close();
    this.renderRoot.querySelector('summary')?.focus();
  };

  readonly #onLeave = (event: FocusEvent): void => {
    if (event.relatedTarget instanceof Node && !this.renderRoot.contains(event.relatedTarget)) this.#close();
  };

  #close(): void {
    this.renderRoot.querySelector('details')?.removeAttribute('open');
  }
}

customElements.define('view-panel', ViewPanel);
