import { html, type TemplateResult } from 'lit';
import type { Actor } from './access/actor.ts';
import { mayDo, type Caller } from './access/me.ts';
import { roleMissing } from './access/role-words.ts';
import type { Who } from './access/who.ts';
import type { Lane } from './board/lane.ts';
import type { LivePicture } from './feed/live-picture.ts';
import type { FetchedPages } from './fetched-pages.ts';
import type { Formats } from './format.ts';
import type { Route } from './route.ts';

/** What the pages are drawn from. */
export interface PageGround {
  readonly route: Route;
  readonly who: Who & { readonly kind: 'known' };
  readonly actor: Actor;
  readonly picture: LivePicture | undefined;
  readonly lanes: readonly Lane[];
  readonly formats: Formats;
  /** The plant's, or this browser's while the plant is not known. */
  readonly timeZone: string;
  readonly plantNow: number;
  readonly wall: boolean;
  readonly grouped: boolean;
  readonly lost: boolean;
}

/** The page of an address, below the masthead. */
export function pageOf(ground: PageGround, pages: FetchedPages): TemplateResult {
  const { route, picture } = ground;
  switch (route.kind) {
    case 'board':
    case 'guarantee':
    case 'alarms':
      return picture === undefined ? waiting(ground.who.caller, ground.lost) : plantPage(ground, picture);
    case 'nowhere':
      return html`<section class="sheet nowhere"><h1>There is no page at ${route.path}</h1><p><a href="/">Go to the line board</a></p></section>`;
    case 'sign-in':
    case 'join':
    case 'display':
      return doorPage(route.kind, ground.who, '', pages);
    default: {
      const { kind } = route;
      return fetchedPage(pages.standOf(kind), () => ownPage(kind, ground));
    }
  }
}

/** What each page of its own is for, and who may. */
const ownPages = {
  people: { doing: 'Managing accounts', action: 'manage-accounts' },
  displays: { doing: 'Managing displays', action: 'manage-displays' },
  sources: { doing: 'Managing sources', action: 'manage-sources' },
  changes: { doing: 'Reading the record of changes', action: 'read-changes' },
} as const;

/** The pages of one's account, people, displays, sources and the record. */
function ownPage(kind: 'account' | keyof typeof ownPages, { who: { me, caller }, actor, picture, formats, timeZone }: PageGround): TemplateResult {
  const lines = picture?.plant.lines ?? [];
  if (kind !== 'account' && !mayDo(caller, ownPages[kind].action, undefined)) {
    return html`<section class="sheet nowhere"><h1>This is not for you to do</h1><p>${roleMissing(ownPages[kind].doing, ownPages[kind].action, 'the whole plant')}</p><p><a href="/">Go to the line board</a></p></section>`;
  }
  if (me.access === 'open' && (kind === 'account' || kind === 'people' || kind === 'displays')) {
    return html`<section class="sheet nowhere"><h1>There are no accounts here</h1><p>Access is open to everybody who reaches this server. Start it with <code>--access accounts</code> to have people sign in.</p></section>`;
  }
  switch (kind) {
    case 'account':
      return html`<account-page .caller=${caller} .lines=${lines} .formats=${formats} .directory=${me.directory}></account-page>`;
    case 'people':
      return html`<people-page .lines=${lines} .formats=${formats} .own=${caller.account}></people-page>`;
    case 'displays':
      return html`<displays-page .lines=${lines} .formats=${formats}></displays-page>`;
    case 'sources':
      return html`<sources-page .formats=${formats} .actor=${actor}></sources-page>`;
    case 'changes':
      return html`<changes-page .lines=${lines} .formats=${formats} .timeZone=${timeZone}></changes-page>`;
  }
}

function plantPage({ route, lanes, formats, plantNow, actor, wall, grouped }: PageGround, picture: LivePicture): TemplateResult {
  switch (route.kind) {
    case 'guarantee':
      return html`<guarantee-page .guarantee=${route.id} .lane=${lanes.find((lane) => lane.card.id === route.id)} .picture=${picture} .formats=${formats} .plantNow=${plantNow} .actor=${actor}></guarantee-page>`;
    case 'alarms':
      return html`<alarm-page .picture=${picture} .formats=${formats} .plantNow=${plantNow} .actor=${actor}></alarm-page>`;
    default:
      return html`<h1 class="unseen">Line board</h1>
        <line-board .lanes=${lanes} .formats=${formats} .plantNow=${plantNow} .wall=${wall} .grouped=${grouped} .actor=${actor}></line-board>`;
  }
}

/** A page before one is in. */
export const doorPage = (kind: 'sign-in' | 'join' | 'display', who: Who, secret: string, pages: FetchedPages): TemplateResult =>
  fetchedPage(pages.standOf(kind), () => {
    switch (kind) {
      case 'sign-in':
        return html`<sign-in-page .who=${who}></sign-in-page>`;
      case 'join':
        return html`<join-page .who=${who} .code=${secret}></join-page>`;
      case 'display':
        return html`<display-page .code=${secret}></display-page>`;
    }
  });

function fetchedPage(stand: 'coming' | 'here' | 'failed', page: () => TemplateResult): TemplateResult {
  switch (stand) {
    case 'coming':
      return html`<p class="waiting" role="status">Fetching the page.</p>`;
    case 'failed':
      return html`<section class="sheet nowhere"><h1>This page could not be fetched</h1><p>The server does not answer, or was updated since this browser opened the page.</p>
        <button @click=${() => { location.reload(); }}>Load anew</button></section>`;
    case 'here':
      return page();
  }
}

function waiting(caller: Caller, lost: boolean): TemplateResult {
  if (caller.grants.length === 0 && caller.kind === 'account') {
    return html`<section class="sheet nowhere"><h1>You have no role yet</h1><p>You are signed in as ${caller.name}, and may see nothing of the plant so far. An administrator gives roles under “People”.</p></section>`;
  }
  return html`<section class="waiting"><h1>Vouchline</h1><p role="status">${lost ? 'The server does not answer. Trying again.' : 'Waiting for the first figures.'}</p></section>`;
}
