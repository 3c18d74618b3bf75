import { nameKey } from '../../core/access/person-name.ts';
import { Conflict, NotFound } from '../http/refusals.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import type { Account, StoredGrant } from './access-items.ts';

export interface AccountChange {
  readonly grants?: readonly StoredGrant[] | undefined;
  readonly disabled?: boolean | undefined;
  readonly shownAs?: string | undefined;
}

const isAdministrator = ({ disabled, grants }: Account): boolean => !disabled && grants.some(({ role, line }) => role === 'administrator' && line === null);

/**
 * Changes roles, name shown or whether an account may be used. Somebody can always manage accounts: the last enabled
 * administrator of the plant stays one.
 *
 * @throws NotFound, Conflict
 */
export async function changeAccount(book: AccessBook, by: string, id: string, { grants, disabled, shownAs }: AccountChange, why: string): Promise<Account> {
  const ended: string[] = [];
  const account = await book.exclusively(async () => {
    const before = book.accounts.get(id);
    if (before === undefined) throw new NotFound('there is no such account');
    const after: Account = { ...before, grants: grants === undefined ? before.grants : [...grants], disabled: disabled ?? before.disabled, shownAs: shownAs ?? before.shownAs };
    const others = book.accounts.entries().some(([other, account]) => other !== id && isAdministrator(account));
    if (isAdministrator(before) && !isAdministrator(after) && !others) throw new Conflict('the last administrator of the plant stays one: make another first');
    if (shownAs !== undefined && book.accounts.find((account) => account !== before && nameKey(account.shownAs) === nameKey(shownAs))) throw new Conflict('shownAs: somebody is shown under this name already');
    const drops = after.disabled ? book.sessionsOf(id).map(([session]) => session) : [];
    ended.push(...drops, ...(after.disabled ? book.tokens.entries().filter(([, token]) => token.account === id).map(([token]) => token) : []));
    await book.write([book.accounts.written(id, after), ...drops.map((session) => book.sessions.dropped(session))], [changeOf('account', by, `account ${before.name}`, told(before), told(after), why)]);
    return after;
  });
  // What a connection was let in for may be another thing now: its sessions connect anew.
  book.ended([...ended, ...book.sessionsOf(id).map(([session]) => session)]);
  return account;
}

const told = ({ shownAs, grants, disabled }: Account): { shownAs: string; grants: StoredGrant[]; disabled: boolean } => ({ shownAs, grants, disabled });
