import { ContextConsumer } from '@lit/context';
import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { Actor } from '../access/actor.ts';
import { reasonOf } from '../ask.ts';
import { byUrgency, isActive, isWaiting } from '../attention.ts';
import { wiringContext } from '../contexts.ts';
import type { LivePicture } from '../feed/live-picture.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { counted } from '../words.ts';
import './alarm-card.ts';

const pageSize = 50;

/** All alarms: those that want somebody first, those in hand next, the ended ones by page. */
export class AlarmPage extends LitElement {
  static override properties = {
    picture: { attribute: false },
    formats: { attribute: false },
    plantNow: { attribute: false },
    actor: { attribute: false },
  };

  static override styles = [base, css`
    :host { max-width: 64rem; margin: 0 auto; }
    h1 { font-size: 1.4rem; margin: 0.3rem 0 0.8rem; }
    h2 { font-size: 1.05rem; margin: 1.4rem 0 0.5rem; }
    ol { display: grid; gap: 0.7rem; }
    .empty { padding: 2rem 1.6rem; }
    .more { margin-top: 0.8rem; }
    .fault { color: var(--harm); font-weight: 600; margin-top: 0.5rem; }
  `];

  declare picture: LivePicture | undefined;
  declare formats: Formats | undefined;
  declare plantNow: number;
  declare actor: Actor;

  readonly #wiring = new ContextConsumer(this, { context: wiringContext });
  #older: readonly Alarm[] = [];
  #allRead = false;
  #fault = '';

  protected override render(): TemplateResult | typeof nothing {
    const { picture, formats } = this;
    if (picture === undefined || formats === undefined) return nothing;
    const all = [...picture.alarms.values()].sort(byUrgency);
    const waiting = all.filter(isWaiting);
    const inHand = all.filter((alarm) => isActive(alarm) && !isWaiting(alarm));
    const ended = this.#ended(all);
    return html`<h1>${waiting.length === 0 ? 'No alarm waits for you' : `${counted(formats, waiting.length, 'alarm')} ${waiting.length === 1 ? 'waits' : 'wait'} for acknowledgement`}</h1>
      ${all.length === 0 ? this.#empty() : nothing}
      ${this.#list('Waiting', waiting, formats, false)} ${this.#list('In hand: active and acknowledged', inHand, formats, true)}
      ${this.#list('Ended', ended, formats, true)}
      ${ended.length === 0 || this.#allRead ? nothing : html`<button class="more" @click=${() => { void this.#readOlder(ended); }}>Show older alarms</button>`}
      <p class="fault" role="alert">${this.#fault}</p>`;
  }

  #list(name: string, alarms: readonly Alarm[], formats: Formats, headed: boolean): TemplateResult | typeof nothing {
    if (alarms.length === 0) return nothing;
    const cards = new Map(this.picture?.cards.map((card) => [card.id, card]));
    return html`<section aria-label=${name}>
      <h2 class=${headed ? '' : 'unseen'}>${name}</h2>
      <ol>${repeat(alarms, (alarm) => alarm.id, (alarm) => html`<li><alarm-card .alarm=${alarm} .card=${cards.get(alarm.guarantee)} .formats=${formats}
        .plantNow=${this.plantNow} .actor=${this.actor}></alarm-card></li>`)}</ol>
    </section>`;
  }

  #empty(): TemplateResult {
    return html`<section class="empty sheet"><p>Nothing has been raised. When a bound crosses its guarantee line, a rate rises or a source falls silent, the alarm stands here with what to do about it.</p></section>`;
  }

  /** Ended alarms, the newest first: those the server told of by itself and those asked for. */
  #ended(all: readonly Alarm[]): readonly Alarm[] {
    const byId = new Map([...this.#older, ...all.filter((alarm) => alarm.state.kind === 'ended')].map((alarm) => [alarm.id, alarm]));
    return [...byId.values()].sort((a, b) => b.id - a.id);
  }

  async #readOlder(ended: readonly Alarm[]): Promise<void> {
    try {
      const older = (await this.#wiring.value?.desk.endedAlarms(ended.at(-1)?.id, pageSize)) ?? [];
      this.#older = [...this.#older, ...older];
      this.#allRead = older.length < pageSize;
      this.#fault = '';
    } catch (cause) {
      this.#fault = `Older alarms could not be read: ${reasonOf(cause)}.`;
    }
    this.requestUpdate();
  }
}

customElements.define('alarm-page', AlarmPage);
