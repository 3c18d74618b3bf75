import { html, LitElement, type TemplateResult } from 'lit';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { Loaded } from '../parts/loaded.ts';
import '../parts/sure-dialog.ts';
import { agentWords } from './agent-words.ts';
import type { OwnDesk, OwnSession } from './own-desk.ts';

/** Where one is signed in; each can be ended, this one is marked. */
export class OwnSessions extends LitElement {
  static override properties = { desk: { attribute: false }, formats: { attribute: false }, leave: { attribute: false } };
  static override styles = [base, form, ownPage];

  declare desk: OwnDesk;
  declare formats: Formats;
  /** Leaves on purpose, by ending what is told. */
  declare leave: (end: () => Promise<void>) => Promise<void>;
  readonly #sessions = new Loaded(this, () => this.desk.sessions());

  protected override render(): TemplateResult {
    return html`<section class="sheet part">
      <div class="over"><h2>Where you are signed in</h2><button @click=${() => { void this.#endAll(); }}>Sign out everywhere</button></div>
      ${this.#sessions.view('Your sessions', (sessions) => html`<ul class="rows">${sessions.map((session) => this.#row(session))}</ul>`)}
      <sure-dialog></sure-dialog>
    </section>`;
  }

  #row(session: OwnSession): TemplateResult {
    const { agent, address, made, lastSeen, current } = session;
    return html`<li>
      <div><b title=${agent}>${agentWords(agent)}</b>${current ? html`<span class="mark">this one</span>` : ''}<br />
        <span class="quiet">${address}, last seen ${this.formats.moment(lastSeen)}, since ${this.formats.moment(made)}</span></div>
      <div class="does"><button aria-label="Sign out: ${agentWords(agent)}, ${address}" @click=${() => { void this.#end(session); }}>Sign out</button></div>
    </li>`;
  }

  async #end({ id, agent, current }: OwnSession): Promise<void> {
    const done = await this.renderRoot.querySelector('sure-dialog')?.ask({
      title: current ? 'Sign out here?' : `Sign out ${agentWords(agent)}?`,
      says: current ? 'It is the browser you sit at.' : 'Whoever sits there has to sign in again.',
      does: 'Sign out',
      send: () => (current ? this.leave(() => this.desk.endSession(id)) : this.desk.endSession(id)),
    });
    if (done === true && !current) await this.#sessions.reload();
  }

  async #endAll(): Promise<void> {
    await this.renderRoot.querySelector('sure-dialog')?.ask({
      title: 'Sign out everywhere?', says: 'All your sessions end, this one too. API tokens go on.', does: 'Sign out everywhere', send: () => this.leave(() => this.desk.endAllSessions()),
    });
  }
}

customElements.define('own-sessions', OwnSessions);
