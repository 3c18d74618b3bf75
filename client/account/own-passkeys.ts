import { html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { Loaded } from '../parts/loaded.ts';
import { passwordField } from '../parts/password-field.ts';
import '../parts/sure-dialog.ts';
import { textField, type TextField } from '../parts/text-field.ts';
import { newPasskey } from '../sign-in/passkey-answer.ts';
import type { OwnDesk, OwnPasskey } from './own-desk.ts';

const passwordAgain: TextField = { name: 'password', label: 'Your password', type: 'password', autocomplete: 'current-password', required: true };

/** Passkeys of one's account: a device or key that signs one in, beside the password or instead of it. */
export class OwnPasskeys extends LitElement {
  static override properties = { desk: { attribute: false }, hasPassword: { attribute: false }, formats: { attribute: false }, said: { state: true } };
  static override styles = [base, form, ownPage];

  declare desk: OwnDesk;
  /** Whether it is asked for again. */
  declare hasPassword: boolean;
  declare formats: Formats;
  declare said: string;
  readonly #sending = new FormSending(this);
  readonly #passkeys = new Loaded(this, () => this.desk.passkeys());

  constructor() {
    super();
    this.said = '';
  }

  protected override render(): TemplateResult {
    return html`<section class="sheet part">
      <h2>Passkeys</h2>
      <p class="hint">A passkey lives in a device or a security key and never leaves it. Nobody can be talked out of one.</p>
      ${this.#passkeys.view('Your passkeys', (passkeys) => passkeys.length === 0
        ? html`<p class="empty">You have no passkey.</p>`
        : html`<ul class="rows">${passkeys.map((passkey) => this.#row(passkey))}</ul>`)}
      <p class="said" role="status">${this.said}</p>
      <details><summary>Add a passkey</summary>
        <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event); }}>
          ${textField(this.#sending, { name: 'name', label: 'What it is', hint: '“Phone”, “Key on my ring”', required: true, most: 80 })}
          ${this.hasPassword ? passwordField(this.#sending, { name: 'password', label: 'Your password', fresh: false }, 0, () => undefined) : nothing}
          <p class="fault" role="alert">${this.#sending.beyond(['name', 'password'])}</p>
          <div class="does"><button ?disabled=${this.#sending.busy}>Add the passkey</button></div>
        </form></details>
      <sure-dialog></sure-dialog>
    </section>`;
  }

  #row(passkey: OwnPasskey): TemplateResult {
    const { name, made, lastUsed } = passkey;
    return html`<li>
      <div><b>${name}</b><br /><span class="quiet">Since ${this.formats.date(made)}, ${lastUsed === undefined ? 'never used' : `last used ${this.formats.moment(lastUsed)}`}</span></div>
      <div class="does"><button aria-label="Remove: ${name}" @click=${() => { void this.#drop(passkey); }}>Remove</button></div>
    </li>`;
  }

  async #onSubmit(event: SubmitEvent): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    this.said = '';
    const done = await this.#sending.send(async () => { await this.desk.finishPasskey(text('name'), await newPasskey(await this.desk.beginPasskey(text('password')))); });
    if (!done) return;
    this.said = `The passkey “${text('name')}” is added.`;
    sent.reset();
    sent.closest('details')?.removeAttribute('open');
    await this.#passkeys.reload();
  }

  async #drop({ id, name }: OwnPasskey): Promise<void> {
    const done = await this.renderRoot.querySelector('sure-dialog')?.ask({ title: `Remove “${name}”?`, says: 'It signs you in no more. Add it again if you want it back.', does: 'Remove', fields: this.hasPassword ? [passwordAgain] : [], send: (text) => this.desk.dropPasskey(id, text('password')) });
    if (done === true) await this.#passkeys.reload();
  }
}

customElements.define('own-passkeys', OwnPasskeys);
