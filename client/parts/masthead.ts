import { html, LitElement, nothing, svg, type TemplateResult } from 'lit';
import type { Who } from '../access/who.ts';
import { isWaiting } from '../attention.ts';
import type { Freshness } from '../feed/link.ts';
import type { LivePicture } from '../feed/live-picture.ts';
import { recordAgeOf } from '../feed/record-age.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import type { Route } from '../route.ts';
import type { Settings } from '../settings.ts';
import { mastheadStyle } from './masthead-style.ts';
import './person-menu.ts';
import './view-panel.ts';

/** The sentence a supervisor reads first, where and when this is, whether it is live, and who sits here. */
export class PageMasthead extends LitElement {
  static override properties = {
    picture: { attribute: false },
    says: { attribute: false },
    formats: { attribute: false },
    plantNow: { attribute: false },
    freshness: { attribute: false },
    settings: { attribute: false },
    who: { attribute: false },
    route: { attribute: false },
    wall: { type: Boolean, reflect: true },
  };

  static override styles = [base, mastheadStyle];

  declare picture: LivePicture | undefined;
  declare says: string;
  declare formats: Formats | undefined;
  declare plantNow: number;
  declare freshness: Freshness | undefined;
  declare settings: Settings | undefined;
  declare who: Who | undefined;
  declare route: Route['kind'];
  declare wall: boolean;

  protected override render(): TemplateResult | typeof nothing {
    const { picture, formats, freshness } = this;
    if (formats === undefined || freshness === undefined) return nothing;
    return html`<div class="head">
      <p class="says">${this.says}</p>
      <nav aria-label="Pages">
        ${this.#page('/', 'Board', this.route === 'board')} ${this.#page('/alarms', this.#alarmWords(picture, formats), this.route === 'alarms')}
        <view-panel .settings=${this.settings} .wall=${this.wall}></view-panel>
      </nav>
      <person-menu .who=${this.who} .lines=${picture?.plant.lines} .page=${this.route} .wall=${this.wall}></person-menu>
      <dl>
        <div class="mark"><dt class="unseen">Program</dt><dd>Vouchline</dd></div>
        ${picture === undefined ? html`<div><dt class="unseen">Connection</dt><dd>No figures yet</dd></div>` : this.#plant(picture, formats, freshness)}
        ${this.who?.kind === 'known' && this.who.caller.kind === 'open' ? html`<div><dt class="unseen">Access</dt><dd>Open to everybody who reaches it</dd></div>` : nothing}
      </dl>
    </div>`;
  }

  #plant(picture: LivePicture, formats: Formats, freshness: Freshness): TemplateResult {
    return html`<div><dt class="unseen">Plant and shift</dt><dd>${picture.plant.name}${this.#shift(picture, formats)}</dd></div>
        <div class="time"><dt class="unseen">Plant clock</dt><dd class="clock">${this.wall ? formats.minute(this.plantNow) : formats.clock(this.plantNow)}</dd></div>
        <div><dt class="unseen">Connection</dt><dd>${this.#liveness(picture, formats, freshness)}</dd></div>`;
  }

  #page(path: string, name: string, here: boolean): TemplateResult {
    return html`<a href=${path} aria-current=${here ? 'page' : 'false'}>${name}</a>`;
  }

  #alarmWords(picture: LivePicture | undefined, formats: Formats): string {
    if (picture === undefined) return 'Alarms';
    const waiting = [...picture.alarms.values()].filter(isWaiting).length;
    return waiting === 0 ? 'Alarms' : `Alarms: ${formats.count(waiting)} waiting`;
  }

  #shift({ plant }: LivePicture, formats: Formats): string {
    return plant.shift === undefined ? '' : `, ${plant.shift.name}, ${formats.span(this.plantNow - plant.shift.since)} in`;
  }

  #liveness(picture: LivePicture, formats: Formats, freshness: Freshness): TemplateResult {
    const records = recordAgeOf(picture, this.plantNow);
    const age = records.kind === 'none yet' ? 'no record yet' : `newest record ${formats.span(records.ageMs)} ago`;
    const live = freshness.kind === 'live' && records.kind !== 'old';
    const word = live ? 'Live' : freshness.kind === 'live' ? 'No records' : 'Not live';
    return html`<span class=${live ? 'live' : 'not-live'}><svg viewBox="0 0 12 12" aria-hidden="true">${live
      ? svg`<circle cx="6" cy="6" r="4.5" fill="currentColor"/>`
      : svg`<path d="M2 2l8 8M10 2l-8 8" stroke="currentColor" stroke-width="2.4"/>`}</svg><b>${word}</b></span>${this.wall && live ? nothing : html`, ${age}`}`;
  }
}

customElements.define('page-masthead', PageMasthead);
