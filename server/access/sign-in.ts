import { nameKey } from '../../core/access/person-name.ts';
import { NotSignedIn } from '../http/refusals.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import type { Account } from './access-items.ts';
import type { Passwords } from './passwords.ts';
import { networkOf } from './network-of.ts';
import { hashOfSecret, newId, newSecret } from './secret.ts';
import { Sparing } from './sparing.ts';
import { Throttle } from './throttle.ts';
import { TooManyTries } from './too-many-tries.ts';

/** Where somebody comes from, as far as it is known. */
export interface Origin {
  readonly address: string;
  /** What the browser says it is; shown beside the session. */
  readonly agent: string;
}

/** A session that has begun: its secret goes into the cookie, and nowhere else. */
export interface Begun {
  readonly secret: string;
  readonly account: string;
  readonly name: string;
}

const minute = 60_000;
/** Failed sign-ins on record a minute at most. */
const mostRecorded = 10;

/** Lets people in by name and password, and slows down guessing. */
export class SignIn {
  readonly #book: AccessBook;
  readonly #passwords: Passwords;
  /** By account and address together: guessing from elsewhere keeps nobody out. */
  readonly #byPair: Throttle;
  readonly #byAddress: Throttle;
  readonly #recorded: Sparing;

  constructor(book: AccessBook, passwords: Passwords) {
    this.#book = book;
    this.#passwords = passwords;
    this.#byPair = new Throttle({ free: 5, first: 5_000, most: 15 * minute }, book.now);
    this.#recorded = new Sparing(mostRecorded, book.now);
    this.#byAddress = new Throttle({ free: 50, first: 5_000, most: 15 * minute }, book.now);
  }

  /** @returns id of the account @throws TooManyTries, NotSignedIn (the same for an unknown name, a wrong password and a disabled account), TooBusy */
  async check(name: string, password: string, from: Origin): Promise<string> {
    const place = networkOf(from.address);
    const pair = JSON.stringify([nameKey(name), place]);
    const wait = Math.max(this.#byPair.wait(pair), this.#byAddress.wait(place));
    if (wait > 0) throw new TooManyTries(wait);
    this.#byPair.tried(pair);
    this.#byAddress.tried(place);
    const found = accountNamed(this.#book, name);
    const matches = await this.#passwords.matches(found?.[1].password, password);
    if (!matches || found === undefined || found[1].disabled) {
      await this.noteFailed(`account ${name.slice(0, 64)}`, { by: 'password', address: from.address.slice(0, 64) });
      throw new NotSignedIn('The name or the password is not right.');
    }
    this.#byPair.succeeded(pair);
    this.#byAddress.untried(place);
    return found[0];
  }

  /** Begins a session with a new secret, whatever cookie came with the request. @param by how the person was known */
  async begin(account: string, from: Origin, by: string): Promise<Begun> {
    const secret = newSecret('vs_');
    const known = await this.#book.exclusively(async () => {
      const person = this.#book.accounts.get(account);
      if (person === undefined || person.disabled) throw new NotSignedIn();
      const at = this.#book.now();
      const session = { hash: hashOfSecret(secret), account, made: at, lastSeen: at, address: from.address.slice(0, 64), agent: from.agent.slice(0, 200) };
      await this.#book.write(
        [this.#book.sessions.written(newId(), session), this.#book.accounts.written(account, { ...person, lastSeen: at })],
        [changeOf('sign-in', person.shownAs, `account ${person.name}`, null, { by, address: session.address })],
      );
      return person;
    });
    return { secret, account, name: known.shownAs };
  }

  /** Ends sessions of one account. @param who does it, and which of its sessions */
  async end(account: string, who: string, why: string, which: (id: string) => boolean): Promise<void> {
    const ended = await this.#book.exclusively(async () => {
      const ids = this.#book.sessionsOf(account).map(([id]) => id).filter(which);
      if (ids.length === 0) return ids;
      const name = this.#book.accounts.get(account)?.name ?? account;
      await this.#book.write(ids.map((id) => this.#book.sessions.dropped(id)), [changeOf('sign-out', who, `account ${name}`, null, { sessions: ids.length }, why)]);
      return ids;
    });
    this.#book.ended(ended);
  }

  /** Puts a failure on record. @param how by which means and from where it was tried */
  async noteFailed(what: string, how: Readonly<Record<string, string>>): Promise<void> {
    if (!this.#recorded.lets()) return;
    await this.#book.write([], [changeOf('sign-in-failed', 'unknown', what, null, how)]);
  }
}

export function accountNamed(book: AccessBook, name: string): [string, Account] | undefined {
  const key = nameKey(name);
  return book.accounts.find((account) => nameKey(account.name) === key);
}
