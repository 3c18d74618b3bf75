import { html, LitElement, type TemplateResult } from 'lit';
import type { Grant } from '../../core/access/role.ts';
import { grantsInWords, type LineName } from '../access/role-words.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { Loaded } from '../parts/loaded.ts';
import '../parts/secret-once.ts';
import '../parts/sure-dialog.ts';
import { fieldSays, textField } from '../parts/text-field.ts';
import { wholeLink, type PeopleDesk, type PersonInvitation } from './people-desk.ts';
import './role-matrix.ts';

/** Inviting somebody by a link, and the links that wait to be used. */
export class InvitationList extends LitElement {
  static override properties = { desk: { attribute: false }, lines: { attribute: false }, formats: { attribute: false }, link: { state: true }, grants: { state: true } };
  static override styles = [base, form, ownPage];

  declare desk: PeopleDesk;
  declare lines: readonly LineName[];
  declare formats: Formats;
  declare link: string;
  declare grants: readonly Grant[];
  readonly #sending = new FormSending(this);
  readonly #invitations = new Loaded(this, () => this.desk.invitations());

  constructor() {
    super();
    this.link = '';
    this.grants = [];
  }

  protected override render(): TemplateResult {
    return html`<div class="columns"><section class="sheet part"><h2>Invite somebody</h2>
        <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event); }}>
          ${textField(this.#sending, { name: 'shownAs', label: 'Name shown', hint: 'May be left empty: the person then says.', most: 80 })}
          <div class="field"><role-matrix .grants=${this.grants} .lines=${this.lines} @vouchline-grants=${(event: CustomEvent<readonly Grant[]>) => {
            this.grants = event.detail;
            this.#sending.typed('grants');
          }}></role-matrix>${fieldSays('grants', this.#sending.of('grants'), this.grants.length === 0 ? undefined : `${grantsInWords(this.grants, this.lines)}.`)}</div>
          ${textField(this.#sending, { name: 'days', label: 'Days the link holds', type: 'number', value: '7', from: 1, to: 30, required: true, narrow: true })}
          <p class="fault" role="alert">${this.#sending.beyond(['shownAs', 'grants', 'days'])}</p>
          <div class="does"><button class="first" ?disabled=${this.#sending.busy}>Make the link</button></div>
        </form>
        <secret-once .secret=${this.link} label="The invitation’s link" note="Give it to that person and to nobody else; it works once."></secret-once>
      </section>
      <section class="sheet part"><h2>Links not used yet</h2>
        ${this.#invitations.view('The invitations', (invitations) => invitations.length === 0
          ? html`<p class="empty">No link waits to be used.</p>`
          : html`<ul class="rows">${invitations.map((one) => this.#row(one))}</ul>`)}
      </section></div>
      <sure-dialog></sure-dialog>`;
  }

  #row(one: PersonInvitation): TemplateResult {
    const { kind, grants, shownAs, by, made, expires } = one;
    const what = kind === 'new-password' ? 'New password' : kind === 'first' ? 'The first account' : grantsInWords(grants, this.lines);
    return html`<li>
      <div><b>${shownAs ?? 'Whoever has the link'}</b><br />${what}<br /><span class="quiet">By ${by}, ${this.formats.moment(made)}; holds until ${this.formats.moment(expires)}</span></div>
      <div class="does"><button aria-label="Withdraw the link for ${shownAs ?? 'whoever has it'}" @click=${() => { void this.#withdraw(one); }}>Withdraw</button></div>
    </li>`;
  }

  async #onSubmit(event: SubmitEvent): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    if (this.grants.length === 0) return this.#sending.refuse('grants', 'tick at least one role');
    const done = await this.#sending.send(async () => { this.link = wholeLink((await this.desk.invite(this.grants, text('shownAs'), Number(text('days')))).link); });
    if (!done) return;
    sent.reset();
    this.grants = [];
    await this.#invitations.reload();
  }

  async #withdraw({ id, shownAs }: PersonInvitation): Promise<void> {
    const done = await this.renderRoot.querySelector('sure-dialog')?.ask({
      title: `Withdraw the link for ${shownAs ?? 'whoever has it'}?`, says: 'It works no more. Another can be made at any time.', does: 'Withdraw', send: () => this.desk.withdraw(id),
    });
    if (done !== true) return;
    this.link = '';
    await this.#invitations.reload();
  }
}

customElements.define('invitation-list', InvitationList);
