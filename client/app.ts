import { ContextProvider } from '@lit/context';
import { html, LitElement, nothing, type TemplateResult } from 'lit';
import { AcknowledgeRequest } from './alarms/acknowledge-request.ts';
import './alarms/acknowledge-dialog.ts';
import './alarms/alarm-page.ts';
import './alarms/alarm-announcer.ts';
import { appStyle } from './app-style.ts';
import './board/line-board.ts';
import { lanesOf, type Lane } from './board/lane.ts';
import { wiringContext, type Wiring } from './contexts.ts';
import { freshnessOf, type Freshness } from './feed/link.ts';
import type { LivePicture } from './feed/live-picture.ts';
import type { LiveState } from './feed/live-state.ts';
import { plantTime } from './feed/plant-clock.ts';
import { formatsFor, type Formats } from './format.ts';
import './guarantee/guarantee-page.ts';
import { LiveValue } from './live-value.ts';
import { base } from './look/base.ts';
import './parts/link-banner.ts';
import './parts/masthead.ts';
import { PageAddress } from './page-address.ts';
import type { Settings } from './settings.ts';
import { showTheme } from './look/theme.ts';
import { headline } from './words.ts';
import { wallOf, wallQuery } from './wall.ts';

/** The whole page: masthead, what the connection says, one of the pages, and the acknowledging that all of them share. */
export class VouchlineApp extends LitElement {
  static override styles = [base, appStyle];

  readonly #wiring: Wiring;
  readonly #live: LiveValue<LiveState>;
  readonly #settings: LiveValue<Settings>;
  readonly #address = new PageAddress(this);
  #lanes: { readonly of: LivePicture; readonly made: readonly Lane[] } | undefined;
  #formats: { readonly key: string; readonly made: Formats } | undefined;

  constructor(wiring: Wiring) {
    super();
    this.#wiring = wiring;
    this.#live = new LiveValue(this, wiring.live$);
    this.#settings = new LiveValue(this, wiring.settings.settings$);
    void new LiveValue(this, wiring.ticks$);
    void new ContextProvider(this, { context: wiringContext, initialValue: wiring });
    this.addEventListener(AcknowledgeRequest.type, (event) => {
      if (event instanceof AcknowledgeRequest) void this.#acknowledge(event);
    });
    wallQuery.addEventListener('change', () => {
      this.requestUpdate();
    });
  }

  protected override render(): TemplateResult | typeof nothing {
    const settings = this.#settings.value;
    const live = this.#live.value;
    if (settings === undefined || live === undefined) return nothing;
    showTheme(settings.theme);
    const now = this.#wiring.now();
    const freshness = freshnessOf(live.link, now);
    const { picture } = live;
    const wall = wallOf(settings.wall) && this.#address.route.kind === 'board';
    document.documentElement.classList.toggle('wall', wall);
    if (picture === undefined) return this.#waiting(freshness);
    const formats = this.#formatsFor(picture.plant.timeZone, settings);
    const plantNow = plantTime(picture.clock, now);
    const lanes = this.#lanesOf(picture);
    const needing = lanes.filter((lane) => lane.needsPerson).length;
    const says = headline(formats, needing, picture.cards.length);
    document.title = `${needing > 0 ? `(${needing}) ` : ''}Vouchline, ${picture.plant.name}`;
    return html`
      <header>
      <a class="skip" href="#content" @click=${this.#skip}>Skip to the content</a>
      <page-masthead .picture=${picture} .says=${says} .formats=${formats} .plantNow=${plantNow} .freshness=${freshness}
        .settings=${settings} .route=${this.#address.route.kind} .wall=${wall}
        @vouchline-settings=${(event: CustomEvent<Partial<Settings>>) => {
          this.#wiring.settings.change(event.detail);
        }}></page-masthead>
      <link-banner .picture=${picture} .freshness=${freshness} .formats=${formats} .plantNow=${plantNow}></link-banner>
      </header>
      <main id="content" tabindex="-1" class=${freshness.kind === 'live' ? 'live' : 'stale'}>
        ${this.#page(picture, lanes, formats, plantNow, settings, wall)}
      </main>
      <alarm-announcer .alarms=${picture.alarms} .cards=${picture.cards} .formats=${formats} .shown=${!wall && this.#address.route.kind !== 'alarms'}></alarm-announcer>
      <acknowledge-dialog></acknowledge-dialog>`;
  }

  #page(picture: LivePicture, lanes: readonly Lane[], formats: Formats, plantNow: number, settings: Settings, wall: boolean): TemplateResult {
    const { route } = this.#address;
    switch (route.kind) {
      case 'board':
        return html`<h1 class="unseen">Line board</h1>
          <line-board .lanes=${lanes} .formats=${formats} .plantNow=${plantNow} .wall=${wall} .grouped=${settings.grouped}></line-board>`;
      case 'guarantee':
        return html`<guarantee-page .guarantee=${route.id} .lane=${lanes.find((lane) => lane.card.id === route.id)} .picture=${picture} .formats=${formats} .plantNow=${plantNow} .personName=${settings.personName}></guarantee-page>`;
      case 'alarms':
        return html`<alarm-page .picture=${picture} .formats=${formats} .plantNow=${plantNow} .personName=${settings.personName}></alarm-page>`;
      case 'nowhere':
        return html`<section class="sheet nowhere"><h1>There is no page at ${route.path}</h1><p><a href="/">Go to the line board</a></p></section>`;
    }
  }

  #waiting(freshness: Freshness): TemplateResult {
    return html`<main class="waiting"><h1>Vouchline</h1>
      <p role="status">${freshness.kind === 'lost' ? 'The server does not answer. Trying again.' : 'Waiting for the first figures.'}</p></main>`;
  }

  #lanesOf(picture: LivePicture): readonly Lane[] {
    const old = this.#lanes;
    const same = old?.of.views === picture.views && old.of.alarms === picture.alarms && old.of.cards === picture.cards;
    this.#lanes = { of: picture, made: same ? old.made : lanesOf(picture, old?.made) };
    return this.#lanes.made;
  }

  #formatsFor(timeZone: string, settings: Settings): Formats {
    const key = `${timeZone} ${settings.shareUnit}`;
    if (this.#formats?.key !== key) this.#formats = { key, made: formatsFor(navigator.language, timeZone, settings.shareUnit) };
    return this.#formats.made;
  }

  /** One tap for a person this browser knows; otherwise it asks who acknowledges. */
  async #acknowledge(request: AcknowledgeRequest): Promise<void> {
    const dialog = this.renderRoot.querySelector('acknowledge-dialog');
    const card = this.#live.value?.picture?.cards.find((one) => one.id === request.alarm.guarantee);
    const name = this.#settings.value?.personName ?? '';
    await dialog?.begin(request.alarm, card?.name ?? request.alarm.guarantee, name, name !== '' && !request.withNote, async (by, note) => {
      this.#wiring.settings.change({ personName: by });
      await this.#wiring.desk.acknowledge(request.alarm.id, by, note);
    });
  }

  readonly #skip = (event: Event): void => {
    event.preventDefault();
    this.renderRoot.querySelector<HTMLElement>('#content')?.focus();
  };
}

customElements.define('vouchline-app', VouchlineApp);
