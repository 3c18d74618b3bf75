import { html, LitElement, nothing, type TemplateResult } from 'lit';
import { pinFault, pinLength } from '../../core/access/pin-fault.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { passwordField } from '../parts/password-field.ts';
import { textField } from '../parts/text-field.ts';
import type { OwnDesk } from './own-desk.ts';

/** The PIN by which one acknowledges at a screen that several people share. */
export class OwnPin extends LitElement {
  static override properties = { desk: { attribute: false }, hasPassword: { attribute: false }, said: { state: true } };
  static override styles = [base, form, ownPage];

  declare desk: OwnDesk;
  /** Whether it is asked for again. */
  declare hasPassword: boolean;
  declare said: string;
  readonly #sending = new FormSending(this);

  constructor() {
    super();
    this.said = '';
  }

  protected override render(): TemplateResult {
    return html`<section class="sheet part"><h2>PIN for shared screens</h2>
      <p class="hint">With it you acknowledge at a screen that several people share, under your own name, and nothing else. Leave the field empty to take the PIN away.</p>
      <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event); }}>
        ${textField(this.#sending, { name: 'pin', label: 'New PIN', type: 'password', most: pinLength.most, narrow: true, hint: `${pinLength.least} to ${pinLength.most} digits, no run and not one digit again and again.` })}
        ${this.hasPassword ? passwordField(this.#sending, { name: 'password', label: 'Your password', fresh: false }, 0, () => undefined) : nothing}
        <p class="fault" role="alert">${this.#sending.beyond(['pin', 'password'])}</p>
        <div class="does"><button ?disabled=${this.#sending.busy}>Set the PIN</button></div>
        ${this.said === '' ? nothing : html`<p class="said" role="status">${this.said}</p>`}
      </form></section>`;
  }

  async #onSubmit(event: SubmitEvent): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const pin = text('pin').trim();
    this.said = '';
    const fault = pin === '' ? undefined : pinFault(pin);
    if (fault !== undefined) return this.#sending.refuse('pin', fault);
    if (!(await this.#sending.send(() => (pin === '' ? this.desk.dropPin(text('password')) : this.desk.setPin(text('password'), pin))))) return;
    sent.reset();
    this.said = pin === '' ? 'You have no PIN any more.' : 'The PIN is set.';
  }
}

customElements.define('own-pin', OwnPin);
