import { NotSignedIn } from '../http/refusals.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import { grantsOf } from './access-items.ts';
import type { ActingPerson } from './caller.ts';
import type { Passwords } from './passwords.ts';
import type { SignIn } from './sign-in.ts';
import { Throttle } from './throttle.ts';
import { TooManyTries } from './too-many-tries.ts';

/** How long somebody acts at a terminal after their last act, ms. */
const actingMs = 120_000;

interface Acting {
  readonly account: string;
  until: number;
}

/**
 * Who acts at a shared terminal just now: somebody who gave their PIN there. It is forgotten when the server stops, and
 * two minutes after their last act.
 */
export class ActingPeople {
  readonly #book: AccessBook;
  readonly #passwords: Passwords;
  readonly #signIn: SignIn;
  readonly #throttle: Throttle;
  /** By session or display. */
  readonly #acting = new Map<string, Acting>();

  constructor(book: AccessBook, passwords: Passwords, signIn: SignIn) {
    this.#book = book;
    this.#signIn = signIn;
    this.#passwords = passwords;
    this.#throttle = new Throttle({ free: 3, first: 10_000, most: 15 * 60_000 }, book.now);
    book.onEnded((by) => this.#acting.delete(by));
  }

  /** @param at session or display @param place what it is called on record @throws TooManyTries, NotSignedIn */
  async actAs(at: string, place: string, account: string, pin: string): Promise<ActingPerson> {
    const keys = [JSON.stringify(['at', at]), JSON.stringify(['account', account])];
    const wait = Math.max(...keys.map((key) => this.#throttle.wait(key)));
    if (wait > 0) throw new TooManyTries(wait);
    for (const key of keys) this.#throttle.tried(key);
    const person = this.#book.accounts.get(account);
    if (!(await this.#passwords.matches(person?.pin, pin)) || person === undefined || person.disabled) {
      await this.#signIn.noteFailed(`account ${person?.name ?? 'unknown'}`, { by: 'PIN', at: place });
      throw new NotSignedIn('The PIN is not right.');
    }
    for (const key of keys) this.#throttle.succeeded(key);
    await this.#book.write([], [changeOf('sign-in', person.shownAs, `account ${person.name}`, null, { by: 'PIN', at: place })]);
    this.#acting.set(at, { account, until: this.#book.now() + actingMs });
    return this.at(at) as ActingPerson;
  }

  end(at: string): void {
    this.#acting.delete(at);
  }

  /** Who acts there; undefined for nobody. */
  at(at: string): ActingPerson | undefined {
    const acting = this.#acting.get(at);
    const person = acting && this.#book.accounts.get(acting.account);
    if (acting === undefined || person === undefined || person.disabled || acting.until <= this.#book.now()) {
      this.#acting.delete(at);
      return undefined;
    }
    return { account: acting.account, name: person.shownAs, grants: grantsOf(person.grants), until: acting.until };
  }

  /** Somebody acted: they go on acting for a while. */
  acted(at: string): void {
    const acting = this.#acting.get(at);
    if (acting) acting.until = this.#book.now() + actingMs;
  }
}
