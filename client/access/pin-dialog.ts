import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { keyed } from 'lit/directives/keyed.js';
import { reasonOf, type Ask } from '../ask.ts';
import { base } from '../look/base.ts';
import { dialog } from '../look/dialog.ts';
import './pin-pad.ts';

interface TerminalPerson {
  readonly account: string;
  readonly shownAs: string;
}

type Step =
  | { readonly kind: 'asking' }
  | { readonly kind: 'failed'; readonly why: string }
  | { readonly kind: 'choosing'; readonly people: readonly TerminalPerson[] }
  | { readonly kind: 'pin'; readonly people: readonly TerminalPerson[]; readonly person: TerminalPerson };

interface Asked {
  readonly ask: Ask;
  readonly what: string;
  readonly does: string;
  readonly done: (name: string | undefined) => void;
}

/** Who acts at a shared screen: chosen from those with a PIN, then shown by it. */
export class PinDialog extends LitElement {
  static override styles = [base, dialog, css`
    .in { display: grid; gap: 0.8rem; }
    ul { display: grid; gap: 0.5rem; grid-template-columns: repeat(auto-fill, minmax(11rem, 1fr)); max-height: 55vh; overflow: auto; padding: 3px; }
    li button { width: 100%; min-height: 4.2rem; font-size: 1.15rem; }
    .fault { color: var(--harm); font-weight: 600; }
    .fault:empty { display: none; }
  `];

  #asked: Asked | undefined;
  #step: Step = { kind: 'asking' };
  #fault = '';
  #busy = false;

  /**
   * Has somebody identify themselves; the name they act under, or undefined if nobody did.
   *
   * @param what  what they are about to do, a sentence
   * @param does  the last button's word
   */
  choose(ask: Ask, what: string, does: string): Promise<string | undefined> {
    this.#asked?.done(undefined);
    return new Promise((done) => {
      this.#asked = { ask, what, does, done };
      this.#to({ kind: 'asking' });
      void this.updateComplete.then(() => {
        const box = this.renderRoot.querySelector('dialog');
        if (box?.open === false) box.showModal();
        void this.#readPeople(ask);
      });
    });
  }

  /** A dialog of its own for each question: what the browser tells late of an earlier one ends no later one. */
  protected override render(): unknown {
    const asked = this.#asked;
    return asked === undefined ? nothing : keyed(asked, html`<dialog aria-labelledby="title" @close=${() => { this.#end(asked, undefined); }}>
      <div class="in">
        <h2 id="title">${this.#step.kind === 'pin' ? this.#step.person.shownAs : 'Who are you?'}</h2>
        <p>${asked.what}</p>
        ${this.#body(this.#step, asked)}
        <p class="fault" role="alert">${this.#fault}</p>
        <div class="does">
          ${this.#step.kind === 'pin' ? html`<button @click=${this.#another}>Somebody else</button>` : nothing}
          <button @click=${() => { this.#end(asked, undefined); }}>Cancel</button>
        </div>
      </div>
    </dialog>`);
  }

  #body(step: Step, asked: Asked): TemplateResult {
    switch (step.kind) {
      case 'asking':
        return html`<p class="quiet" role="status">Asking who has a PIN.</p>`;
      case 'failed':
        return html`<p>The people could not be read: ${step.why}.</p><button @click=${() => { void this.#readPeople(asked.ask); }}>Try again</button>`;
      case 'choosing':
        return step.people.length === 0
          ? html`<p>Nobody has a PIN yet. Each person sets their own under “My account”.</p>`
          : html`<ul aria-label="People with a PIN">${step.people.map((person) => html`<li><button @click=${() => { this.#to({ ...step, kind: 'pin', person }); }}>${person.shownAs}</button></li>`)}</ul>`;
      case 'pin':
        return html`<pin-pad .label=${`PIN of ${step.person.shownAs}`} .does=${asked.does} .busy=${this.#busy}
          @vouchline-pin=${(event: CustomEvent<string>) => { void this.#actAs(asked, step.person, event.detail); }}></pin-pad>`;
    }
  }

  #to(step: Step, fault = ''): void {
    this.#step = step;
    this.#fault = fault;
    this.requestUpdate();
    void this.updateComplete.then(() => { this.renderRoot.querySelector<HTMLElement>(step.kind === 'pin' ? 'pin-pad' : 'li button')?.focus(); });
  }

  async #readPeople(ask: Ask): Promise<void> {
    try {
      this.#to({ kind: 'choosing', people: await ask('GET', '/api/terminal/people') });
    } catch (cause) {
      this.#to({ kind: 'failed', why: reasonOf(cause) });
    }
  }

  async #actAs(asked: Asked, person: TerminalPerson, pin: string): Promise<void> {
    this.#busy = true;
    this.#fault = '';
    this.requestUpdate();
    try {
      const { name } = await asked.ask<{ readonly name: string }>('POST', '/api/terminal/act-as', { account: person.account, pin });
      this.#end(asked, name);
    } catch (cause) {
      this.#fault = `Not taken: ${reasonOf(cause)}.`;
      this.renderRoot.querySelector('pin-pad')?.clear();
    }
    this.#busy = false;
    this.requestUpdate();
  }

  readonly #another = (): void => {
    if (this.#step.kind === 'pin') this.#to({ kind: 'choosing', people: this.#step.people });
  };

  #end(asked: Asked, name: string | undefined): void {
    if (asked !== this.#asked) return;
    this.#asked = undefined;
    this.renderRoot.querySelector('dialog')?.close();
    this.requestUpdate();
    asked.done(name);
  }
}

customElements.define('pin-dialog', PinDialog);

declare global {
  interface HTMLElementTagNameMap {
    'pin-dialog': PinDialog;
  }
}
