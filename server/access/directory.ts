import * as openid from 'openid-client';
import type { DirectoryFault } from '../../core/access/directory-fault.ts';
import { keptName, nameKey, personNameFault } from '../../core/access/person-name.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import type { Account } from './access-items.ts';
import { isLoopback } from './open-access.ts';
import { hashOfSecret, newId, newSecret } from './secret.ts';
import { ShortLived } from './short-lived.ts';
import { accountNamed } from './sign-in.ts';

export interface DirectorySetting {
  readonly issuer: string;
  readonly clientId: string;
  readonly clientSecret: string;
  /** What people call it. */
  readonly name: string;
}

/** A sign-in that is under way at the directory. */
interface UnderWay {
  readonly verifier: string;
  readonly nonce: string;
  /** Account that is to be known by it; undefined: signs in. */
  readonly link: string | undefined;
}

/** A sign-in through the directory that does not hold. */
export class DirectoryRefusal extends Error {
  readonly fault: DirectoryFault;

  constructor(fault: DirectoryFault) {
    super(fault);
    this.fault = fault;
  }
}

const fiveMinutes = 300_000;

/**
 * Sign-in through the plant's directory by OpenID Connect (authorization code with PKCE). Who is known to the directory
 * gets an account without roles; an account there is under the same name is not taken over, its owner links it.
 *
 * @source OpenID Connect Core 1.0; IETF RFC 7636, RFC 9700 (by a library)
 */
export class Directory {
  readonly name: string;
  readonly #setting: DirectorySetting;
  readonly #book: AccessBook;
  readonly #underWay: ShortLived<UnderWay>;
  #known: Promise<openid.Configuration> | undefined;

  constructor(setting: DirectorySetting, book: AccessBook) {
    this.#setting = setting;
    this.name = setting.name;
    this.#book = book;
    this.#underWay = new ShortLived(fiveMinutes, 10_000, book.now);
  }

  /** Where the browser is sent, and the state that its cookie has to bring back. @param back address of the answer */
  async begin(back: string, link: string | undefined): Promise<{ readonly to: string; readonly state: string }> {
    const [verifier, state, nonce] = [openid.randomPKCECodeVerifier(), newSecret(''), openid.randomNonce()];
    const to = openid.buildAuthorizationUrl(await this.#configuration(), {
      redirect_uri: back, scope: 'openid profile', state, nonce,
      code_challenge: await openid.calculatePKCECodeChallenge(verifier), code_challenge_method: 'S256',
    });
    this.#underWay.hold(state, { verifier, nonce, link });
    return { to: to.href, state };
  }

  /**
   * @param answered the address that was come back to, with what the directory says
   * @param state that the cookie brought back
   * @returns id of the account
   * @throws DirectoryRefusal where the answer does not hold, the account is disabled, or the name is somebody's or no name
   */
  async finish(answered: URL, state: string | undefined): Promise<string> {
    const underWay = state === undefined || answered.searchParams.get('state') !== state ? undefined : this.#underWay.take(state);
    if (underWay === undefined || state === undefined) throw new DirectoryRefusal('begun-elsewhere');
    const tokens = await openid
      .authorizationCodeGrant(await this.#configuration(), answered, { pkceCodeVerifier: underWay.verifier, expectedNonce: underWay.nonce, expectedState: state, idTokenExpected: true })
      .catch(() => {
        throw new DirectoryRefusal('not-let-in');
      });
    const claims = tokens.claims();
    if (claims === undefined) throw new DirectoryRefusal('says-nothing');
    const text = (name: string): string | undefined => (typeof claims[name] === 'string' && claims[name] !== '' ? claims[name] : undefined);
    return this.#accountOf(claims.iss, claims.sub, text('preferred_username') ?? claims.sub, text('name'), underWay.link);
  }

  #accountOf(issuer: string, subject: string, username: string, fullName: string | undefined, link: string | undefined): Promise<string> {
    const key = hashOfSecret(JSON.stringify([issuer, subject]));
    return this.#book.exclusively(async () => {
      const known = this.#book.identities.get(key);
      const person = known && this.#book.accounts.get(known.account);
      if (known !== undefined && person !== undefined) {
        if (person.disabled) throw new DirectoryRefusal('account-disabled');
        return known.account;
      }
      const identity = (account: string) => this.#book.identities.written(key, { account, issuer, subject, made: this.#book.now() });
      if (link !== undefined) {
        const own = this.#book.accounts.get(link);
        if (own === undefined) throw new DirectoryRefusal('account-gone');
        await this.#book.write([identity(link)], [changeOf('account', own.shownAs, `account ${own.name}`, null, { directory: this.name })]);
        return link;
      }
      return this.#make(username, fullName ?? username, identity);
    });
  }

  async #make(username: string, fullName: string, identity: (account: string) => ReturnType<AccessBook['identities']['written']>): Promise<string> {
    const name = keptName(username).replaceAll(/[^\p{L}\p{M}\p{N}._@-]/gu, '-').slice(0, 64);
    const said = keptName(fullName);
    if (personNameFault(name) !== undefined || said === '' || personNameFault(said) !== undefined) throw new DirectoryRefusal('name-unfit');
    if (accountNamed(this.#book, name) !== undefined) throw new DirectoryRefusal('name-taken');
    const taken = this.#book.accounts.find(({ shownAs }) => nameKey(shownAs) === nameKey(said)) !== undefined;
    const account: Account = { name, shownAs: (taken ? `${said} (${name})` : said).slice(0, 80), grants: [], made: this.#book.now(), lastSeen: null, disabled: false, password: null, pin: null };
    const id = newId();
    await this.#book.write([this.#book.accounts.written(id, account), identity(id)], [changeOf('account', account.shownAs, `account ${name}`, null, { shownAs: account.shownAs, grants: [], directory: this.name }, 'known to the directory')]);
    return id;
  }

  /** Asked for once; after a failure again. */
  #configuration(): Promise<openid.Configuration> {
    const { issuer, clientId, clientSecret } = this.#setting;
    const url = new URL(issuer);
    // Plain HTTP is taken from a directory on this very machine alone.
    const options = url.protocol === 'http:' && isLoopback(url.hostname) ? { execute: [openid.allowInsecureRequests] } : {};
    this.#known ??= openid.discovery(url, clientId, clientSecret, undefined, options).catch((cause: unknown) => {
      this.#known = undefined;
      throw cause;
    });
    return this.#known;
  }
}
