import { css, html, LitElement, type TemplateResult } from 'lit';
import { pinLength } from '../../core/access/pin-fault.ts';
import { base } from '../look/base.ts';

/** Keys for a PIN, large enough for gloves; a keyboard types into the field. Fires `vouchline-pin` with the digits. */
export class PinPad extends LitElement {
  static override properties = { label: { attribute: false }, does: { attribute: false }, busy: { attribute: false }, digits: { state: true } };

  static override styles = [base, css`
    form { display: grid; gap: 0.8rem; }
    label { display: grid; gap: 0.2rem; font-weight: 600; }
    input { font-size: 1.9rem; letter-spacing: 0.35em; text-align: center; padding-block: 0.25em; }
    .keys { display: grid; grid-template-columns: repeat(3, 1fr); gap: 0.5rem; }
    .keys button { min-height: 4.2rem; font-size: 1.6rem; padding: 0; }
    .keys .word { font-size: 1.05rem; }
    .first { min-height: 3.6rem; font-size: 1.15rem; }
    @media (max-height: 700px) { .keys button { min-height: 3.2rem; } }
  `];

  declare label: string;
  declare does: string;
  declare busy: boolean;
  declare digits: string;

  constructor() {
    super();
    this.digits = '';
  }

  override focus(): void {
    this.renderRoot.querySelector('input')?.focus();
  }

  /** Empties the field for another try. */
  clear(): void {
    this.digits = '';
    void this.updateComplete.then(() => { this.focus(); });
  }

  protected override render(): TemplateResult {
    return html`<form @submit=${this.#onSubmit}>
      <label>${this.label}<input type="password" inputmode="none" autocomplete="off" maxlength=${pinLength.most} .value=${this.digits} @input=${this.#onInput} /></label>
      <div class="keys" role="group" aria-label="Keys">
        ${['1', '2', '3', '4', '5', '6', '7', '8', '9'].map((digit) => this.#key(digit))}
        <button type="button" class="word" @click=${() => { this.digits = ''; }}>Clear</button>
        ${this.#key('0')}
        <button type="button" class="word" aria-label="Take back the last digit" @click=${() => { this.digits = this.digits.slice(0, -1); }}>Back</button>
      </div>
      <button class="first" ?disabled=${this.busy || this.digits.length < pinLength.least}>${this.does}</button>
    </form>`;
  }

  #key(digit: string): TemplateResult {
    return html`<button type="button" @click=${() => { if (this.digits.length < pinLength.most) this.digits += digit; }}>${digit}</button>`;
  }

  readonly #onInput = (event: Event): void => {
    if (!(event.target instanceof HTMLInputElement)) return;
    this.digits = event.target.value.replace(/\D/g, '').slice(0, pinLength.most);
    event.target.value = this.digits;
  };

  readonly #onSubmit = (event: SubmitEvent): void => {
    event.preventDefault();
    if (this.digits.length >= pinLength.least && !this.busy) this.dispatchEvent(new CustomEvent('vouchline-pin', { detail: this.digits }));
  };
}

customElements.define('pin-pad', PinPad);

declare global {
  interface HTMLElementTagNameMap {
    'pin-pad': PinPad;
  }
}
