import { css, html, LitElement, type TemplateResult } from 'lit';
import { actionRules, actions, type ActionRule } from '../../core/access/action.ts';
import { roles, type Grant, type Role } from '../../core/access/role.ts';
import { roleWord, type LineName } from '../access/role-words.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';

/** Roles with something to do on a line beyond seeing it; an administrator's work always concerns the plant. */
const onLines: ReadonlySet<Role> = new Set(['viewer', ...actions.map((action): ActionRule => actionRules[action]).filter(({ reach, roles: may }) => reach === 'line' && may.length < roles.length).flatMap((rule) => rule.roles)]);

/** The grants after a box was ticked or unticked. */
export function toggled(grants: readonly Grant[], role: Role, line: string | undefined): readonly Grant[] {
  const without = grants.filter((grant) => grant.role !== role || grant.line !== line);
  return without.length === grants.length ? [...grants, { role, line }] : without;
}

/** Which roles somebody has where, as boxes: a row for the plant and for each line. Fires `vouchline-grants`. */
export class RoleMatrix extends LitElement {
  static override properties = { grants: { attribute: false }, lines: { attribute: false } };

  static override styles = [base, form, css`
    :host { container-type: inline-size; }
    table { border-collapse: collapse; width: 100%; }
    th { text-align: left; font-weight: 600; padding: 0.35rem 0.5rem 0.35rem 0; overflow-wrap: anywhere; }
    thead th { font-size: 0.86rem; color: var(--quiet); vertical-align: bottom; }
    thead th:not(:first-child), td { text-align: center; padding: 0; width: 15.5%; overflow-wrap: normal; }
    thead th:not(:first-child) { padding-bottom: 0.35rem; }
    tbody tr { border-top: 1px solid var(--rule); }
    td label { display: grid; place-items: center; min-height: 2.4rem; cursor: pointer; }
    td input[type='checkbox'] { translate: none; }
    td.held { color: var(--quiet); font-size: 0.86rem; }
    @container (max-width: 34rem) { thead th:not(:first-child) span { writing-mode: vertical-rl; rotate: 180deg; padding-block: 0.3rem; } thead th:not(:first-child), td { width: 12.5%; } }
    @media (pointer: coarse) { td label { min-height: 3rem; } }
  `];

  declare grants: readonly Grant[];
  declare lines: readonly LineName[];

  protected override render(): TemplateResult {
    return html`<table>
      <thead><tr><th scope="col">For</th>${roles.map((role) => html`<th scope="col"><span>${roleWord[role]}</span></th>`)}</tr></thead>
      <tbody>${this.#row(undefined, 'The whole plant')}${this.lines.map(({ id, name }) => this.#row(id, name))}</tbody>
    </table>`;
  }

  #row(line: string | undefined, name: string): TemplateResult {
    return html`<tr><th scope="row">${name}</th>${roles.map((role) => this.#cell(role, line, name))}</tr>`;
  }

  #cell(role: Role, line: string | undefined, name: string): TemplateResult {
    const has = this.#has(role, line);
    if (line !== undefined && !has && this.#has(role, undefined)) return html`<td class="held">plant</td>`;
    if (line !== undefined && !has && !onLines.has(role)) return html`<td class="held"><span class="unseen">for the plant only</span></td>`;
    return html`<td><label><span class="unseen">${roleWord[role]}, ${name}</span><input type="checkbox" .checked=${has} @change=${() => {
      this.dispatchEvent(new CustomEvent('vouchline-grants', { detail: toggled(this.grants, role, line) }));
    }} /></label></td>`;
  }

  #has(role: Role, line: string | undefined): boolean {
    return this.grants.some((grant) => grant.role === role && grant.line === line);
  }
}

customElements.define('role-matrix', RoleMatrix);
