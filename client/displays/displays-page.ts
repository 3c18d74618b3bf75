import { ContextConsumer } from '@lit/context';
import { html, LitElement, nothing, type TemplateResult } from 'lit';
import { lineNameOf, type LineName } from '../access/role-words.ts';
import type { Ask } from '../ask.ts';
import { wiringContext } from '../contexts.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { Loaded } from '../parts/loaded.ts';
import '../parts/secret-once.ts';
import '../parts/sure-dialog.ts';
import { fieldSays, textField } from '../parts/text-field.ts';
import { wholeLink } from '../people/people-desk.ts';

/** A screen of the shop floor. Times are wall time, ms since 1970. */
interface Display {
  readonly id: string;
  readonly name: string;
  /** Id of the line it shows; undefined: the whole plant. */
  readonly line: string | undefined;
  readonly made: number;
  readonly by: string;
  readonly lastSeen: number | undefined;
  /** Whether people acknowledge at it by PIN. */
  readonly acting: boolean;
}

/** Screens that show the board without anybody being signed in. */
export class DisplaysPage extends LitElement {
  static override properties = { lines: { attribute: false }, formats: { attribute: false }, link: { state: true } };
  static override styles = [base, form, ownPage];

  declare lines: readonly LineName[];
  declare formats: Formats;
  declare link: string;
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  readonly #sending = new FormSending(this);
  readonly #displays = new Loaded(this, async () => (await this.#ask?.<readonly Display[]>('GET', '/api/displays')) ?? []);

  constructor() {
    super();
    this.link = '';
  }

  get #ask(): Ask | undefined {
    return this.#wiring.value?.ask;
  }

  protected override render(): TemplateResult {
    return html`<h1>Displays</h1>
      <p class="lead">A display is a screen that shows the board with nobody signed in. It changes nothing by itself; where you allow it, people acknowledge at it with their PIN, each under their own name.</p>
      <div class="columns aside">
        <section class="sheet part"><h2>Screens</h2>
          ${this.#displays.view('The displays', (displays) => displays.length === 0
            ? html`<p class="empty">There is no display yet. Add one, and open its link once on the screen.</p>`
            : html`<ul class="rows">${displays.map((display) => this.#row(display))}</ul>`)}
        </section>
        <section class="sheet part"><h2>Add a display</h2>
          <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event); }}>
            ${textField(this.#sending, { name: 'name', label: 'Where it hangs', hint: '“Hall 2, by the gate”', required: true, most: 80 })}
            <div class="field"><label for="line">Shows</label><select id="line" name="line" aria-describedby="line-says"><option value="">The whole plant</option>${this.lines.map(({ id, name }) => html`<option value=${id}>${name}</option>`)}</select>${fieldSays('line', this.#sending.of('line'), undefined)}</div>
            <label class="tick"><input type="checkbox" name="acting" />People may acknowledge at it by PIN</label>
            <p class="fault" role="alert">${this.#sending.beyond(['name', 'line'])}</p>
            <div class="does"><button class="first" ?disabled=${this.#sending.busy}>Make the link</button></div>
          </form>
          <secret-once .secret=${this.link} label="The display’s link" note="Open it once on the screen; the screen keeps it until the display is withdrawn."></secret-once>
        </section>
      </div>
      <sure-dialog></sure-dialog>`;
  }

  #row(display: Display): TemplateResult {
    const { name, line, acting, made, by, lastSeen } = display;
    const { formats } = this;
    return html`<li>
      <div><b>${name}</b>${acting ? html`<span class="mark">acts by PIN</span>` : nothing}<br />Shows ${line === undefined ? 'the whole plant' : lineNameOf(this.lines, line)}<br />
        <span class="quiet">${lastSeen === undefined ? 'Never seen' : `Last seen ${formats.moment(lastSeen)}`}; added by ${by}, ${formats.date(made)}</span></div>
      <div class="does"><button aria-label="Withdraw: ${name}" @click=${() => { void this.#withdraw(display); }}>Withdraw</button></div>
    </li>`;
  }

  async #onSubmit(event: SubmitEvent): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const line = text('line');
    const body = { name: text('name'), ...(line === '' ? {} : { line }), acting: new FormData(sent).has('acting') };
    const done = await this.#sending.send(async () => { this.link = wholeLink((await this.#ask?.<{ readonly link: string }>('POST', '/api/displays', body))?.link ?? ''); });
    if (!done) return;
    sent.reset();
    await this.#displays.reload();
  }

  async #withdraw({ id, name }: Display): Promise<void> {
    const done = await this.renderRoot.querySelector('sure-dialog')?.ask({
      title: `Withdraw “${name}”?`, says: 'Its screen goes dark at once and says why. Its link cannot be used again; another can be made.', does: 'Withdraw',
      send: async () => { await this.#ask?.('DELETE', `/api/displays/${encodeURIComponent(id)}`); },
    });
    if (done !== true) return;
    this.link = '';
    await this.#displays.reload();
  }
}

customElements.define('displays-page', DisplaysPage);
