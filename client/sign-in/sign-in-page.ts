import { ContextConsumer } from '@lit/context';
import { html, LitElement, nothing, type TemplateResult } from 'lit';
import { directoryFaults, isDirectoryFault } from '../../core/access/directory-fault.ts';
import type { Me } from '../access/me.ts';
import type { Who } from '../access/who.ts';
import { wiringContext, type Wiring } from '../contexts.ts';
import { base } from '../look/base.ts';
import { door } from '../look/door.ts';
import { form } from '../look/form.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { passwordField } from '../parts/password-field.ts';
import { textField } from '../parts/text-field.ts';
import { DoorWait } from './door-wait.ts';
import { passkeyAnswer } from './passkey-answer.ts';
import { SignedIn } from './signed-in.ts';

interface FirstStep {
  /** A passkey is asked for as well. */
  readonly second?: 'passkey';
  readonly ticket?: string;
}

/** Signing in: by name and password, by passkey, by the plant's directory. Fires `SignedIn`. */
export class SignInPage extends LitElement {
  static override properties = { who: { attribute: false } };
  static override styles = [base, form, door];

  declare who: Who | undefined;
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  readonly #sending = new FormSending(this);
  readonly #wait = new DoorWait(this);
  /** Why the directory sent somebody back; taken out of the address. */
  #sentBack = '';
  /** Of a sign-in whose password was right and whose passkey is still wanted. */
  #ticket: string | undefined;

  override connectedCallback(): void {
    super.connectedCallback();
    const fault = new URLSearchParams(location.search).get('fault');
    if (fault === null) return;
    this.#sentBack = isDirectoryFault(fault) ? directoryFaults[fault] : 'it gave no reason.';
    history.replaceState(null, '', location.pathname);
  }

  override firstUpdated(): void {
    this.renderRoot.querySelector<HTMLElement>('input, button, a')?.focus();
  }

  protected override render(): TemplateResult | typeof nothing {
    const { who } = this;
    const wiring = this.#wiring.value;
    if (who === undefined || who.kind === 'asking' || wiring === undefined) return nothing;
    return html`<div>
      <p class="mark">Vouchline</p>
      <div class="sheet">${who.kind === 'known' ? this.#inside(who) : this.#ticket === undefined ? this.#form(who, wiring) : this.#second(wiring)}</div>
    </div>`;
  }

  #form(who: Who & { kind: 'nobody' }, wiring: Wiring): TemplateResult {
    const told = toldOf(who);
    const waits = this.#wait.leftS > 0;
    return html`<h1>Sign in</h1>
      ${this.#sentBack === '' ? nothing : html`<p class="fault" role="alert">${who.me.directory ?? 'The directory'} did not sign you in: ${this.#sentBack}</p>`}
      ${told === '' ? nothing : html`<p class="told" role="status">${told}</p>`}
      <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event, wiring); }}>
        ${textField(this.#sending, { name: 'name', label: 'Name', autocomplete: 'username', required: true, most: 80 })}
        ${passwordField(this.#sending, { name: 'password', label: 'Password', fresh: false }, 0, () => undefined)}
        <p class="fault" role="alert">${this.#sending.beyond(['name', 'password'])}</p>
        <button class="first" ?disabled=${this.#sending.busy || waits}>${waits ? `Sign in, in ${this.#wait.leftS} s` : 'Sign in'}</button>
      </form>
      ${this.#others(who.me, wiring)}`;
  }

  #others(me: Me, wiring: Wiring): TemplateResult | typeof nothing {
    if (!me.passkeys && me.directory === undefined) return nothing;
    return html`<div class="others">
      ${me.passkeys ? html`<button ?disabled=${this.#sending.busy} @click=${() => { void this.#byPasskey(wiring, undefined); }}>Use a passkey</button>` : nothing}
      ${me.directory === undefined ? nothing : html`<a class="button" href="/api/sign-in/directory">Sign in with ${me.directory}</a>`}
    </div>`;
  }

  #second(wiring: Wiring): TemplateResult {
    return html`<h1>One step more</h1>
      <p>The password was right. This account asks for its passkey too.</p>
      <p class="fault" role="alert">${this.#sending.beyond([])}</p>
      <button class="first" ?disabled=${this.#sending.busy} @click=${() => { void this.#byPasskey(wiring, this.#ticket); }}>Use the passkey</button>
      <button @click=${() => { this.#ticket = undefined; this.#sending.clear(); }}>Begin again</button>`;
  }

  #inside({ me, caller }: Who & { kind: 'known' }): TemplateResult {
    return me.access === 'open'
      ? html`<h1>Nobody signs in here</h1><p>Access is open to everybody who reaches this server.</p><p><a href="/">Go to the line board</a></p>`
      : html`<h1>You are signed in</h1><p>As ${caller.name}.</p><p><a href="/">Go to the line board</a></p>`;
  }

  async #onSubmit(event: SubmitEvent, wiring: Wiring): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const done = await this.#sending.send(async () => {
      const answer = await wiring.ask<FirstStep>('POST', '/api/sign-in', { name: text('name'), password: text('password') }).catch(this.#wait.heed);
      this.#ticket = answer.second === 'passkey' ? answer.ticket : undefined;
    });
    if (done && this.#ticket !== undefined) await this.#byPasskey(wiring, this.#ticket);
    else if (done) this.dispatchEvent(new SignedIn());
    else sent.querySelector<HTMLInputElement>('[name=password]')?.select();
  }

  async #byPasskey({ ask }: Wiring, ticket: string | undefined): Promise<void> {
    const part = ticket === undefined ? {} : { ticket };
    const done = await this.#sending.send(async () => {
      const answer = await passkeyAnswer(await ask<object>('POST', '/api/sign-in/passkey/begin', part));
      await ask('POST', '/api/sign-in/passkey/finish', { ...part, answer });
    });
    if (done) this.dispatchEvent(new SignedIn());
  }
}

/** Why one stands before the door. */
function toldOf({ me, why }: Who & { kind: 'nobody' }): string {
  if (me.firstAccount) return 'No account exists yet. When the server started it printed a link for the first one; open that link in this browser.';
  switch (why) {
    case 'ended':
      return 'Your session has ended. Sign in, and you come back to where you were.';
    case 'left':
      return 'You are signed out.';
    case 'withdrawn':
      return 'This screen’s link as a display was withdrawn.';
    case 'not yet':
      return '';
  }
}

customElements.define('sign-in-page', SignInPage);
