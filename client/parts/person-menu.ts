import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Action } from '../../core/access/action.ts';
import { mayDoSomewhere, type Caller } from '../access/me.ts';
import { grantsInWords, type LineName } from '../access/role-words.ts';
import type { Who } from '../access/who.ts';
import { base } from '../look/base.ts';
import type { PlainPage } from '../route.ts';
import { DropDown, dropDownStyle } from './drop-down.ts';

/** Somebody asks for something from the menu: to leave, to act by PIN, or to stop doing so. */
export class PersonRequest extends Event {
  static readonly type = 'vouchline-person';
  readonly wish: 'sign-out' | 'act-by-pin' | 'end-acting';

  constructor(wish: PersonRequest['wish']) {
    super(PersonRequest.type, { bubbles: true, composed: true });
    this.wish = wish;
  }
}

const pages: readonly { readonly path: PlainPage; readonly name: string; readonly action: Action }[] = [
  { path: 'account', name: 'My account', action: 'keep-own-account' },
  { path: 'people', name: 'People', action: 'manage-accounts' },
  { path: 'displays', name: 'Displays', action: 'manage-displays' },
  { path: 'sources', name: 'Sources', action: 'manage-sources' },
  { path: 'changes', name: 'Record of changes', action: 'read-changes' },
];

/** Who sits here, what they are, and where they may go; says plainly where access is open. */
export class PersonMenu extends LitElement {
  static override properties = { who: { attribute: false }, lines: { attribute: false }, page: { attribute: false }, wall: { type: Boolean, reflect: true } };

  static override styles = [base, dropDownStyle, css`
    summary { display: flex; align-items: center; }
    summary span { max-width: 15rem; overflow: hidden; text-overflow: ellipsis; white-space: nowrap; }
    .panel { width: min(19rem, calc(100vw - 1.2rem)); gap: 0.7rem; }
    .who { overflow-wrap: anywhere; }
    .who b { display: block; font-size: 1.05rem; }
    nav { display: grid; border-block: 1px solid var(--rule); padding-block: 0.3rem; }
    nav a { padding: 0.4rem 0; font-weight: 650; text-decoration: none; }
    nav a:hover { text-decoration: underline; text-underline-offset: 0.2em; }
    nav a[aria-current='page'] { text-decoration: underline; text-decoration-thickness: 3px; text-underline-offset: 0.3em; }
    .does { display: grid; gap: 0.5rem; }
    @media (max-width: 760px) { summary { padding-inline: 0.6rem; } summary span { max-width: 11rem; } nav a { padding: 0.75rem 0; } }
  `];

  declare who: Who | undefined;
  declare lines: readonly LineName[] | undefined;
  declare page: string;
  declare wall: boolean;

  readonly #dropDown = new DropDown(this);

  protected override render(): TemplateResult | typeof nothing {
    if (this.who?.kind !== 'known') return nothing;
    const { caller } = this.who;
    const links = pages.filter(({ path, action }) => mayDoSomewhere(caller, action) && (caller.kind === 'account' || path === 'sources' || path === 'changes'));
    return html`<details>
      <summary><span>${this.#title(caller)}</span></summary>
      <div class="panel">
        <div class="who">${this.#says(caller)}</div>
        ${links.length === 0 ? nothing : html`<nav aria-label="Own and plant’s access">${links.map(({ path, name }) => this.#link(path, name))}</nav>`}
        ${this.#does(caller)}
      </div>
    </details>`;
  }

  #title(caller: Caller): string {
    return caller.kind === 'open' ? 'Open access' : (caller.name ?? 'Signed in');
  }

  #says(caller: Caller): TemplateResult {
    switch (caller.kind) {
      case 'open':
        return html`<b>Open to everybody who reaches it</b><p class="quiet">Nobody signs in: whoever reaches this server may see, acknowledge and change everything, under any name.</p>`;
      case 'display':
        return html`<b>${caller.name}</b><p class="quiet">A display: it shows${caller.terminal ? ', and people acknowledge at it by PIN' : ' and changes nothing'}.</p>`;
      case 'account':
      case 'token':
        return html`<b>${caller.name}</b><p class="quiet">${grantsInWords(caller.grants, this.lines ?? [])}</p>`;
    }
  }

  #link(path: PlainPage, name: string): TemplateResult {
    return html`<a href="/${path}" aria-current=${this.page === path ? 'page' : 'false'} @click=${this.#dropDown.close}>${name}</a>`;
  }

  #does(caller: Caller): TemplateResult | typeof nothing {
    if (caller.kind === 'open') return nothing;
    return html`<div class="does">
      ${caller.terminal ? this.#button(caller.pin === undefined ? 'act-by-pin' : 'end-acting', caller.pin === undefined ? 'Act as somebody by PIN' : `End acting as ${caller.pin.name}`) : nothing}
      ${this.#button('sign-out', caller.kind === 'display' ? 'Stop being a display' : 'Sign out')}
    </div>`;
  }

  #button(wish: PersonRequest['wish'], name: string): TemplateResult {
    return html`<button @click=${() => {
      this.#dropDown.close();
      this.dispatchEvent(new PersonRequest(wish));
    }}>${name}</button>`;
  }
}

customElements.define('person-menu', PersonMenu);

declare global {
  interface HTMLElementTagNameMap {
    'person-menu': PersonMenu;
  }
}
