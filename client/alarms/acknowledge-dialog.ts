import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Alarm } from '../../core/alarm/alarm.ts';
import { reasonOf } from '../ask.ts';
import { base } from '../look/base.ts';
import { dialog } from '../look/dialog.ts';
import { ruleWord } from '../words.ts';

type Send = (by: string, note: string) => Promise<void>;

export interface AcknowledgeAsked {
  readonly alarm: Alarm;
  readonly guaranteeName: string;
  readonly name: string;
  /** Whether the name is the person's to type; otherwise it is known and only shown. */
  readonly typed: boolean;
  readonly send: Send;
}

/** Asks who acknowledges where nobody is known, and for a note if there is one. Says so when the server refuses; nothing is closed then. */
export class AcknowledgeDialog extends LitElement {
  static override styles = [base, dialog, css`
    form { display: grid; gap: 0.85rem; }
    label { display: grid; gap: 0.2rem; font-weight: 600; }
    label span { font-weight: 400; }
    .fault { color: var(--harm); font-weight: 600; }
  `];

  #asked: AcknowledgeAsked | undefined;
  #fault = '';
  #busy = false;

  /** @param atOnce  the name is known and no note is wished: sends it, and asks only when that fails */
  async begin(asked: AcknowledgeAsked, atOnce: boolean): Promise<void> {
    this.#asked = asked;
    this.#fault = '';
    if (atOnce && (await this.#send(asked.name, ''))) return;
    this.requestUpdate();
    await this.updateComplete;
    const box = this.renderRoot.querySelector('dialog');
    if (box?.open === false) box.showModal();
    this.renderRoot.querySelector<HTMLElement>(asked.name === '' ? '[name=by]' : '[name=note]')?.focus();
  }

  protected override render(): TemplateResult {
    const asked = this.#asked;
    return html`<dialog aria-labelledby="title">
      ${asked === undefined ? nothing : html`<form @submit=${this.#onSubmit}>
        <h2 id="title">Acknowledge the alarm</h2>
        <p>${asked.guaranteeName}: ${ruleWord[asked.alarm.rule].toLowerCase()}. Acknowledging says that you have seen it and take care of it; it does not end it.</p>
        ${asked.typed
          ? html`<label>Your name<input name="by" required maxlength="80" autocomplete="name" .value=${asked.name} /></label>`
          : html`<p>It goes on record as <b>${asked.name}</b>.</p>`}
        <label><span>Note, if you want to leave one</span><textarea name="note" rows="3" maxlength="500"></textarea></label>
        <p class="fault" role="alert">${this.#fault}</p>
        <div class="does">
          <button type="button" @click=${this.#close}>Cancel</button>
          <button class="first" ?disabled=${this.#busy}>Acknowledge</button>
        </div>
      </form>`}
    </dialog>`;
  }

  async #send(by: string, note: string): Promise<boolean> {
    this.#busy = true;
    this.requestUpdate();
    try {
      await this.#asked?.send(by, note);
      return true;
    } catch (cause) {
      this.#fault = `Not acknowledged: ${reasonOf(cause)}.`;
      return false;
    } finally {
      this.#busy = false;
      this.requestUpdate();
    }
  }

  readonly #onSubmit = (event: SubmitEvent): void => {
    event.preventDefault();
    if (!(event.target instanceof HTMLFormElement)) return;
    const form = new FormData(event.target);
    const text = (name: string): string => {
      const value = form.get(name);
      return typeof value === 'string' ? value.trim() : '';
    };
    const by = this.#asked?.typed === true ? text('by') : (this.#asked?.name ?? '');
    if (by === '') {
      this.#fault = 'Give your name: the record keeps who acknowledged.';
      this.requestUpdate();
      return;
    }
    void this.#send(by, text('note')).then((sent) => {
      if (sent) this.#close();
    });
  };

  readonly #close = (): void => {
    this.renderRoot.querySelector('dialog')?.close();
    this.#asked = undefined;
    this.requestUpdate();
  };
}

customElements.define('acknowledge-dialog', AcknowledgeDialog);

declare global {
  interface HTMLElementTagNameMap {
    'acknowledge-dialog': AcknowledgeDialog;
  }
}
