import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { base } from '../look/base.ts';
import type { Settings } from '../settings.ts';
import { DropDown, dropDownStyle } from './drop-down.ts';

type Choice<K extends keyof Settings> = readonly [Settings[K], string];

/** How this browser shows things: unit of shares, grouping, light or dark, wall. Fires `vouchline-settings`. */
export class ViewPanel extends LitElement {
  static override properties = { settings: { attribute: false }, wall: { type: Boolean, reflect: true } };

  static override styles = [base, dropDownStyle, css`
    fieldset { border: 0; margin: 0; padding: 0; }
    legend { padding: 0; font-size: 0.86rem; color: var(--quiet); margin-bottom: 0.25rem; }
    .choices { display: grid; grid-auto-flow: column; grid-auto-columns: 1fr; border: 1.5px solid var(--edge); border-radius: 5px; overflow: clip; }
    label { display: grid; place-items: center; padding: 0.32em 0.2em; cursor: pointer; font-weight: 600; position: relative; }
    label + label { border-left: 1px solid var(--edge); }
    input { position: absolute; opacity: 0; inset: 0; width: 100%; cursor: pointer; }
    label:has(:checked) { background: var(--button); color: var(--button-ink); }
    label:has(:focus-visible) { outline: 3px solid var(--focus); outline-offset: -3px; }
    @media (max-width: 760px) { label { padding-block: 0.75em; } }
  `];

  declare settings: Settings | undefined;
  declare wall: boolean;

  constructor() {
    super();
    new DropDown(this);
  }

  protected override render(): TemplateResult | typeof nothing {
    const { settings } = this;
    if (settings === undefined) return nothing;
    return html`<details>
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
}

customElements.define('view-panel', ViewPanel);
