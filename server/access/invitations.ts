import { nameKey } from '../../core/access/person-name.ts';
import { BadRequest } from '../http/request-schemas.ts';
import { Conflict, NotFound } from '../http/refusals.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import type { Account, Invitation, StoredGrant } from './access-items.ts';
import { newPasswordFault, type Passwords } from './passwords.ts';
import { hashOfSecret, newId, newSecret } from './secret.ts';
import { accountNamed } from './sign-in.ts';

const day = 86_400_000;

/** A link that was made: its code is shown this once. */
export interface Link {
  readonly id: string;
  readonly code: string;
  readonly expires: number;
}

export interface NewPerson {
  readonly name?: string | undefined;
  readonly shownAs?: string | undefined;
  readonly password: string;
}

/** The first account may manage accounts, and write the plant. */
const firstGrants: readonly StoredGrant[] = [
  { role: 'administrator', line: null },
  { role: 'engineer', line: null },
];

/** Links by which people make their own account, or a new password. */
export class Invitations {
  readonly #book: AccessBook;
  readonly #passwords: Passwords;
  readonly #plantName: () => string;

  constructor(book: AccessBook, passwords: Passwords, plantName: () => string) {
    this.#book = book;
    this.#passwords = passwords;
    this.#plantName = plantName;
  }

  /** A link for the first account, in place of any before; undefined where there is an account. Valid for a day. */
  first(): Promise<Link | undefined> {
    return this.#book.exclusively(async () => {
      if (this.#book.accounts.size > 0) return undefined;
      const before = this.#book.invitations.entries().filter(([, { kind }]) => kind === 'first').map(([id]) => this.#book.invitations.dropped(id));
      return this.#make({ kind: 'first', grants: [...firstGrants], account: null, shownAs: null, by: 'first start' }, day, 'the first account', before);
    });
  }

  /** @param days 1 to 30 */
  invite(by: string, grants: readonly StoredGrant[], shownAs: string | undefined, days: number): Promise<Link> {
    return this.#book.exclusively(() => this.#make({ kind: 'account', grants: [...grants], account: null, shownAs: shownAs ?? null, by }, days * day, shownAs ?? 'a new account'));
  }

  /** @throws NotFound */
  newPassword(by: string, account: string, why: string): Promise<Link> {
    return this.#book.exclusively(async () => {
      const person = this.#book.accounts.get(account);
      if (person === undefined) throw new NotFound('there is no such account');
      return this.#make({ kind: 'new-password', grants: [], account, shownAs: person.shownAs, by }, day, `a new password of ${person.name}`, [], why);
    });
  }

  /** @throws NotFound */
  withdraw(by: string, id: string): Promise<void> {
    return this.#book.exclusively(async () => {
      const invitation = this.#book.invitations.get(id);
      if (invitation === undefined) throw new NotFound('there is no such invitation');
      await this.#book.write([this.#book.invitations.dropped(id)], [changeOf('invitation', by, `invitation ${id}`, told(invitation), null)]);
    });
  }

  /** @throws NotFound where a code is unknown, used or expired */
  look(code: string): [string, Invitation] {
    const hash = hashOfSecret(code);
    const found = this.#book.invitations.find((one) => one.hash === hash);
    if (found === undefined || found[1].expires <= this.#book.now()) throw new NotFound('This link is not valid: it was used, withdrawn, or is too old. Ask for a new one.');
    return found;
  }

  /** Makes the account, or sets the new password and ends its sessions. @returns id of the account @throws NotFound, BadRequest, Conflict */
  async accept(code: string, person: NewPerson): Promise<string> {
    const [, looked] = this.look(code);
    const known = looked.account === null ? undefined : this.#book.accounts.get(looked.account);
    const [name, shownAs] = known ? [known.name, known.shownAs] : [required('name', person.name), required('shownAs', person.shownAs)];
    const fault = newPasswordFault(person.password, [name, shownAs, this.#plantName(), 'vouchline']);
    if (fault !== undefined) throw new BadRequest('password', `password: ${fault}`);
    const password = await this.#passwords.hash(person.password);
    const ended: string[] = [];
    const account = await this.#book.exclusively(async () => {
      const [id, invitation] = this.look(code); // Still valid, now that nothing else can use it up.
      const drop = this.#book.invitations.dropped(id);
      if (invitation.account !== null) {
        const before = this.#book.accounts.get(invitation.account);
        if (before === undefined) throw new NotFound('the account is gone');
        const sessions = this.#book.sessionsOf(invitation.account).map(([session]) => session);
        ended.push(...sessions);
        await this.#book.write(
          [drop, this.#book.accounts.written(invitation.account, { ...before, password }), ...sessions.map((session) => this.#book.sessions.dropped(session))],
          [changeOf('account', before.shownAs, `account ${before.name}`, null, 'a new password', `by a link of ${invitation.by}`)],
        );
        return invitation.account;
      }
      this.#checkNames(name, shownAs);
      const made: Account = { name, shownAs, grants: invitation.grants, made: this.#book.now(), lastSeen: null, disabled: false, password, pin: null };
      const account = newId();
      await this.#book.write([drop, this.#book.accounts.written(account, made)], [changeOf('account', shownAs, `account ${name}`, null, { shownAs, grants: invitation.grants }, `invited by ${invitation.by}`)]);
      return account;
    });
    this.#book.ended(ended);
    return account;
  }

  #checkNames(name: string, shownAs: string): void {
    if (accountNamed(this.#book, name) !== undefined) throw new Conflict('name: somebody has this name already; choose another');
    if (this.#book.accounts.find((account) => nameKey(account.shownAs) === nameKey(shownAs)) !== undefined) {
      throw new Conflict('shownAs: somebody is shown under this name already; add something that tells you apart');
    }
  }

  async #make(of: Omit<Invitation, 'hash' | 'made' | 'expires'>, ms: number, what: string, staged: Parameters<AccessBook['write']>[0] = [], why = ''): Promise<Link> {
    const [code, id, made] = [newSecret(''), newId(), this.#book.now()];
    const invitation: Invitation = { ...of, hash: hashOfSecret(code), made, expires: made + ms };
    await this.#book.write([...staged, this.#book.invitations.written(id, invitation)], [changeOf('invitation', of.by, `invitation ${id}: ${what}`, null, told(invitation), why)]);
    return { id, code, expires: invitation.expires };
  }
}

const told = ({ kind, grants, expires }: Invitation): { kind: string; grants: StoredGrant[]; expires: number } => ({ kind, grants, expires });

function required(field: string, value: string | undefined): string {
  const text = value?.trim() ?? '';
  if (text === '') throw new BadRequest(field, `${field}: is missing; expected a name`);
  return text;
}
