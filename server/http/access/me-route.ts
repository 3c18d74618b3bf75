import { actions, type Action } from '../../../core/access/action.ts';
import { mayDo } from '../../../core/access/may-do.ts';
import { whoDoes, type Caller } from '../../access/caller.ts';
import { route, type AnyRoute } from '../route.ts';
import { meAnswer } from './access-answers.ts';

/** What may be done where: at the plant as a whole, and on which lines. */
type May = Readonly<Record<Action, { readonly plant: boolean; readonly lines: 'all' | readonly string[] }>>;

export interface MeHost {
  readonly access: 'open' | 'accounts';
  readonly hasAccounts: () => boolean;
  readonly hasPasskeys: () => boolean;
  /** What people call the directory; undefined where none is set up. */
  readonly directory: string | undefined;
  readonly lines: () => readonly string[];
  /** Whether an account has a password, that it can be asked for again. */
  readonly hasPassword: (account: string) => boolean;
  /** Whether people act by PIN where this caller asks from. */
  readonly isTerminal: (caller: Caller) => boolean;
}

/** GET /api/me: who asks, and what they may; open to all, so that a page knows whether to ask for a name. */
export function meRoute(host: MeHost): AnyRoute {
  return route({
    method: 'GET', path: '/api/me', summary: 'Who asks, and what they may do', needs: 'nobody', answer: meAnswer,
    handle: ({ caller }) => ({
      access: host.access,
      firstAccount: host.access === 'accounts' && !host.hasAccounts(),
      passkeys: host.hasPasskeys(),
      directory: host.directory ?? null,
      caller: told(caller as Caller | undefined, host),
    }),
  });
}

function told(caller: Caller | undefined, { lines, hasPassword, isTerminal }: MeHost): object | null {
  if (caller === undefined) return null;
  const { kind, name, account, grants, until, acting } = caller;
  return {
    kind,
    name: name ?? null,
    account: account ?? null,
    grants: grants.map(({ role, line }) => ({ role, line: line ?? null })),
    until: until ?? null,
    may: mayOf(caller, lines()),
    pin: acting === undefined ? null : { name: acting.name, until: acting.until },
    terminal: isTerminal(caller),
    hasPassword: account !== undefined && hasPassword(account),
  };
}

function mayOf(caller: Caller, lines: readonly string[]): May {
  const of = (action: Action): May[Action] => {
    const doer = whoDoes(caller, action);
    const allowed = lines.filter((line) => mayDo(doer, action, line));
    return { plant: mayDo(doer, action, undefined), lines: allowed.length === lines.length ? 'all' : allowed };
  };
  return Object.fromEntries(actions.map((action) => [action, of(action)])) as unknown as May;
}
