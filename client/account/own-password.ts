import { html, LitElement, type TemplateResult } from 'lit';
import { passwordFault } from '../../core/access/password-length.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { passwordField } from '../parts/password-field.ts';
import type { OwnDesk } from './own-desk.ts';

/** A new password of one's own. */
export class OwnPassword extends LitElement {
  static override properties = { desk: { attribute: false }, length: { state: true }, said: { state: true } };
  static override styles = [base, form, ownPage];

  declare desk: OwnDesk;
  declare length: number;
  declare said: string;
  readonly #sending = new FormSending(this);

  constructor() {
    super();
    this.length = 0;
    this.said = '';
  }

  protected override render(): TemplateResult {
    return html`<section class="sheet part"><h2>Password</h2>
      <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event); }}>
        ${passwordField(this.#sending, { name: 'old', label: 'Present password', fresh: false }, 0, () => undefined)}
        ${passwordField(this.#sending, { name: 'new', label: 'New password', fresh: true }, this.length, (length) => { this.length = length; })}
        <p class="fault" role="alert">${this.#sending.beyond(['old', 'new'])}</p>
        <div class="does"><button ?disabled=${this.#sending.busy}>Set the password</button></div>
        <p class="said" role="status">${this.said}</p>
      </form></section>`;
  }

  async #onSubmit(event: SubmitEvent): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    this.said = '';
    const fault = passwordFault(text('new'));
    if (fault !== undefined) return this.#sending.refuse('new', fault);
    if (!(await this.#sending.send(() => this.desk.setPassword(text('old'), text('new'))))) return;
    sent.reset();
    this.length = 0;
    this.said = 'The password is set; everywhere else you are signed out.';
  }
}

customElements.define('own-password', OwnPassword);
