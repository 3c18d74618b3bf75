import { ContextConsumer } from '@lit/context';
import { html, LitElement, nothing, type PropertyValues, type TemplateResult } from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import { switchMap, timer, type Subscription } from 'rxjs';
import type { Actor } from '../access/actor.ts';
import { roleMissing } from '../access/role-words.ts';
import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import type { Strip } from '../../core/view/history.ts';
import { byUrgency } from '../attention.ts';
import '../alarms/alarm-card.ts';
import type { Lane } from '../board/lane.ts';
import { wiringContext, type Wiring } from '../contexts.ts';
import type { LivePicture } from '../feed/live-picture.ts';
import { written, type Formats } from '../format.ts';
import { base } from '../look/base.ts';
import '../parts/caution-block.ts';
import { stateMark } from '../parts/state-mark.ts';
import { driftWord, marginWords, promiseWords, stateMeaning, stateWord } from '../words.ts';
import { changeGauge } from './change-gauge.ts';
import { guaranteePageStyle } from './guarantee-page-style.ts';
import './guarantee-picture.ts';
import { guaranteeRecords, type GuaranteeRecords } from './guarantee-records.ts';
import './history-chart.ts';
import { historyEvent } from './history-event.ts';
import { howComputed } from './how-computed.ts';
import './own-lane.ts';
import { ranges, rangeStart, type Range } from './range-choice.ts';
import './restart-evidence.ts';
import './run-evidence.ts';
import './unit-strip.ts';
import { windowFigures } from './window-figures.ts';

/** How often the records behind the page are asked for, ms, and how many steps a history is drawn in. */
const askEveryMs = 3000;
const points = 240;

/** Windows of exposure, measurements or time have no single units to show. */
function hasUnits(card: GuaranteeCard, strip: Strip | undefined): boolean {
  return strip === undefined ? card.scale.kind === 'share' && card.window.kind !== 'time' : strip.units > 0 || strip.full !== undefined;
}

/** One guarantee: where it stands, how it came there, and how that is known. */
export class GuaranteePage extends LitElement {
  static override properties = {
    guarantee: { attribute: false },
    lane: { attribute: false },
    picture: { attribute: false },
    formats: { attribute: false },
    plantNow: { attribute: false },
    actor: { attribute: false },
    range: { state: true },
    records: { state: true },
  };

  static override styles = [base, guaranteePageStyle];

  declare guarantee: string;
  declare lane: Lane | undefined;
  declare picture: LivePicture | undefined;
  declare formats: Formats | undefined;
  declare plantNow: number;
  declare actor: Actor;
  declare range: Range | undefined;
  declare records: GuaranteeRecords | undefined;

  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  #asking: Subscription | undefined;

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#asking?.unsubscribe();
  }

  protected override willUpdate(changed: PropertyValues): void {
    this.range ??= ranges[1];
    if (changed.has('guarantee')) this.records = undefined;
    if (this.#wiring.value !== undefined && (changed.has('guarantee') || changed.has('range'))) this.#ask(this.#wiring.value);
  }

  protected override render(): TemplateResult | typeof nothing {
    const { picture, formats, lane } = this;
    if (picture === undefined || formats === undefined) return nothing;
    if (lane === undefined) return html`<section class="sheet part"><h1>No guarantee is called ${this.guarantee}</h1><p><a href="/">Go to the line board</a></p></section>`;
    return html`
      ${this.#head(lane, formats)}
      ${lane.card.safetyRelevant ? html`<caution-block></caution-block>` : nothing}
      <div class="columns">
        <div class="main">
          <section class="sheet part" aria-label="Over time">${this.#overTime(lane, formats, picture)}</section>
          ${hasUnits(lane.card, this.records?.strip) ? html`<section class="sheet part"><h2>Units of the window</h2><unit-strip .strip=${this.records?.strip} .formats=${formats}></unit-strip></section>` : nothing}
          ${this.records?.picture === undefined || this.records.picture.kind === 'none' ? nothing : html`<section class="sheet part"><guarantee-picture .picture=${this.records.picture} .card=${lane.card} .formats=${formats} .timeZone=${picture.plant.timeZone}></guarantee-picture></section>`}
          ${lane.view.run === undefined ? nothing : html`<section class="sheet part" aria-label="Evidence of the run"><run-evidence .card=${lane.card} .run=${lane.view.run} .paths=${this.records?.paths} .formats=${formats} .timeZone=${picture.plant.timeZone} .plantNow=${this.plantNow}></run-evidence></section>`}
          <div class="sheet part">${howComputed(formats, lane.card, lane.view)}</div>
        </div>
        <div class="side">
          ${this.#alarms(lane, picture, formats)}
          <section class="sheet part figures-part"><h2>Present window</h2>${windowFigures(formats, lane.card, lane.view, this.plantNow)}</section>
          ${changeGauge(formats, lane.card, lane.view, this.records?.paths)}
          <section class="sheet part restart-part"><restart-evidence .name=${this.actor.ownName} .typed=${this.actor.named === 'typed'} .send=${this.#restart}
            .mayNot=${this.actor.may('restart-evidence', lane.card.line) ? '' : roleMissing('Restarting the evidence', 'restart-evidence', lane.card.lineName)}></restart-evidence></section>
        </div>
      </div>`;
  }

  #head(lane: Lane, formats: Formats): TemplateResult {
    const { card, view, tone } = lane;
    return html`<header class="sheet head ${tone}">
      <div>
        <p class="quiet place">${card.lineName}, ${card.stationNames.join(' to ')}. ${[card.productName, card.characteristicName].filter((name) => name !== undefined && name !== '').join(', ')}</p>
        <h1>${card.name}</h1>
        <p>Promised: ${promiseWords(formats, card)}</p>
      </div>
      <div>
        <p class="word"><svg viewBox="0 0 16 16" aria-hidden="true">${stateMark(view.state)}</svg>${stateWord[view.state]}<b>${written(formats.figureBesideLine(card, view.bound))}</b></p>
        <p>${stateMeaning[view.state]}</p>
        <p>${[view.state === 'unknown' ? view.remark : marginWords(formats, card, view), view.drift === undefined ? undefined : `${driftWord[view.drift]} over the last hour`].filter((part) => part !== undefined).map((part) => `${part.replace(/\.$/, '')}. `)}</p>
        ${view.remark === undefined || view.state === 'unknown' ? nothing : html`<p>${view.remark}</p>`}
        ${view.warnings.map((warning) => html`<p class="warning"><b>Mind:</b> ${warning}</p>`)}
      </div>
      <own-lane .lane=${lane} .formats=${formats}></own-lane>
    </header>`;
  }

  #overTime({ card }: Lane, formats: Formats, picture: LivePicture): TemplateResult {
    const { records } = this;
    const events = records?.history?.events ?? [];
    return html`<div class="over"><h2>Over time</h2>
        <fieldset><legend class="unseen">Span shown</legend>${ranges.map((range) => html`<label><input type="radio" name="range" .checked=${range === this.range} @change=${() => { this.range = range; }} />${range.name}</label>`)}</fieldset></div>
      <history-chart .card=${card} .history=${records?.history} .strip=${records?.strip} .formats=${formats} .timeZone=${picture.plant.timeZone}></history-chart>
      ${records?.faults.map((fault) => html`<p class="fault" role="alert">${fault}</p>`)}
      ${events.length === 0 ? nothing : html`<details><summary>What happened in this span (${formats.count(events.length)})</summary>
        <ol class="events">${[...events].reverse().slice(0, 100).map((happening) => {
          const event = historyEvent(happening, formats);
          return html`<li><span class="letter">${event.letter}</span><span class="quiet">${formats.moment(event.at)}</span><span>${event.words}</span></li>`;
        })}</ol></details>`}`;
  }

  #alarms({ card }: Lane, picture: LivePicture, formats: Formats): TemplateResult | typeof nothing {
    const alarms = [...picture.alarms.values()].filter((alarm) => alarm.guarantee === card.id).sort(byUrgency).slice(0, 8);
    return alarms.length === 0 ? nothing : html`<section aria-label="Alarms of this guarantee"><h2 class="unseen">Alarms</h2><ol class="alarms">
      ${repeat(alarms, (alarm) => alarm.id, (alarm) => html`<li><alarm-card brief .alarm=${alarm} .card=${card} .formats=${formats} .plantNow=${this.plantNow} .actor=${this.actor}></alarm-card></li>`)}</ol></section>`;
  }

  #ask({ desk }: Wiring): void {
    this.#asking?.unsubscribe();
    this.#asking = timer(0, askEveryMs)
      .pipe(switchMap(() => {
        const to = this.plantNow;
        return guaranteeRecords(desk, this.guarantee, rangeStart(this.range ?? { name: '', spanMs: undefined }, to, this.picture?.plant.shift), to, points);
      }))
      .subscribe((records) => {
        this.records = records;
      });
  }

  readonly #restart = async (by: string, reason: string): Promise<void> => {
    if (this.actor.named === 'typed') this.#wiring.value?.settings.change({ personName: by });
    await this.#wiring.value?.desk.restart(this.guarantee, by, reason);
  };
}

customElements.define('guarantee-page', GuaranteePage);
