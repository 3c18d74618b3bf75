import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import type { RecordedChange } from '../../core/access/change.ts';
import type { LineName } from '../access/role-words.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { changeWord, differencesOf, type Difference } from './change-words.ts';

/** Records of changes, newest first: when, who, what, what was before and after, why. */
export class ChangeList extends LitElement {
  static override properties = { changes: { attribute: false }, lines: { attribute: false }, formats: { attribute: false } };

  static override styles = [base, css`
    table { border-collapse: collapse; width: 100%; table-layout: fixed; }
    thead th { text-align: left; color: var(--quiet); font-size: 0.93rem; font-weight: 600; padding: 0.2rem 1rem 0.5rem 0; }
    th:nth-child(1) { width: 12.5rem; } th:nth-child(2) { width: 18%; } th:nth-child(3) { width: 26%; }
    tbody tr { border-top: 1px solid var(--rule); }
    td { padding: 0.6rem 1rem 0.6rem 0; vertical-align: top; overflow-wrap: anywhere; }
    td:last-child { padding-right: 0; }
    b { font-weight: 700; }
    .why { border-left: 2px solid var(--edge); padding-left: 0.6em; margin-top: 0.2rem; white-space: pre-line; }
    .difference + .difference { margin-top: 0.1rem; }
    del { color: var(--quiet); text-decoration-thickness: 1px; }
    ins { text-decoration: none; font-weight: 600; }
    @media (max-width: 900px) {
      thead { position: absolute; width: 1px; height: 1px; overflow: hidden; clip-path: inset(50%); }
      table, tbody, tr, td { display: block; }
      td { padding: 0.1rem 0; }
      tr { padding: 0.6rem 0; }
    }
  `];

  declare changes: readonly RecordedChange[];
  declare lines: readonly LineName[];
  declare formats: Formats;

  protected override render(): TemplateResult {
    return html`<table>
      <thead><tr><th scope="col">When</th><th scope="col">Who</th><th scope="col">What</th><th scope="col">Before and after, and why</th></tr></thead>
      <tbody>${repeat(this.changes, ({ id }) => id, (change) => this.#row(change))}</tbody>
    </table>`;
  }

  #row({ id, at, who, kind, what, before, after, why }: RecordedChange): TemplateResult {
    return html`<tr>
      <td>${this.formats.instant(at)}<br /><span class="quiet">Record ${this.formats.count(id)}</span></td>
      <td>${who}</td>
      <td><b>${changeWord[kind] ?? kind}</b><br />${what}</td>
      <td>${differencesOf(before, after, this.lines).map((part) => this.#difference(part))}${why === '' ? nothing : html`<div class="why">${why}</div>`}</td>
    </tr>`;
  }

  #difference({ name, before, after }: Difference): TemplateResult {
    return html`<div class="difference">${name === '' ? nothing : html`<span class="quiet">${name}: </span>`}${before === undefined ? nothing : html`<span class="unseen">before </span><del>${before}</del>`}${before === undefined || after === undefined ? nothing : html` <span aria-hidden="true">→</span> `}${after === undefined
      ? html`<span class="unseen"> taken away</span>`
      : html`<span class="unseen"> after </span><ins>${after}</ins>`}</div>`;
  }
}

customElements.define('change-list', ChangeList);
