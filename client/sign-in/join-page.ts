import { ContextConsumer } from '@lit/context';
import { html, LitElement, nothing, type PropertyValues, type TemplateResult } from 'lit';
import { passwordFault } from '../../core/access/password-length.ts';
import type { Grant } from '../../core/access/role.ts';
import { grantsInWords } from '../access/role-words.ts';
import type { Who } from '../access/who.ts';
import { reasonOf, Refusal, type Ask } from '../ask.ts';
import { wiringContext } from '../contexts.ts';
import { base } from '../look/base.ts';
import { door } from '../look/door.ts';
import { form } from '../look/form.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { passwordField } from '../parts/password-field.ts';
import { textField } from '../parts/text-field.ts';
import { SignedIn } from './signed-in.ts';

interface Invitation {
  readonly kind: 'first' | 'account' | 'new-password';
  readonly grants: readonly Grant[];
  readonly account: string | undefined;
  readonly shownAs: string | undefined;
  readonly expires: number;
}

type Looked =
  | { readonly kind: 'looking' }
  | { readonly kind: 'void' }
  | { readonly kind: 'failed'; readonly why: string }
  | { readonly kind: 'here'; readonly invitation: Invitation };

/** What a one-time link is for: the first account, an account by invitation, or a new password. Fires `SignedIn`. */
export class JoinPage extends LitElement {
  static override properties = { code: { attribute: false }, who: { attribute: false }, looked: { state: true }, length: { state: true } };
  static override styles = [base, form, door];

  /** What stood behind # in the link. */
  declare code: string;
  declare who: Who | undefined;
  declare looked: Looked;
  declare length: number;
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  readonly #sending = new FormSending(this);

  constructor() {
    super();
    this.looked = { kind: 'looking' };
    this.length = 0;
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (changed.has('code')) void this.#look();
  }

  protected override render(): TemplateResult {
    return html`<div><p class="mark">Vouchline</p><div class="sheet">${this.#body()}</div></div>`;
  }

  #body(): TemplateResult {
    switch (this.looked.kind) {
      case 'looking':
        return html`<p role="status">Looking at the link.</p>`;
      case 'void':
        return html`<h1>This link does not hold</h1>
          <p>${this.code === ''
            ? 'Its end, behind #, is missing: open the whole link once more. It is taken out of the address when the page opens.'
            : 'It was used already, was withdrawn, or has expired. Ask whoever sent it for another.'}</p>
          <p><a href="/sign-in">Sign in</a></p>`;
      case 'failed':
        return html`<h1>The link could not be looked at</h1><p>${this.looked.why}.</p><button @click=${() => { void this.#look(); }}>Try again</button>`;
      case 'here':
        return this.#form(this.looked.invitation);
    }
  }

  #form(invitation: Invitation): TemplateResult {
    const { kind, account, shownAs } = invitation;
    return html`<h1>${{ first: 'The first account', account: 'Your account', 'new-password': 'A new password' }[kind]}</h1>
      <p>${kind === 'new-password' ? `For ${shownAs ?? account ?? 'your account'}. With it, everywhere else is signed out.` : `${grantsInWords(invitation.grants, [])}.`}</p>
      ${this.who?.kind === 'known' && this.who.caller.name !== undefined ? html`<p class="told">You are signed in as ${this.who.caller.name}; this takes its place in this browser.</p>` : nothing}
      <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event, kind); }}>
        ${kind === 'new-password'
          ? html`<input name="name" type="text" hidden autocomplete="username" readonly .value=${account ?? ''} />`
          : html`${textField(this.#sending, { name: 'shownAs', label: 'Your name', hint: 'As others see it, and as it stands in the record: “Ines Maurer”.', autocomplete: 'name', required: true, most: 80, value: shownAs ?? '' })}
            ${textField(this.#sending, { name: 'name', label: 'Name to sign in with', hint: 'Short, without blanks: “ines”.', autocomplete: 'username', required: true, most: 80 })}`}
        ${passwordField(this.#sending, { name: 'password', label: 'New password', fresh: true }, this.length, (length) => { this.length = length; })}
        <p class="fault" role="alert">${this.#sending.beyond(['name', 'shownAs', 'password'])}</p>
        <button class="first" ?disabled=${this.#sending.busy}>${kind === 'new-password' ? 'Set the password and sign in' : 'Make the account and sign in'}</button>
      </form>`;
  }

  get #ask(): Ask | undefined {
    return this.#wiring.value?.ask;
  }

  async #look(): Promise<void> {
    if (this.code === '') {
      this.looked = { kind: 'void' };
      return;
    }
    this.looked = { kind: 'looking' };
    try {
      const invitation = await this.#ask?.<Invitation>('POST', '/api/invitations/look', { code: this.code });
      if (invitation !== undefined) this.looked = { kind: 'here', invitation };
    } catch (cause) {
      const gone = cause instanceof Refusal && (cause.status === 404 || cause.status === 400);
      this.looked = gone ? { kind: 'void' } : { kind: 'failed', why: reasonOf(cause) };
    }
    await this.updateComplete;
    this.renderRoot.querySelector<HTMLElement>('input:not([hidden]), button, a')?.focus();
  }

  async #onSubmit(event: SubmitEvent, kind: Invitation['kind']): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const password = text('password');
    const fault = passwordFault(password);
    if (fault !== undefined) return this.#sending.refuse('password', fault);
    const names = kind === 'new-password' ? {} : { name: text('name'), shownAs: text('shownAs') };
    const done = await this.#sending.send(async () => {
      await this.#ask?.('POST', '/api/invitations/accept', { code: this.code, ...names, password });
    });
    if (done) this.dispatchEvent(new SignedIn());
  }
}

customElements.define('join-page', JoinPage);
