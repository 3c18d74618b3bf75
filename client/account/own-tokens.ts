import { html, LitElement, type TemplateResult } from 'lit';
import type { Action } from '../../core/access/action.ts';
import { mayDoSomewhere, type Caller } from '../access/me.ts';
import { actionWord, listed } from '../access/role-words.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { Loaded } from '../parts/loaded.ts';
import '../parts/secret-once.ts';
import '../parts/sure-dialog.ts';
import { fieldSays, textField } from '../parts/text-field.ts';
import type { OwnDesk, OwnToken } from './own-desk.ts';

/** What a token can be made for: everything but what belongs to the person alone. */
const offered: readonly Action[] = ['see', 'acknowledge', 'restart-evidence', 'load-plant', 'read-changes', 'manage-sources', 'manage-displays', 'manage-accounts'];

/** Tokens by which programs act under one's name, for chosen actions and days. */
export class OwnTokens extends LitElement {
  static override properties = { desk: { attribute: false }, caller: { attribute: false }, formats: { attribute: false }, made: { state: true } };
  static override styles = [base, form, ownPage];

  declare desk: OwnDesk;
  declare caller: Caller;
  declare formats: Formats;
  declare made: string;
  readonly #sending = new FormSending(this);
  readonly #tokens = new Loaded(this, () => this.desk.tokens());

  constructor() {
    super();
    this.made = '';
  }

  protected override render(): TemplateResult {
    return html`<section class="sheet part">
      <h2>API tokens</h2>
      <p class="hint">For programs of yours. A token does what it was made for and you may do yourself, under your name.</p>
      ${this.#tokens.view('Your tokens', (tokens) => tokens.length === 0
        ? html`<p class="empty">You have no token.</p>`
        : html`<ul class="rows">${tokens.map((token) => this.#row(token))}</ul>`)}
      <secret-once .secret=${this.made} label="The new token" note="Send it as Authorization: Bearer …"></secret-once>
      <details><summary>Make a token</summary>${this.#form()}</details>
      <sure-dialog></sure-dialog>
    </section>`;
  }

  #row(token: OwnToken): TemplateResult {
    const { formats } = this;
    return html`<li>
      <div><b>${token.name}</b><br /><span class="quiet">May ${listed(token.actions.map((action) => actionWord[action]))}. ${token.lastUsed === undefined ? 'Never used' : `Last used ${formats.moment(token.lastUsed)}`}, ends ${formats.date(token.expires)}.</span></div>
      <div class="does"><button aria-label="Revoke: ${token.name}" @click=${() => { void this.#drop(token); }}>Revoke</button></div>
    </li>`;
  }

  #form(): TemplateResult {
    return html`<form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event); }}>
      ${textField(this.#sending, { name: 'name', label: 'What it is for', hint: '“Shift report”', required: true, most: 80 })}
      <fieldset aria-describedby="actions-says"><legend>What it may do</legend>
        ${offered.filter((action) => mayDoSomewhere(this.caller, action)).map((action) => html`<label class="tick"><input type="checkbox" name="actions" value=${action} />${actionWord[action]}</label>`)}
        ${fieldSays('actions', this.#sending.of('actions'), undefined)}
      </fieldset>
      ${textField(this.#sending, { name: 'days', label: 'Days it holds', type: 'number', value: '90', from: 1, to: 366, required: true, narrow: true })}
      <p class="fault" role="alert">${this.#sending.beyond(['name', 'actions', 'days'])}</p>
      <div class="does"><button ?disabled=${this.#sending.busy}>Make the token</button></div>
    </form>`;
  }

  async #onSubmit(event: SubmitEvent): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const chosen = new FormData(sent).getAll('actions');
    const actions = offered.filter((action) => chosen.includes(action));
    if (actions.length === 0) return this.#sending.refuse('actions', 'choose at least one');
    const done = await this.#sending.send(async () => { this.made = await this.desk.makeToken(text('name'), actions, Number(text('days'))); });
    if (!done) return;
    sent.reset();
    sent.closest('details')?.removeAttribute('open');
    await this.#tokens.reload();
  }

  async #drop({ id, name }: OwnToken): Promise<void> {
    const done = await this.renderRoot.querySelector('sure-dialog')?.ask({ title: `Revoke “${name}”?`, says: 'Programs that use it are refused at once. It cannot be brought back.', does: 'Revoke', send: () => this.desk.dropToken(id) });
    if (done !== true) return;
    this.made = '';
    await this.#tokens.reload();
  }
}

customElements.define('own-tokens', OwnTokens);
