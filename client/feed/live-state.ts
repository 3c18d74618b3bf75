import {
  asyncScheduler, catchError, defer, map, of, repeat, scan, shareReplay, startWith, tap, timeout, timer,
  type Observable, type SchedulerLike,
} from 'rxjs';
import type { LiveMessage, LiveWatch } from '../../core/live/message.ts';
import { backoffMs } from './backoff.ts';
import type { Link } from './link.ts';
import { nextPicture, type LivePicture } from './live-picture.ts';

export interface LiveState {
  readonly link: Link;
  readonly picture: LivePicture | undefined;
}

type Step = { readonly kind: 'told'; readonly message: LiveMessage } | { readonly kind: 'lost'; readonly retryInMs: number };

/** What a feed needs of the world, so that tests bring their own. */
export interface FeedEnds {
  readonly messages: (watch: () => LiveWatch) => Observable<LiveMessage>;
  /** Steady clock, ms. */
  readonly now: () => number;
  readonly chance: () => number;
  readonly scheduler?: SchedulerLike;
}

/** Longest silence of an open socket before it is given up and opened again, ms. */
const giveUpAfterMs = 10_000;

function linkAfter(old: Link, step: Step, now: number): Link {
  if (step.kind === 'lost') {
    const since = old.kind === 'lost' || old.kind === 'stopping' ? old.since : old.kind === 'open' ? old.heardAt : now;
    return { kind: 'lost', since, retryAt: now + step.retryInMs };
  }
  return step.message.type === 'stopping'
    ? { kind: 'stopping', reason: step.message.reason, since: now }
    : { kind: 'open', heardAt: now };
}

export function nextState(old: LiveState, step: Step, now: number): LiveState {
  const picture = step.kind === 'told' ? nextPicture(old.picture, step.message, now) : old.picture;
  return { link: linkAfter(old.link, step, now), picture };
}

export const startState: LiveState = { link: { kind: 'connecting' }, picture: undefined };

/** Live state from now on: connects, resumes where it stood, waits longer after each failure. Shared by the whole page. */
export function liveStateOf(ends: FeedEnds): Observable<LiveState> {
  const scheduler = ends.scheduler ?? asyncScheduler;
  return defer(() => {
    let known: LivePicture | undefined;
    let failures = 0;
    let retryInMs = 0;
    const watch = (): LiveWatch =>
      known === undefined ? { type: 'watch' } : { type: 'watch', boot: known.boot, revision: known.revision };
    const lost = (): Step => {
      failures += 1;
      retryInMs = backoffMs(failures, ends.chance());
      return { kind: 'lost', retryInMs };
    };
    return defer(() => ends.messages(watch)).pipe(
      timeout({ each: giveUpAfterMs, scheduler }),
      tap(() => { failures = 0; }),
      map((message): Step => ({ kind: 'told', message })),
      catchError(() => of(lost())),
      repeat({ delay: () => timer(retryInMs, scheduler) }),
      scan((state, step) => nextState(state, step, ends.now()), startState),
      tap((state) => { known = state.picture; }),
      startWith(startState),
    );
  }).pipe(shareReplay({ bufferSize: 1, refCount: true }));
}
