import { ContextConsumer } from '@lit/context';
import { html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Caller } from '../access/me.ts';
import { grantsInWords, type LineName } from '../access/role-words.ts';
import { wiringContext } from '../contexts.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { ownPage } from '../look/own-page.ts';
import { ownDesk, type OwnDesk } from './own-desk.ts';
import './own-lately.ts';
import './own-passkeys.ts';
import './own-password.ts';
import './own-pin.ts';
import './own-sessions.ts';
import './own-tokens.ts';

/** One's own account. */
export class AccountPage extends LitElement {
  static override properties = { caller: { attribute: false }, lines: { attribute: false }, formats: { attribute: false }, directory: { attribute: false } };
  static override styles = [base, ownPage];

  declare caller: Caller;
  declare lines: readonly LineName[];
  declare formats: Formats;
  /** Name of the directory one can sign in with. */
  declare directory: string | undefined;
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  #desk: OwnDesk | undefined;

  protected override render(): TemplateResult | typeof nothing {
    const { caller, formats } = this;
    const wiring = this.#wiring.value;
    if (wiring === undefined) return nothing;
    if (caller.kind !== 'account') return html`<section class="sheet part"><h1>Nobody is signed in here</h1><p>This page is for people with an account.</p></section>`;
    this.#desk ??= ownDesk(wiring.ask);
    const desk = this.#desk;
    return html`<h1>${caller.name}</h1>
      <p class="lead">${grantsInWords(caller.grants, this.lines)}. Roles are given by an administrator.</p>
      <div class="columns">
        <div>${caller.hasPassword ? html`<own-password .desk=${desk}></own-password>` : nothing}<own-pin .desk=${desk} .hasPassword=${caller.hasPassword}></own-pin>
          ${this.directory === undefined ? nothing : html`<section class="sheet part"><h2>${this.directory}</h2><p class="quiet">Link your account once, and from then on you can sign in with ${this.directory} too.</p><p><a class="button" href="/api/sign-in/directory">Link the account</a></p></section>`}
          <own-lately .desk=${desk} .lines=${this.lines} .formats=${formats}></own-lately></div>
        <div><own-sessions .desk=${desk} .formats=${formats} .leave=${wiring.who.signOut}></own-sessions>
          <own-passkeys .desk=${desk} .hasPassword=${caller.hasPassword} .formats=${formats}></own-passkeys>
          <own-tokens .desk=${desk} .caller=${caller} .formats=${formats}></own-tokens></div>
      </div>`;
  }
}

customElements.define('account-page', AccountPage);
