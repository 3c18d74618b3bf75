import { css, html, LitElement, type TemplateResult } from 'lit';
import { reasonOf } from '../ask.ts';
import { base } from '../look/base.ts';

type Send = (by: string, reason: string) => Promise<void>;

/** Restarts the evidence after a fix; asks why, and who where nobody is known; says beforehand what it does. */
export class RestartEvidence extends LitElement {
  static override properties = { name: { attribute: false }, typed: { attribute: false }, mayNot: { attribute: false }, send: { attribute: false } };

  static override styles = [base, css`
    summary { cursor: pointer; font-weight: 650; padding: 0.35rem 0; }
    form { display: grid; gap: 0.7rem; margin-top: 0.5rem; max-width: 32rem; }
    label { display: grid; gap: 0.2rem; font-weight: 600; }
    .fault { color: var(--harm); font-weight: 600; }
    @media (pointer: coarse) { summary { padding: 0.9rem 0; } }
  `];

  declare name: string;
  /** Whether the name is the person's to type; otherwise it is known and only shown. */
  declare typed: boolean;
  /** Why it cannot be done here; empty if it can. */
  declare mayNot: string;
  declare send: Send | undefined;
  #said = '';
  #fault = '';
  #busy = false;

  protected override render(): TemplateResult {
    if (this.mayNot !== '') return html`<p class="quiet">${this.mayNot}</p>`;
    return html`<details>
      <summary>Restart the evidence</summary>
      <form @submit=${this.#onSubmit}>
        <p>For use after something was mended or changed. The window begins empty from now on, so the guarantee is gathering until enough units have been inspected; nothing is proven in the meantime. Records, history and alarms are kept, and the record says who restarted and why.</p>
        ${this.typed
          ? html`<label>Your name<input name="by" required maxlength="80" autocomplete="name" .value=${this.name} /></label>`
          : html`<p>It goes on record as <b>${this.name}</b>.</p>`}
        <label>Reason<textarea name="reason" required rows="2" maxlength="500" placeholder="What was mended or changed"></textarea></label>
        <button ?disabled=${this.#busy}>Restart the evidence</button>
      </form>
      <p role="status">${this.#said}</p>
      <p class="fault" role="alert">${this.#fault}</p>
    </details>`;
  }

  readonly #onSubmit = (event: SubmitEvent): void => {
    event.preventDefault();
    const form = event.target;
    if (form instanceof HTMLFormElement) void this.#restart(form);
  };

  async #restart(form: HTMLFormElement): Promise<void> {
    const data = new FormData(form);
    const text = (name: string): string => {
      const value = data.get(name);
      return typeof value === 'string' ? value.trim() : '';
    };
    const by = this.typed ? text('by') : this.name;
    this.#fault = by === '' || text('reason') === '' ? this.typed ? 'Give your name and the reason: the record keeps both.' : 'Give the reason: the record keeps it.' : '';
    this.#said = '';
    this.requestUpdate();
    if (this.#fault !== '') return;
    this.#busy = true;
    try {
      await this.send?.(by, text('reason'));
      this.#said = 'Evidence restarted.';
      form.reset();
    } catch (cause) {
      this.#fault = `Not restarted: ${reasonOf(cause)}.`;
    }
    this.#busy = false;
    this.requestUpdate();
  }
}

customElements.define('restart-evidence', RestartEvidence);
