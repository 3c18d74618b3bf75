import { distinctUntilChanged, map, of, shareReplay, switchMap, tap, type Observable } from 'rxjs';
import { mayDoSomewhere, type Caller } from '../access/me.ts';
import type { Who } from '../access/who.ts';
import { startState, type LiveState } from './live-state.ts';

/** What decides which figures a caller is shown; undefined: none. */
function audienceOf(who: Who): string | undefined {
  if (who.kind !== 'known' || !mayDoSomewhere(who.caller, 'see')) return undefined;
  const { kind, name, account, grants }: Caller = who.caller;
  return JSON.stringify([kind, name, account, grants]);
}

/**
 * Live state for whoever sits here: begins anew for somebody else, holds nothing for nobody. Each time the connection is
 * lost it is asked whether the session still stands, for a socket does not say why it was refused.
 */
export function liveOfCaller(who$: Observable<Who>, live$: () => Observable<LiveState>, onLost: () => void): Observable<LiveState> {
  return who$.pipe(
    map(audienceOf),
    distinctUntilChanged(),
    switchMap((audience) => (audience === undefined ? of(startState) : askingWhenLost(live$(), onLost))),
    shareReplay({ bufferSize: 1, refCount: true }), // the page's parts share one socket
  );
}

function askingWhenLost(live$: Observable<LiveState>, onLost: () => void): Observable<LiveState> {
  let told: LiveState['link'] | undefined;
  return live$.pipe(tap(({ link }) => {
    if (link.kind === 'lost' && link !== told) onLost();
    told = link;
  }));
}
