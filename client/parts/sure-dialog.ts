import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { keyed } from 'lit/directives/keyed.js';
import { base } from '../look/base.ts';
import { dialog } from '../look/dialog.ts';
import { form } from '../look/form.ts';
import { FormSending, formOf, textsOf } from './form-sending.ts';
import { textField, type TextField } from './text-field.ts';

export interface SureAsked {
  readonly title: string;
  /** What it does, and whether it can be undone. */
  readonly says: string;
  /** The button's word: 'Withdraw'. */
  readonly does: string;
  /** What is asked besides: the reason that goes on record, hours, a password. */
  readonly fields?: readonly TextField[];
  readonly send: (text: (name: string) => string) => Promise<void>;
}

/** The reason that goes on record beside a change. */
export const whyField: TextField = { name: 'why', label: 'Why', hint: 'Stands in the record of changes.', required: true, most: 500 };

/** Asks before something is done, and for what the record wants to know of it. Says so when it is refused; nothing is closed then. */
export class SureDialog extends LitElement {
  static override styles = [base, dialog, form, css`p { text-wrap: pretty; }`];

  readonly #sending = new FormSending(this);
  #asked: SureAsked | undefined;
  #done: ((done: boolean) => void) | undefined;

  /** Whether it was done. */
  ask(asked: SureAsked): Promise<boolean> {
    this.#end(this.#asked, false);
    return new Promise((done) => {
      this.#asked = asked;
      this.#done = done;
      this.requestUpdate();
      void this.updateComplete.then(() => {
        this.renderRoot.querySelector('dialog')?.showModal();
        this.renderRoot.querySelector<HTMLElement>('input, .cancel')?.focus();
      });
    });
  }

  /** A dialog of its own for each question: what the browser tells late of an earlier one ends no later one. */
  protected override render(): unknown {
    const asked = this.#asked;
    return asked === undefined ? nothing : keyed(asked, html`<dialog aria-labelledby="title" @close=${() => { this.#end(asked, false); }}>${this.#form(asked)}</dialog>`);
  }

  #form(asked: SureAsked): TemplateResult {
    const { title, says, does, fields = [] } = asked;
    return html`<form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event, asked); }}>
      <h2 id="title">${title}</h2>
      <p>${says}</p>
      ${fields.map((field) => textField(this.#sending, field))}
      <p class="fault" role="alert">${this.#sending.beyond(fields.map(({ name }) => name))}</p>
      <div class="does">
        <button type="button" class="cancel" @click=${() => { this.#end(asked, false); }}>Cancel</button>
        <button class="first" ?disabled=${this.#sending.busy}>${does}</button>
      </div>
    </form>`;
  }

  async #onSubmit(event: SubmitEvent, asked: SureAsked): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    if (await this.#sending.send(() => asked.send(text))) this.#end(asked, true);
  }

  #end(asked: SureAsked | undefined, done: boolean): void {
    if (asked !== this.#asked) return;
    const tell = this.#done;
    this.#done = undefined;
    this.#asked = undefined;
    this.#sending.clear();
    this.renderRoot.querySelector('dialog')?.close();
    tell?.(done);
  }
}

customElements.define('sure-dialog', SureDialog);

declare global {
  interface HTMLElementTagNameMap {
    'sure-dialog': SureDialog;
  }
}
