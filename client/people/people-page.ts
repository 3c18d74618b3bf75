import { ContextConsumer } from '@lit/context';
import { html, LitElement, nothing, type TemplateResult } from 'lit';
import type { LineName } from '../access/role-words.ts';
import { wiringContext } from '../contexts.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { ownPage } from '../look/own-page.ts';
import { Loaded } from '../parts/loaded.ts';
import './invitation-list.ts';
import { peopleDesk, type PeopleDesk, type Person } from './people-desk.ts';
import './people-table.ts';
import './person-dialog.ts';

/** Who has an account, with which roles, and who is invited. */
export class PeoplePage extends LitElement {
  static override properties = { lines: { attribute: false }, formats: { attribute: false }, own: { attribute: false } };
  static override styles = [base, ownPage];

  declare lines: readonly LineName[];
  declare formats: Formats;
  /** Id of the account that looks. */
  declare own: string | undefined;
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  readonly #people = new Loaded(this, async () => (await this.#desk?.people()) ?? []);
  #made: PeopleDesk | undefined;

  get #desk(): PeopleDesk | undefined {
    const ask = this.#wiring.value?.ask;
    this.#made ??= ask === undefined ? undefined : peopleDesk(ask);
    return this.#made;
  }

  protected override render(): TemplateResult | typeof nothing {
    const desk = this.#desk;
    if (desk === undefined) return nothing;
    return html`<h1>People</h1>
      <p class="lead">A role holds for the whole plant or for a line. Whoever changes one says why; the record of changes keeps it.</p>
      <section class="sheet part" aria-label="Accounts">
        ${this.#people.view('The accounts', (people) => people.length === 0
          ? html`<p class="empty">Nobody has an account yet. Invite somebody below.</p>`
          : html`<people-table .people=${people} .lines=${this.lines} .formats=${this.formats} .own=${this.own} @vouchline-edit=${this.#onEdit}></people-table>`)}
      </section>
      <invitation-list .desk=${desk} .lines=${this.lines} .formats=${this.formats}></invitation-list>
      <person-dialog .desk=${desk} .lines=${this.lines}></person-dialog>`;
  }

  readonly #onEdit = (event: CustomEvent<Person>): void => {
    void this.renderRoot.querySelector('person-dialog')?.open(event.detail, () => { void this.#people.reload(); });
  };
}

customElements.define('people-page', PeoplePage);
