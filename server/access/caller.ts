import type { Action } from '../../core/access/action.ts';
import { mayDo, type Granted } from '../../core/access/may-do.ts';

/** Who acts by PIN at a shared terminal. */
export interface ActingPerson extends Granted {
  readonly account: string;
  readonly name: string;
  /** ms */
  readonly until: number;
}

/** Who asks: a person signed in, a display, a program with a token, or anybody where access is open. */
export interface Caller extends Granted {
  readonly kind: 'account' | 'display' | 'token' | 'open';
  /** Under which name it is recorded; undefined where access is open: a person then says who they are. */
  readonly name: string | undefined;
  /** Id of the account that is signed in or owns the token. */
  readonly account: string | undefined;
  /** Id of the session, display or token it comes by. */
  readonly by: string | undefined;
  /** By a cookie, which browsers send unasked: what changes something must then come from a page of this server. */
  readonly cookie: boolean;
  /** Until when it holds as things are, ms. */
  readonly until?: number | undefined;
  /** Who acts there by PIN now. */
  readonly acting?: ActingPerson | undefined;
}

/** What people at a shared terminal do under their own name. */
const actedByPin: readonly Action[] = ['acknowledge'];

/** Who does an action: the person who gave their PIN, where that is what they gave it for; else the caller itself. */
export function whoDoes(caller: Caller, action: Action): Caller {
  const { acting } = caller;
  if (acting === undefined || !actedByPin.includes(action)) return caller;
  return { ...caller, kind: 'account', name: acting.name, account: acting.account, grants: acting.grants, onlyActions: actedByPin };
}

/** Whoever reaches a server whose access is open. */
export const anybody: Caller = {
  kind: 'open',
  name: undefined,
  account: undefined,
  by: undefined,
  cookie: false,
  grants: [
    { role: 'engineer', line: undefined },
    { role: 'administrator', line: undefined },
  ],
};

/** Whether it may see what stands on a line. */
export const seesLine = (caller: Caller, line: string): boolean => mayDo(caller, 'see' satisfies Action, line);
