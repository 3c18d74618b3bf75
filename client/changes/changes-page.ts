import { ContextConsumer } from '@lit/context';
import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { changeKinds, type RecordedChange } from '../../core/access/change.ts';
import type { LineName } from '../access/role-words.ts';
import { reasonOf, type Ask } from '../ask.ts';
import { wiringContext } from '../contexts.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { form } from '../look/form.ts';
import { ownPage } from '../look/own-page.ts';
import { FormSending, formOf, textsOf } from '../parts/form-sending.ts';
import { Loaded } from '../parts/loaded.ts';
import { textField } from '../parts/text-field.ts';
import { counted } from '../words.ts';
import './change-list.ts';
import { addressPart, wholeRecord, type ChangeQuery } from './change-query.ts';
import { changeWord } from './change-words.ts';
import './record-head.ts';
import type { ChainHead } from './record-head.ts';

const pageSize = 100;
/** Where there is room the filter stands open. */
const wide = matchMedia('(min-width: 761px)');

/** The record of changes: read, filtered, taken along. */
export class ChangesPage extends LitElement {
  static override properties = { lines: { attribute: false }, formats: { attribute: false }, timeZone: { attribute: false }, query: { state: true } };

  static override styles = [base, form, ownPage, css`
    .filter { grid-template-columns: 16.5rem 16.5rem minmax(0, 1fr) minmax(0, 1.2fr) auto; align-items: start; gap: 0.8rem; }
    .filter .does { padding-top: 1.6rem; flex-wrap: nowrap; }
    .foot { display: grid; gap: 0.5rem; justify-items: start; }
    @media (max-width: 1100px) { .filter { grid-template-columns: minmax(0, 1fr) minmax(0, 1fr); } .filter .does { padding-top: 0; } }
    @media (max-width: 560px) { .filter { grid-template-columns: minmax(0, 1fr); } }
  `];

  declare lines: readonly LineName[];
  declare formats: Formats;
  declare timeZone: string;
  declare query: ChangeQuery;
  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  readonly #sending = new FormSending(this);
  readonly #first = new Loaded(this, () => this.#read());
  #older: readonly RecordedChange[] = [];
  #allRead = false;
  #fault = '';

  constructor() {
    super();
    this.query = wholeRecord;
  }

  get #ask(): Ask | undefined {
    return this.#wiring.value?.ask;
  }

  protected override render(): TemplateResult {
    return html`<h1>Record of changes</h1>
      <p class="lead">Everything that changed the meaning of a figure or an alarm, or who may do so. It is only added to, and chained so that it can be checked.</p>
      <section class="sheet part" aria-label="Filter"><details ?open=${wide.matches}><summary>Filter</summary>${this.#filter()}</details></section>
      <section class="sheet part" aria-label="Records">
        <div class="over"><h2>${this.query === wholeRecord ? 'Newest first' : 'Found, newest first'}</h2>
          <div class="does"><a class="button" download href=${this.#exportPath('ndjson')}>Export as NDJSON</a><a class="button" download href=${this.#exportPath('csv')}>Export as CSV</a></div></div>
        ${this.#first.view('The record', (changes) => this.#list([...changes, ...this.#older]))}
      </section>
      <record-head .read=${() => this.#ask?.<ChainHead>('GET', '/api/changes/head') ?? Promise.resolve({ id: 0, hash: '' })}></record-head>`;
  }

  #filter(): TemplateResult {
    const { query } = this;
    return html`<form class="filter" @submit=${(event: SubmitEvent) => { this.#onSubmit(event); }}>
      ${textField(this.#sending, { name: 'from', label: 'From', type: 'datetime-local', value: query.from })}
      ${textField(this.#sending, { name: 'to', label: 'To', type: 'datetime-local', value: query.to })}
      <div class="field"><label for="kind">What</label><select id="kind" name="kind"><option value="">Everything</option>${changeKinds.map((kind) => html`<option value=${kind} ?selected=${query.kind === kind}>${changeWord[kind]}</option>`)}</select></div>
      ${textField(this.#sending, { name: 'holds', label: 'Holds', value: query.holds, hint: 'In who, what or why.', most: 100 })}
      <div class="does"><button class="first">Filter</button>${query === wholeRecord ? nothing : html`<button type="button" @click=${this.#all}>All</button>`}</div>
    </form>`;
  }

  #list(changes: readonly RecordedChange[]): TemplateResult {
    if (changes.length === 0) {
      return html`<p class="empty">${this.query === wholeRecord ? 'Nothing is on record yet. Sign-ins, acknowledgements, restarts, plant files and changes of accounts will stand here.' : 'Nothing on record fits the filter.'}</p>`;
    }
    return html`<change-list .changes=${changes} .lines=${this.lines} .formats=${this.formats}></change-list>
      <div class="foot">
        ${this.#allRead ? html`<p class="empty">${counted(this.formats, changes.length, 'record')}; there are no older ones${this.query === wholeRecord ? '' : ' that fit the filter'}.</p>` : html`<button @click=${() => { void this.#readOlder(changes.at(-1)?.id); }}>Show older</button>`}
        <p class="fault" role="alert">${this.#fault}</p>
      </div>`;
  }

  #exportPath(written: 'ndjson' | 'csv'): string {
    return `/api/changes/export${addressPart(this.query, this.timeZone, { form: written })}`;
  }

  async #read(before?: number): Promise<readonly RecordedChange[]> {
    const more = { ...(before === undefined ? {} : { before }), limit: pageSize };
    const changes = (await this.#ask?.<readonly RecordedChange[]>('GET', `/api/changes${addressPart(this.query, this.timeZone, more)}`)) ?? [];
    this.#allRead = changes.length < pageSize;
    return changes;
  }

  async #readOlder(before: number | undefined): Promise<void> {
    try {
      this.#fault = '';
      this.#older = [...this.#older, ...(await this.#read(before))];
    } catch (cause) {
      this.#fault = `Older records could not be read: ${reasonOf(cause)}.`;
    }
    this.requestUpdate();
  }

  #onSubmit(event: SubmitEvent): void {
    const sent = formOf(event);
    if (sent === undefined) return;
    const text = textsOf(sent);
    const query = { from: text('from'), to: text('to'), kind: text('kind'), holds: text('holds') };
    if (query.from !== '' && query.to !== '' && query.from >= query.to) return this.#sending.refuse('to', 'the end comes before the beginning');
    this.#show(Object.values(query).every((part) => part === '') ? wholeRecord : query);
  }

  readonly #all = (): void => {
    this.renderRoot.querySelector('form')?.reset();
    this.#show(wholeRecord);
  };

  #show(query: ChangeQuery): void {
    this.query = query;
    this.#older = [];
    this.#fault = '';
    void this.#first.reload();
    this.renderRoot.querySelector('record-head')?.reload();
  }
}

customElements.define('changes-page', ChangesPage);
