import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { keyed } from 'lit/directives/keyed.js';
import type { Grant } from '../../core/access/role.ts';
import type { LineName } from '../access/role-words.ts';
import { base } from '../look/base.ts';
import { dialog } from '../look/dialog.ts';
import { form } from '../look/form.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import '../parts/secret-once.ts';
import '../parts/sure-dialog.ts';
import { whyField, type SureAsked } from '../parts/sure-dialog.ts';
import { fieldSays, textField } from '../parts/text-field.ts';
import { grantsChange } from './grants-change.ts';
import { wholeLink, type PeopleDesk, type Person } from './people-desk.ts';
import './role-matrix.ts';

/** One person's account: name shown, roles, and what else can be done with it. Each change says why. */
export class PersonDialog extends LitElement {
  static override properties = { desk: { attribute: false }, lines: { attribute: false }, link: { state: true } };

  static override styles = [base, dialog, form, css`
    dialog { width: min(46rem, calc(100vw - 1.5rem)); }
    .in { display: grid; gap: 1rem; }
    dialog .more { border-top: 1px solid var(--rule); padding-top: 0.9rem; justify-content: flex-start; }
    dialog .more button { flex: 0 1 auto; }
  `];

  declare desk: PeopleDesk;
  declare lines: readonly LineName[];
  declare link: string;
  readonly #sending = new FormSending(this);
  #person: Person | undefined;
  #grants: readonly Grant[] = [];
  #changed: (() => void) | undefined;

  constructor() {
    super();
    this.link = '';
  }

  /** @param changed  called after each change */
  async open(person: Person, changed: () => void): Promise<void> {
    this.#person = person;
    this.#grants = person.grants;
    this.#changed = changed;
    this.link = '';
    this.#sending.clear();
    this.requestUpdate();
    await this.updateComplete;
    this.renderRoot.querySelector('dialog')?.showModal();
  }

  protected override render(): TemplateResult {
    const person = this.#person;
    return html`${person === undefined ? nothing : keyed(person, html`<dialog aria-labelledby="title" @close=${() => { this.#onClose(person); }}>${this.#body(person)}</dialog>`)}<sure-dialog></sure-dialog>`;
  }

  #body(person: Person): TemplateResult {
    const change = grantsChange(person.grants, this.#grants, this.lines);
    return html`<div class="in">
      <h2 id="title">${person.shownAs}</h2>
      <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event, person); }}>
        ${textField(this.#sending, { name: 'shownAs', label: 'Name shown', value: person.shownAs, required: true, most: 80 })}
        <div class="field"><role-matrix .grants=${this.#grants} .lines=${this.lines} @vouchline-grants=${(event: CustomEvent<readonly Grant[]>) => {
          this.#grants = event.detail;
          this.requestUpdate();
        }}></role-matrix>
          ${fieldSays('grants', this.#sending.of('grants'), change === '' ? undefined : change)}</div>
        ${textField(this.#sending, whyField)}
        <p class="fault" role="alert">${this.#sending.beyond(['shownAs', 'grants', 'why'])}</p>
        <div class="does"><button type="button" @click=${this.#close}>Close</button><button class="first" ?disabled=${this.#sending.busy}>Save</button></div>
      </form>
      <secret-once .secret=${this.link} label="The link for a new password" note="Give it to ${person.shownAs} and to nobody else; it holds for a day."></secret-once>
      <div class="does more">
        <button @click=${() => { void this.#newPassword(person); }}>New password link</button>
        <button ?disabled=${person.sessions === 0} @click=${() => { void this.#signOut(person); }}>Sign out everywhere${person.sessions === 0 ? ': nowhere signed in' : ''}</button>
        <button @click=${() => { void this.#disable(person); }}>${person.disabled ? 'Enable the account' : 'Disable the account'}</button>
      </div>
    </div>`;
  }

  async #onSubmit(event: SubmitEvent, person: Person): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const change = { ...(text('shownAs') === person.shownAs ? {} : { shownAs: text('shownAs') }), ...(grantsChange(person.grants, this.#grants, this.lines) === '' ? {} : { grants: this.#grants }) };
    if (Object.keys(change).length > 0 && !(await this.#sending.send(() => this.desk.change(person.id, change, text('why'))))) return;
    this.#changed?.();
    this.#close();
  }

  #sure(asked: Omit<SureAsked, 'fields'>): Promise<boolean> {
    return this.renderRoot.querySelector('sure-dialog')?.ask({ ...asked, fields: [whyField] }) ?? Promise.resolve(false);
  }

  async #newPassword({ id, shownAs }: Person): Promise<void> {
    await this.#sure({
      title: `A new password for ${shownAs}?`, says: 'You get a link to hand over. The present password holds until the link is used.', does: 'Make the link',
      send: async (text) => { this.link = wholeLink((await this.desk.newPasswordLink(id, text('why'))).link); },
    });
  }

  async #signOut({ id, shownAs }: Person): Promise<void> {
    const done = await this.#sure({ title: `Sign out ${shownAs} everywhere?`, says: 'All sessions end at once; signing in again is possible.', does: 'Sign out', send: (text) => this.desk.signOutEverywhere(id, text('why')) });
    if (done) this.#changed?.();
  }

  async #disable({ id, shownAs, disabled }: Person): Promise<void> {
    const done = await this.#sure({
      title: disabled ? `Enable ${shownAs} again?` : `Disable ${shownAs}?`,
      says: disabled ? 'Signing in works again, with the roles kept.' : 'Sessions and tokens end at once, and nobody signs in with this account until it is enabled again. Its name stays in the record.',
      does: disabled ? 'Enable' : 'Disable',
      send: (text) => this.desk.change(id, { disabled: !disabled }, text('why')),
    });
    if (!done) return;
    this.#changed?.();
    this.#close();
  }

  readonly #close = (): void => {
    this.renderRoot.querySelector('dialog')?.close();
  };

  #onClose(person: Person): void {
    if (person !== this.#person) return;
    this.#person = undefined;
    this.link = '';
    this.requestUpdate();
  }
}

customElements.define('person-dialog', PersonDialog);

declare global {
  interface HTMLElementTagNameMap {
    'person-dialog': PersonDialog;
  }
}
