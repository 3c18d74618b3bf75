import { createContext } from '@lit/context';
import type { Action } from '../../core/access/action.ts';
import { mayDo } from './me.ts';
import type { Who } from './who.ts';

/** Under whose name something done at this browser goes on record, and what may be done here. */
export interface Actor {
  /** How the name is known: typed in by whoever acts, from the session, or by PIN for a while. */
  readonly named: 'typed' | 'session' | 'pin';
  /** Who acknowledges; empty: asked for, by name or by PIN. */
  readonly name: string;
  /** Who does everything else; empty: asked for. */
  readonly ownName: string;
  readonly may: (action: Action, line: string | undefined) => boolean;
}

/** Nobody: may do nothing. */
export const noActor: Actor = { named: 'session', name: '', ownName: '', may: () => false };

/** @param typedName  the name this browser's person gave last where access is open */
export function actorOf(who: Who, typedName: string): Actor {
  if (who.kind !== 'known') return noActor;
  const { caller } = who;
  if (caller.kind === 'open') return { named: 'typed', name: typedName, ownName: typedName, may: (action, line) => mayDo(caller, action, line) };
  const byPin = caller.kind === 'display' && caller.terminal;
  return {
    named: byPin || caller.pin !== undefined ? 'pin' : 'session',
    name: caller.pin?.name ?? (byPin ? '' : (caller.name ?? '')),
    ownName: caller.name ?? '',
    may: (action, line) => mayDo(caller, action, line) || (action === 'acknowledge' && byPin && caller.pin === undefined),
  };
}

export const actorContext = createContext<Actor>(Symbol('actor'));
