import { ContextConsumer } from '@lit/context';
import { html, LitElement, type PropertyValues, type TemplateResult } from 'lit';
import { reasonOf, Refusal } from '../ask.ts';
import { wiringContext } from '../contexts.ts';
import { base } from '../look/base.ts';
import { door } from '../look/door.ts';
import { SignedIn } from './signed-in.ts';

/** Makes this screen a display by its link. Fires `SignedIn`; the board follows. */
export class DisplayPage extends LitElement {
  static override properties = { code: { attribute: false }, fault: { state: true }, again: { state: true } };
  static override styles = [base, door];

  /** What stood behind # in the link. */
  declare code: string;
  declare fault: string;
  declare again: boolean;
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });

  constructor() {
    super();
    this.fault = '';
    this.again = false;
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (changed.has('code')) void this.#enter();
  }

  protected override render(): TemplateResult {
    return html`<div><p class="mark">Vouchline</p><div class="sheet">
      ${this.fault === '' ? html`<p role="status">Making this screen a display.</p>` : html`<h1>This screen is no display</h1><p role="alert">${this.fault}</p>`}
      ${this.again ? html`<button @click=${() => { void this.#enter(); }}>Try again</button>` : ''}
    </div></div>`;
  }

  async #enter(): Promise<void> {
    this.again = false;
    this.fault = this.code === '' ? 'The link’s end, behind #, is missing: open the whole link once more.' : '';
    if (this.fault !== '') return;
    try {
      await this.#wiring.value?.ask('POST', '/api/display/sign-in', { token: this.code });
      this.dispatchEvent(new SignedIn());
    } catch (cause) {
      const gone = cause instanceof Refusal && [400, 401, 404].includes(cause.status);
      this.fault = gone ? 'Its link does not hold: the display was withdrawn. An administrator can make another link under “Displays”.' : `The display could not sign in: ${reasonOf(cause)}.`;
      this.again = !gone;
    }
  }
}

customElements.define('display-page', DisplayPage);
