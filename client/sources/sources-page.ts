import { ContextConsumer } from '@lit/context';
import { html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Actor } from '../access/actor.ts';
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
import { whyField } from '../parts/sure-dialog.ts';
import { textField, type TextField } from '../parts/text-field.ts';
import { namesIn, useWords, type Source } from './source-words.ts';

const ofSource = (name: string): string => `/api/sources/${encodeURIComponent(name)}`;

/** Who may send records, for which stations and products; their tokens made, renewed and withdrawn. */
export class SourcesPage extends LitElement {
  static override properties = { formats: { attribute: false }, actor: { attribute: false }, token: { state: true } };
  static override styles = [base, form, ownPage];

  declare formats: Formats;
  declare actor: Actor;
  /** The token that was made last, and for whom; shown this once. */
  declare token: { readonly of: string; readonly text: string };
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  readonly #sending = new FormSending(this);
  readonly #sources = new Loaded(this, async () => (await this.#ask?.<readonly Source[]>('GET', '/api/sources')) ?? []);

  constructor() {
    super();
    this.token = { of: '', text: '' };
  }

  get #ask(): Ask | undefined {
    return this.#wiring.value?.ask;
  }

  protected override render(): TemplateResult {
    return html`<h1>Sources</h1>
      <p class="lead">A source is a device or program that sends records. Its token lets it send for its own stations, and for nothing else.</p>
      <div class="columns aside">
        <section class="sheet part"><h2>Who may send</h2>
          <secret-once .secret=${this.token.text} .label=${`The token of ${this.token.of}`} note="Put it into the source’s settings now."></secret-once>
          ${this.#sources.view('The sources', (sources) => sources.length === 0
            ? html`<p class="empty">No source has a token yet, so nobody can send records. Make one.</p>`
            : html`<ul class="rows">${[...sources].sort(standingFirst).map((source) => this.#row(source))}</ul>`)}
        </section>
        <section class="sheet part"><h2>Make a source</h2>
          <form @submit=${(event: SubmitEvent) => { void this.#onSubmit(event); }}>
            ${textField(this.#sending, { name: 'name', label: 'Name', hint: '“leak-tester-a”', required: true, most: 64 })}
            ${textField(this.#sending, { name: 'stations', label: 'Stations', hint: 'Their ids in the plant file, with commas between: “A.leak-test”. A * stands for every station.', required: true, most: 500 })}
            ${textField(this.#sending, { name: 'products', label: 'Products', hint: 'With commas between; empty for every product.', most: 500 })}
            ${this.#recordFields().map((field) => textField(this.#sending, field))}
            <p class="fault" role="alert">${this.#sending.beyond(['name', 'stations', 'products', 'why', 'by'])}</p>
            <div class="does"><button class="first" ?disabled=${this.#sending.busy}>Make the token</button></div>
          </form>
        </section>
      </div>
      <sure-dialog></sure-dialog>`;
  }

  #row(source: Source): TemplateResult {
    const { name, stations, products = [], connected, revoked } = source;
    const standing = revoked === undefined;
    return html`<li>
      <div class=${standing ? '' : 'off'}><b>${name}</b>${connected ? html`<span class="mark">connected</span>` : nothing}${standing ? nothing : html`<span class="mark">withdrawn</span>`}<br />
        ${stations.includes('*') ? 'Every station' : stations.join(', ')}; ${products.length === 0 ? 'every product' : products.join(', ')}<br />
        <span class="quiet">${useWords(source, this.formats, this.#wiring.value?.wall() ?? 0)}</span></div>
      ${standing ? html`<div class="does">
        <button aria-label="Renew the token of ${name}" @click=${() => { void this.#renew(source); }}>Renew</button>
        <button aria-label="Withdraw ${name}" @click=${() => { void this.#withdraw(source); }}>Withdraw</button>
      </div>` : nothing}
    </li>`;
  }

  async #onSubmit(event: SubmitEvent): Promise<void> {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const stations = namesIn(text('stations'));
    const products = namesIn(text('products'));
    if (stations.length === 0) return this.#sending.refuse('stations', 'name at least one station');
    const of = text('name');
    const body = { name: of, stations, ...(products.length === 0 ? {} : { products }), ...this.#record(text) };
    if (!(await this.#sending.send(() => this.#take(of, '/api/sources', body)))) return;
    sent.reset();
    await this.#sources.reload();
  }

  async #renew({ name }: Source): Promise<void> {
    const done = await this.renderRoot.querySelector('sure-dialog')?.ask({
      title: `A new token for ${name}?`, says: 'The old one goes on for the hours you give, so that the source can be changed over without a gap.', does: 'Renew',
      fields: [{ name: 'overlapHours', label: 'Hours the old token still holds', type: 'number', value: '24', from: 0, to: 720, required: true, narrow: true }, ...this.#recordFields()],
      send: (text) => this.#take(name, `${ofSource(name)}/renew`, { overlapHours: Number(text('overlapHours')), ...this.#record(text) }),
    });
    if (done === true) await this.#sources.reload();
  }

  async #withdraw({ name }: Source): Promise<void> {
    const done = await this.renderRoot.querySelector('sure-dialog')?.ask({
      title: `Withdraw ${name}?`, says: 'Its connection ends at once and its tokens hold no more. What it sent stays. Its guarantees will fall silent and say so.', does: 'Withdraw', fields: this.#recordFields(),
      send: async (text) => { await this.#ask?.('POST', `${ofSource(name)}/withdraw`, this.#record(text)); },
    });
    if (done !== true) return;
    this.token = { of: '', text: '' };
    await this.#sources.reload();
  }

  /** What the record wants to know: why, and who where nobody is known. */
  #recordFields(): readonly TextField[] {
    return this.actor.named === 'typed' ? [whyField, { name: 'by', label: 'Your name', value: this.actor.ownName, autocomplete: 'name', required: true, most: 80 }] : [whyField];
  }

  #record(text: (name: string) => string): object {
    if (this.actor.named !== 'typed') return { why: text('why') };
    this.#wiring.value?.settings.change({ personName: text('by') });
    return { why: text('why'), by: text('by') };
  }

  async #take(of: string, path: string, body: object): Promise<void> {
    const made = await this.#ask?.<{ readonly token: string }>('POST', path, body);
    this.token = { of, text: made?.token ?? '' };
  }
}

const standingFirst = (a: Source, b: Source): number => Number(a.revoked !== undefined) - Number(b.revoked !== undefined) || a.name.localeCompare(b.name);

customElements.define('sources-page', SourcesPage);
