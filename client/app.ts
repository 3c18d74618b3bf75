import { ContextProvider } from '@lit/context';
import { html, LitElement, nothing, type TemplateResult } from 'lit';
import { queueScheduler } from 'rxjs';
import { actorOf, type Actor } from './access/actor.ts';
import { keepReturn, takeReturn } from './access/return-path.ts';
import type { Who } from './access/who.ts';
import './alarms/acknowledge-dialog.ts';
import { Acknowledging } from './alarms/acknowledging.ts';
import './alarms/alarm-page.ts';
import './alarms/alarm-announcer.ts';
import { reasonOf } from './ask.ts';
import { doorPage, pageOf } from './app-page.ts';
import { appStyle } from './app-style.ts';
import './board/line-board.ts';
import { lanesOf, type Lane } from './board/lane.ts';
import { wiringContext, type Wiring } from './contexts.ts';
import { freshnessOf } from './feed/link.ts';
import type { LivePicture } from './feed/live-picture.ts';
import type { LiveState } from './feed/live-state.ts';
import { plantTime } from './feed/plant-clock.ts';
import { FetchedPages } from './fetched-pages.ts';
import { formatsFor, type Formats } from './format.ts';
import './guarantee/guarantee-page.ts';
import { LiveValue } from './live-value.ts';
import { base } from './look/base.ts';
import { showTheme } from './look/theme.ts';
import { PageAddress } from './page-address.ts';
import { pageTitle } from './page-title.ts';
import './parts/acting-bar.ts';
import './parts/link-banner.ts';
import './parts/masthead.ts';
import { PersonRequest } from './parts/person-menu.ts';
import type { Settings } from './settings.ts';
import { SignedIn } from './sign-in/signed-in.ts';
import { onWallChange, wallOf } from './wall.ts';
import { headline } from './words.ts';

/** The whole page: masthead, what the connection says, one of the pages; or a door for whoever is not in. */
export class VouchlineApp extends LitElement {
  static override styles = [base, appStyle];

  readonly #wiring: Wiring;
  readonly #live: LiveValue<LiveState>;
  readonly #who: LiveValue<Who>;
  readonly #settings: LiveValue<Settings>;
  readonly #address = new PageAddress(this);
  readonly #pages = new FetchedPages(this);
  readonly #acknowledging: Acknowledging;
  #lanes: { readonly of: LivePicture; readonly made: readonly Lane[] } | undefined;
  #fault = '';
  #wasIn = false;
  #formats: { readonly key: string; readonly made: Formats } | undefined;

  constructor(wiring: Wiring) {
    super();
    this.#wiring = wiring;
    this.#live = new LiveValue(this, wiring.live$);
    this.#who = new LiveValue(this, wiring.who.who$, queueScheduler); // at once: a way in or out waits for no frame
    this.#settings = new LiveValue(this, wiring.settings.settings$);
    void new LiveValue(this, wiring.ticks$);
    void new ContextProvider(this, { context: wiringContext, initialValue: wiring });
    const actor = (): Actor => this.#actor;
    this.#acknowledging = new Acknowledging(this, { ...wiring, actor, cards: () => this.#live.value?.picture?.cards ?? [] });
    this.addEventListener(SignedIn.type, () => { void this.#onSignedIn(); });
    this.addEventListener(PersonRequest.type, (event) => { if (event instanceof PersonRequest) void this.#onWish(event.wish).catch(this.#onFault); });
    onWallChange(() => { this.requestUpdate(); });
  }

  /** Whoever is not in is sent to the door, and comes back from there to where they were. */
  protected override willUpdate(): void {
    const who = this.#who.value;
    const { route, isDoor } = this.#address;
    if (who?.kind === 'known' && !this.#wasIn) this.#comeBack();
    this.#wasIn = who?.kind === 'known';
    if (who?.kind !== 'nobody' || isDoor || who.why === 'withdrawn') return;
    if (who.why !== 'left' && route.kind !== 'nowhere') keepReturn(sessionStorage, location.pathname);
    this.#address.go('/sign-in', 'instead');
  }

  protected override render(): TemplateResult | typeof nothing {
    const settings = this.#settings.value;
    const live = this.#live.value;
    const who = this.#who.value;
    if (settings === undefined || live === undefined || who === undefined) return nothing;
    showTheme(settings.theme);
    const { route } = this.#address;
    const wall = wallOf(settings.wall, who.kind === 'known' ? who.caller : undefined) && route.kind === 'board';
    document.documentElement.classList.toggle('wall', wall);
    document.title = pageTitle(route);
    if (who.kind === 'asking') return this.#waiting(who.unanswered);
    if (route.kind === 'sign-in' || route.kind === 'join' || route.kind === 'display') return html`<main tabindex="-1">${doorPage(route.kind, who, this.#address.secret, this.#pages)}</main>`;
    return who.kind === 'nobody' ? this.#withdrawn() : this.#inside(who, live, settings, wall);
  }

  #inside(who: Who & { kind: 'known' }, live: LiveState, settings: Settings, wall: boolean): TemplateResult {
    const { picture } = live;
    const { route } = this.#address;
    const now = this.#wiring.now();
    const freshness = freshnessOf(live.link, now);
    const timeZone = picture?.plant.timeZone ?? Intl.DateTimeFormat().resolvedOptions().timeZone;
    const formats = this.#formatsFor(timeZone, settings);
    const plantNow = picture === undefined ? this.#wiring.wall() : plantTime(picture.clock, now);
    const lanes = picture === undefined ? [] : this.#lanesOf(picture);
    const needing = lanes.filter((lane) => lane.needsPerson).length;
    if (picture !== undefined) document.title = `${needing > 0 ? `(${needing}) ` : ''}${pageTitle(route)}, ${picture.plant.name}`;
    const { pin } = who.caller;
    return html`
      <header>
      <a class="skip" href="#content" @click=${this.#skip}>Skip to the content</a>
      <page-masthead .picture=${picture} .says=${picture === undefined ? 'Vouchline' : headline(formats, needing, picture.cards.length)} .formats=${formats} .plantNow=${plantNow}
        .freshness=${freshness} .settings=${settings} .who=${who} .route=${route.kind} .wall=${wall}
        @vouchline-settings=${(event: CustomEvent<Partial<Settings>>) => { this.#wiring.settings.change(event.detail); }}></page-masthead>
      <link-banner .picture=${picture} .freshness=${freshness} .formats=${formats} .plantNow=${plantNow}></link-banner>
      <acting-bar .name=${pin?.name} .leftMs=${(pin?.until ?? 0) - this.#wiring.wall()}></acting-bar>
      <p class="fault" role="alert">${this.#fault}</p>
      </header>
      <main id="content" tabindex="-1" class=${freshness.kind === 'live' ? 'live' : 'stale'}>
        ${pageOf({ route, who, actor: this.#actor, picture, lanes, formats, timeZone, plantNow, wall, grouped: settings.grouped, lost: freshness.kind === 'lost' }, this.#pages)}
      </main>
      <alarm-announcer .alarms=${picture?.alarms} .cards=${picture?.cards} .formats=${formats} .actor=${this.#actor} .shown=${!wall && route.kind !== 'alarms'}></alarm-announcer>
      <acknowledge-dialog></acknowledge-dialog>
      <pin-dialog></pin-dialog>`;
  }

  get #actor(): Actor {
    return actorOf(this.#who.value ?? { kind: 'asking', unanswered: false, display: false }, this.#settings.value?.personName ?? '');
  }

  #waiting(unanswered: boolean): TemplateResult {
    return html`<main class="waiting"><h1>Vouchline</h1>
      <p role="status">${unanswered ? 'The server does not answer. Trying again.' : 'Asking the server.'}</p></main>`;
  }

  #withdrawn(): TemplateResult {
    return html`<main class="withdrawn"><h1>Not live: this display was withdrawn</h1>
      <p role="status">Its link no longer holds, so nothing of the plant is shown here. An administrator can make another link under “Displays” and open it on this screen.</p>
      <p><a href="/sign-in">Sign in as a person</a></p></main>`;
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

  /** Who came in by way of the directory stands at the board, and is brought to where they wanted to go. */
  #comeBack(): void {
    if (this.#address.route.kind !== 'board') return;
    const path = takeReturn(sessionStorage);
    if (path !== '/') this.#address.go(path, 'instead');
  }

  async #onSignedIn(): Promise<void> {
    await this.#wiring.who.refresh();
    this.#address.go(takeReturn(sessionStorage), 'instead');
  }

  async #onWish(wish: PersonRequest['wish']): Promise<void> {
    const { who, ask } = this.#wiring;
    this.#fault = '';
    switch (wish) {
      case 'sign-out':
        return who.signOut();
      case 'act-by-pin':
        await this.#acknowledging.byPin('For two minutes from your last act, acknowledging at this screen goes on record under your name.', 'Act');
        return;
      case 'end-acting':
        await ask('DELETE', '/api/terminal/act-as');
        return who.refresh();
    }
  }

  readonly #onFault = (cause: unknown): void => {
    this.#fault = `That did not work: ${reasonOf(cause)}.`;
    this.requestUpdate();
  };

  readonly #skip = (event: Event): void => {
    event.preventDefault();
    this.renderRoot.querySelector<HTMLElement>('#content')?.focus();
  };
}

customElements.define('vouchline-app', VouchlineApp);
