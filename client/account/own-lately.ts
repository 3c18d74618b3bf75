import { html, LitElement, type TemplateResult } from 'lit';
import type { RecordedChange } from '../../core/access/change.ts';
import type { LineName } from '../access/role-words.ts';
import { changeWord, differencesOf } from '../changes/change-words.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { Loaded } from '../parts/loaded.ts';
import type { OwnDesk } from './own-desk.ts';

/** What happened to one's own account lately, so that what one did not do oneself is seen. */
export class OwnLately extends LitElement {
  static override properties = { desk: { attribute: false }, lines: { attribute: false }, formats: { attribute: false } };
  static override styles = [base, form, ownPage];

  declare desk: OwnDesk;
  declare lines: readonly LineName[];
  declare formats: Formats;
  readonly #changes = new Loaded(this, () => this.desk.lately());

  protected override render(): TemplateResult {
    return html`<section class="sheet part">
      <h2>What happened lately</h2>
      <p class="hint">If something here was not you, change your password and tell an administrator.</p>
      ${this.#changes.view('What happened lately', (changes) => changes.length === 0
        ? html`<p class="empty">Nothing is on record yet.</p>`
        : html`<ul class="rows">${changes.map((change) => this.#row(change))}</ul>`)}
    </section>`;
  }

  #row({ at, kind, what, who, before, after }: RecordedChange): TemplateResult {
    const parts = differencesOf(before, after, this.lines).map(({ name, before: was, after: is }) => `${name === '' ? '' : `${name} `}${is ?? `no more ${was ?? ''}`}`);
    const subject = what.startsWith('account ') ? '' : `: ${what}`;
    return html`<li><div><b>${changeWord[kind] ?? kind}</b>${subject}<br />
      <span class="quiet">${this.formats.moment(at)}${who === 'unknown' ? '' : `, ${who}`}${parts.length === 0 ? '' : `; ${parts.join(', ')}`}</span></div></li>`;
  }
}

customElements.define('own-lately', OwnLately);
