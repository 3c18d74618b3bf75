import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { roles, type Role } from '../../core/access/role.ts';
import { grantsInWords, lineNameOf, roleWord, type LineName } from '../access/role-words.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import type { Person } from './people-desk.ts';

/** All people with their roles: a column for each role that says where it holds; on a phone in words. Fires `vouchline-edit`. */
export class PeopleTable extends LitElement {
  static override properties = { people: { attribute: false }, lines: { attribute: false }, formats: { attribute: false }, own: { attribute: false } };

  static override styles = [base, css`
    table { border-collapse: collapse; width: 100%; }
    th { text-align: left; font-weight: 650; }
    thead th { color: var(--quiet); font-size: 0.93rem; padding: 0.2rem 0.8rem 0.5rem 0; }
    tbody tr { border-top: 1px solid var(--rule); }
    tbody th, td { padding: 0.6rem 0.8rem 0.6rem 0; vertical-align: top; overflow-wrap: anywhere; }
    .name { font-weight: 700; }
    th .quiet { font-weight: 400; }
    .where { font-weight: 600; }
    .where.line { font-weight: 400; }
    .none { color: var(--edge); }
    .disabled .name, .disabled .where { color: var(--quiet); font-weight: 400; text-decoration: line-through; }
    .act { text-align: right; padding-right: 0; }
    .words { display: none; }
    .mark { display: inline-block; border: 1px solid var(--edge); border-radius: 3px; padding: 0 0.4em; font-size: 0.86rem; font-weight: 600; margin-left: 0.4em; }
    @media (max-width: 900px) {
      thead, .where-cell { display: none; }
      .words { display: block; }
      table, tbody, tr { display: block; }
      tbody tr { display: grid; grid-template-columns: minmax(0, 1fr) auto; gap: 0 0.8rem; padding: 0.7rem 0; align-items: center; }
      tbody th, td { padding: 0; }
      td.seen { grid-column: 1; grid-row: 2; }
      td.act { grid-column: 2; grid-row: 1 / 3; }
    }
  `];

  declare people: readonly Person[];
  declare lines: readonly LineName[];
  declare formats: Formats;
  /** Id of the account that looks. */
  declare own: string | undefined;

  protected override render(): TemplateResult {
    return html`<table>
      <thead><tr><th scope="col">Person</th>${roles.map((role) => html`<th scope="col">${roleWord[role]}</th>`)}<th scope="col">Last seen</th><th scope="col"><span class="unseen">Change</span></th></tr></thead>
      <tbody>${this.people.map((person) => this.#row(person))}</tbody>
    </table>`;
  }

  #row(person: Person): TemplateResult {
    const { id, name, shownAs, grants, disabled, lastSeen } = person;
    return html`<tr class=${disabled ? 'disabled' : ''}>
      <th scope="row"><span class="name">${shownAs}</span>${disabled ? html`<span class="mark">disabled</span>` : nothing}${id === this.own ? html`<span class="mark">you</span>` : nothing}
        <div class="quiet">${name}</div><div class="words where line">${grantsInWords(grants, this.lines)}</div></th>
      ${roles.map((role) => html`<td class="where-cell">${this.#where(person, role)}</td>`)}
      <td class="seen quiet">${lastSeen === undefined ? 'never' : this.formats.moment(lastSeen)}</td>
      <td class="act"><button data-id=${id} aria-label="Change ${shownAs}" @click=${() => { this.dispatchEvent(new CustomEvent('vouchline-edit', { detail: person })); }}>Change</button></td>
    </tr>`;
  }

  #where({ grants }: Person, role: Role): TemplateResult {
    const held = grants.filter((grant) => grant.role === role);
    if (held.length === 0) return html`<span class="none" aria-label="no">·</span>`;
    if (held.some(({ line }) => line === undefined)) return html`<span class="where">Plant</span>`;
    return html`<span class="where line">${held.map(({ line }) => lineNameOf(this.lines, line ?? '')).join(', ')}</span>`;
  }
}

customElements.define('people-table', PeopleTable);
