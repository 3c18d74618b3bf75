import type { Caller, Me } from './me.ts';

/** Who sits at this browser, as far as it knows. */
export type Who =
  /** Nothing heard yet. `display`: this browser was a display when it was last open. */
  | { readonly kind: 'asking'; readonly unanswered: boolean; readonly display: boolean }
  | { readonly kind: 'nobody'; readonly me: Me; readonly why: 'not yet' | 'left' | 'ended' | 'withdrawn' }
  | { readonly kind: 'known'; readonly me: Me; readonly caller: Caller };

export type WhoEvent =
  | { readonly kind: 'told'; readonly me: Me }
  | { readonly kind: 'unanswered' }
  /** The person signed out here. */
  | { readonly kind: 'left' };

/** A server that does not answer changes nothing of what was known: the connection says that. */
export function nextWho(old: Who, event: WhoEvent): Who {
  switch (event.kind) {
    case 'told':
      return event.me.caller === undefined ? { kind: 'nobody', me: event.me, why: whyNobody(old) } : { kind: 'known', me: event.me, caller: event.me.caller };
    case 'unanswered':
      return old.kind === 'asking' ? { ...old, unanswered: true } : old;
    case 'left':
      return old.kind === 'asking' ? old : { kind: 'nobody', me: { ...old.me, caller: undefined }, why: 'left' };
  }
}

function whyNobody(old: Who): 'not yet' | 'left' | 'ended' | 'withdrawn' {
  switch (old.kind) {
    case 'asking':
      return old.display ? 'withdrawn' : 'not yet';
    case 'nobody':
      return old.why;
    case 'known':
      return old.caller.kind === 'display' ? 'withdrawn' : 'ended';
  }
}
