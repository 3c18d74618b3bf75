import { BehaviorSubject, timer, type Observable, type Subscription } from 'rxjs';
import { Refusal, type Ask } from '../ask.ts';
import { backoffMs } from '../feed/backoff.ts';
import type { Me } from './me.ts';
import { nextWho, type Who, type WhoEvent } from './who.ts';

export interface WhoDesk {
  readonly who$: Observable<Who>;
  /** Asks the server again; resolves when it answered or could not. */
  readonly refresh: () => Promise<void>;
  /** Leaves on purpose. @param end  how the session is ended; absent: this one alone */
  readonly signOut: (end?: () => Promise<void>) => Promise<void>;
}

export interface WhoEnds {
  readonly ask: Ask;
  /** Wall time, ms since 1970. */
  readonly wall: () => number;
  readonly chance: () => number;
  /** Whether this browser is a display; kept so that a withdrawn one says so after a start too. */
  readonly display: { readonly is: () => boolean; readonly keep: (is: boolean) => void };
}

/** Longest span a timer can be set to, ms. */
const longestMs = 2_147_483_647;

/** Knows who sits here: asks at the start, when a session or somebody's acting by PIN runs out, and when told to. */
export function whoDesk({ ask, wall, chance, display }: WhoEnds): WhoDesk {
  const who$ = new BehaviorSubject<Who>({ kind: 'asking', unanswered: false, display: display.is() });
  let failures = 0;
  let leaving = false;
  let again: Subscription | undefined;
  let asking: Promise<void> | undefined;

  function next(event: WhoEvent): void {
    who$.next(nextWho(who$.value, event));
    const now = who$.value;
    if (now.kind === 'known') display.keep(now.caller.kind === 'display');
    else if (now.kind === 'nobody' && now.why === 'left') display.keep(false);
    again?.unsubscribe();
    const waitMs = event.kind === 'unanswered' ? backoffMs(failures, chance()) : untilChangeMs(now, wall());
    again = waitMs === undefined ? undefined : timer(Math.min(waitMs, longestMs)).subscribe(() => void refresh());
  }

  async function askOnce(): Promise<void> {
    try {
      const me = await ask<Me>('GET', '/api/me');
      failures = 0;
      if (leaving && me.caller === undefined) next({ kind: 'left' });
      next({ kind: 'told', me });
    } catch {
      failures += 1;
      next({ kind: 'unanswered' });
    }
  }

  function refresh(): Promise<void> {
    asking ??= askOnce().finally(() => { asking = undefined; });
    return asking;
  }

  return {
    who$: who$.asObservable(),
    refresh,
    signOut: async (end = () => ask('POST', '/api/sign-out')) => {
      leaving = true;
      try {
        await end().catch((cause: unknown) => {
          if (!(cause instanceof Refusal && cause.status === 401)) throw cause;
        });
        next({ kind: 'left' });
      } finally {
        leaving = false;
      }
      await refresh();
    },
  };
}

/** When what is known changes by itself, ms from now. */
function untilChangeMs(who: Who, wall: number): number | undefined {
  if (who.kind !== 'known') return undefined;
  const ends = [who.caller.until, who.caller.pin?.until].filter((end) => end !== undefined && end > wall);
  return ends.length === 0 ? undefined : Math.min(...ends.map((end) => (end ?? wall) - wall)) + 250;
}
