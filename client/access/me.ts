import type { Action } from '../../core/access/action.ts';
import type { Grant } from '../../core/access/role.ts';

/** Where an action is allowed: for what concerns the plant, and on which lines. */
export interface Reach {
  readonly plant: boolean;
  readonly lines: 'all' | readonly string[];
}

/** Whom the server takes this browser for. */
export interface Caller {
  readonly kind: 'account' | 'display' | 'token' | 'open';
  /** Under which name acts go on record; undefined where access is open. */
  readonly name: string | undefined;
  readonly account: string | undefined;
  readonly grants: readonly Grant[];
  /** When the session ends by itself, wall time, ms since 1970. */
  readonly until: number | undefined;
  readonly may: Readonly<Partial<Record<Action, Reach>>>;
  /** Who acknowledges here by PIN, and until when, wall time, ms since 1970. */
  readonly pin: { readonly name: string; readonly until: number } | undefined;
  /** Whether people may identify themselves here by PIN. */
  readonly terminal: boolean;
  /** Whether there is a password that can be asked for again; who came from the directory alone has none. */
  readonly hasPassword: boolean;
}

/** What the server tells anybody of itself and of who asks. */
export interface Me {
  readonly access: 'open' | 'accounts';
  /** No account exists yet. */
  readonly firstAccount: boolean;
  /** Whether one can sign in with a passkey. */
  readonly passkeys: boolean;
  /** Name of the directory one can sign in with. */
  readonly directory: string | undefined;
  readonly caller: Caller | undefined;
}

/** @param line  undefined: what concerns the whole plant */
export function mayDo(caller: Caller, action: Action, line: string | undefined): boolean {
  const reach = caller.may[action];
  if (reach === undefined) return false;
  return line === undefined ? reach.plant : reach.lines === 'all' || reach.lines.includes(line);
}

export function mayDoSomewhere(caller: Caller, action: Action): boolean {
  const reach = caller.may[action];
  return reach !== undefined && (reach.plant || reach.lines === 'all' || reach.lines.length > 0);
}
