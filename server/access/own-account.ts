import { NotFound } from '../http/refusals.ts';
import { BadRequest } from '../http/request-schemas.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import type { RecordedChange } from '../../core/access/change.ts';
import type { Account, ApiToken, StoredGrant } from './access-items.ts';
import type { Action } from '../../core/access/action.ts';
import { pinFault } from '../../core/access/pin-fault.ts';
import { newPasswordFault, type Passwords } from './passwords.ts';
import { Throttle } from './throttle.ts';
import { TooManyTries } from './too-many-tries.ts';
import { hashOfSecret, newId, newSecret } from './secret.ts';

const day = 86_400_000;
/** Records shown of what happened lately, and looked through for them where names begin alike. */
const latest = 20;
const searched = 200;
const itemKinds = ['passkey', 'token'] as const;

/** What people do with their own account. */
export class OwnAccount {
  readonly #book: AccessBook;
  readonly #passwords: Passwords;
  readonly #plantName: () => string;
  /** Whoever sits at somebody's open session does not guess the password there. */
  readonly #throttle: Throttle;

  constructor(book: AccessBook, passwords: Passwords, plantName: () => string) {
    this.#book = book;
    this.#passwords = passwords;
    this.#plantName = plantName;
    this.#throttle = new Throttle({ free: 5, first: 5_000, most: 15 * 60_000 }, book.now);
  }

  /** Sets a new password and ends every session but this one. @throws BadRequest, TooManyTries */
  async changePassword(id: string, session: string, old: string, next: string): Promise<void> {
    const { name, shownAs } = await this.#checked(id, old, 'old');
    const fault = newPasswordFault(next, [name, shownAs, this.#plantName(), 'vouchline']);
    if (fault !== undefined) throw new BadRequest('new', `new: ${fault}`);
    const password = await this.#passwords.hash(next);
    const ended = await this.#book.exclusively(async () => {
      const others = this.#book.sessionsOf(id).map(([other]) => other).filter((other) => other !== session);
      const account = this.#account(id);
      await this.#book.write([this.#book.accounts.written(id, { ...account, password }), ...others.map((other) => this.#book.sessions.dropped(other))], [changeOf('account', shownAs, `account ${name}`, null, 'a new password')]);
      return others;
    });
    this.#book.ended(ended);
  }

  /** @param pin 4 to 8 digits, not all the same nor a run up or down; undefined takes it away @throws BadRequest, TooManyTries */
  async setPin(id: string, password: string | undefined, pin: string | undefined): Promise<void> {
    await this.again(id, password);
    const { name, shownAs } = this.#account(id);
    const fault = pin === undefined ? undefined : pinFault(pin);
    if (fault !== undefined) throw new BadRequest('pin', `pin: ${fault}`);
    const hash = pin === undefined ? null : await this.#passwords.hash(pin);
    await this.#book.exclusively(() => this.#book.write([this.#book.accounts.written(id, { ...this.#account(id), pin: hash })], [changeOf('pin', shownAs, `account ${name}`, null, pin === undefined ? 'no PIN' : 'a new PIN')]));
  }

  /** @param grants within the person's own; null: whatever the person may @param days 1 to 366 */
  makeToken(id: string, of: { readonly name: string; readonly actions: readonly Action[]; readonly grants: readonly StoredGrant[] | null; readonly days: number }): Promise<{ readonly id: string; readonly token: string }> {
    return this.#book.exclusively(async () => {
      const { shownAs } = this.#account(id);
      const [token, tokenId, made] = [newSecret('vouchline-api_'), newId(), this.#book.now()];
      const kept: ApiToken = { hash: hashOfSecret(token), name: of.name, account: id, actions: [...of.actions], grants: of.grants === null ? null : [...of.grants], made, expires: made + of.days * day, lastUsed: null };
      await this.#book.write([this.#book.tokens.written(tokenId, kept)], [changeOf('token', shownAs, `token ${tokenId}: ${of.name}`, null, { actions: kept.actions, grants: kept.grants, expires: kept.expires })]);
      return { id: tokenId, token };
    });
  }

  /** @throws NotFound */
  async revokeToken(id: string, token: string): Promise<void> {
    await this.#book.exclusively(async () => {
      const kept = this.#book.tokens.get(token);
      if (kept?.account !== id) throw new NotFound('there is no such token');
      await this.#book.write([this.#book.tokens.dropped(token)], [changeOf('token', this.#account(id).shownAs, `token ${token}: ${kept.name}`, { actions: kept.actions }, null)]);
    });
    this.#book.ended([token]);
  }

  /** What happened to the account lately, newest first: sign-ins and tries, and every change of what it is signed in by. */
  async lately(id: string): Promise<readonly RecordedChange[]> {
    const { name, shownAs } = this.#account(id);
    const [ofAccount, ...ofItems] = await Promise.all([
      this.#book.changes({ holds: `account ${name}`, limit: searched }),
      ...itemKinds.map((kind) => this.#book.changes({ kind, holds: shownAs, limit: latest })),
    ]);
    const own = [...ofAccount.filter(({ what }) => what === `account ${name}`), ...ofItems.flat().filter(({ who }) => who === shownAs)];
    return own.sort((a, b) => b.id - a.id).slice(0, latest);
  }

  /** Makes sure again of who sits there, before another way in is opened; an account without a password has none to ask for. @throws BadRequest, TooManyTries */
  async again(id: string, password: string | undefined): Promise<void> {
    if (this.#account(id).password !== null) await this.#checked(id, password ?? '', 'password');
  }

  #account(id: string): Account {
    const account = this.#book.accounts.get(id);
    if (account === undefined) throw new NotFound('there is no such account');
    return account;
  }

  async #checked(id: string, password: string, field: string): Promise<Account> {
    const account = this.#account(id);
    const wait = this.#throttle.wait(id);
    if (wait > 0) throw new TooManyTries(wait);
    this.#throttle.tried(id);
    if (await this.#passwords.matches(account.password, password)) {
      this.#throttle.succeeded(id);
      return account;
    }
    throw new BadRequest(field, `${field}: the password is not right`);
  }
}
