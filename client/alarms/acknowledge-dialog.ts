import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Alarm } from '../../core/alarm/alarm.ts';
import { base } from '../look/base.ts';
import { ruleWord } from '../words.ts';

type Send = (by: string, note: string) => Promise<void>;

interface Asked {
  readonly alarm: Alarm;
  readonly guaranteeName: string;
  readonly name: string;
  readonly send: Send;
}

/** Asks who acknowledges, and for a note if there is one. Says so when the server refuses; nothing is closed then. */
export class AcknowledgeDialog extends LitElement {
  static override styles = [base, css`
    dialog {
      width: min(30rem, calc(100vw - 1.5rem)); border: 1px solid var(--edge); border-radius: 10px; padding: 1.2rem 1.3rem 1.3rem;
      background: var(--sheet); color: var(--ink); font-size: 1.05rem;
    }
    dialog::backdrop { background: rgb(10 14 17 / 0.5); }
    form { display: grid; gap: 0.85rem; }
    h2 { font-size: 1.25rem; }
    label { display: grid; gap: 0.2rem; font-weight: 600; }
    label span { font-weight: 400; }
    .does { display: flex; gap: 0.6rem; justify-content: flex-end; flex-wrap: wrap; }
    .does .first { flex: 1 1 12rem; min-height: 3rem; }
    .fault { color: var(--harm); font-weight: 600; }
  `];

  #asked: Asked | undefined;
  #fault = '';
  #busy = false;

  /** @param atOnce  the name is known and no note is wished: sends it, and asks only when that fails */
  async begin(alarm: Alarm, guaranteeName: string, name: string, atOnce: boolean, send: Send): Promise<void> {
    this.#asked = { alarm, guaranteeName, name, send };
    this.#fault = '';
    if (atOnce && (await this.#send(name, ''))) return;
    this.requestUpdate();
    await this.updateComplete;
    const dialog = this.renderRoot.querySelector('dialog');
    if (dialog?.open === false) dialog.showModal();
    this.renderRoot.querySelector<HTMLElement>(name === '' ? '[name=by]' : '[name=note]')?.focus();
  }

  protected override render(): TemplateResult {
    const asked = this.#asked;
    return html`<dialog aria-labelledby="title">
      ${asked === undefined ? nothing : html`<form @submit=${this.#onSubmit}>
        <h2 id="title">Acknowledge the alarm</h2>
        <p>${asked.guaranteeName}: ${ruleWord[asked.alarm.rule].toLowerCase()}. Acknowledging says that you have seen it and take care of it; it does not end it.</p>
        <label>Your name<input name="by" required maxlength="80" autocomplete="name" .value=${asked.name} /></label>
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
      this.#fault = `Not acknowledged: ${cause instanceof Error ? cause.message : String(cause)}.`;
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
    if (text('by') === '') {
      this.#fault = 'Give your name: the record keeps who acknowledged.';
      this.requestUpdate();
      return;
    }
    void this.#send(text('by'), text('note')).then((sent) => {
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
