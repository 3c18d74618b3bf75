import {
  generateAuthenticationOptions, generateRegistrationOptions, verifyAuthenticationResponse, verifyRegistrationResponse,
  type AuthenticationResponseJSON, type RegistrationResponseJSON,
} from '@simplewebauthn/server';
import { NotFound, NotSignedIn } from '../http/refusals.ts';
import { BadRequest } from '../http/request-schemas.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import type { Passkey } from './access-items.ts';
import { newSecret } from './secret.ts';
import { ShortLived } from './short-lived.ts';
import type { Begun, Origin, SignIn } from './sign-in.ts';

/** The place passkeys are for: host without port, and scheme with host. */
export interface PasskeyPlace {
  readonly host: string;
  readonly origin: string;
}

const minutes = 60_000;
type Transports = NonNullable<AuthenticationResponseJSON['authenticatorAttachment']> | 'ble' | 'cable' | 'hybrid' | 'internal' | 'nfc' | 'smart-card' | 'usb';

/**
 * Passkeys: beside a password as the second factor (an account with a passkey is asked for it), or alone, where the
 * device has made sure of the person. @source W3C Web Authentication Level 2 (by a library)
 */
export class Passkeys {
  readonly #book: AccessBook;
  readonly #signIn: SignIn;
  /** Challenges given out, by account or by themselves. */
  readonly #making: ShortLived<string>;
  readonly #asking: ShortLived<string>;
  /** Accounts whose password was right. */
  readonly #tickets: ShortLived<string>;

  constructor(book: AccessBook, signIn: SignIn) {
    this.#book = book;
    this.#signIn = signIn;
    this.#making = new ShortLived(5 * minutes, 1_000, book.now);
    this.#asking = new ShortLived(5 * minutes, 10_000, book.now);
    this.#tickets = new ShortLived(5 * minutes, 10_000, book.now);
  }

  /** What a device needs to make a passkey for an account. */
  async beginMaking(account: string, place: PasskeyPlace): Promise<object> {
    const person = this.#book.accounts.get(account);
    if (person === undefined) throw new NotFound('there is no such account');
    const options = await generateRegistrationOptions({
      rpName: 'Vouchline', rpID: place.host, userName: person.name, userDisplayName: person.shownAs, userID: new TextEncoder().encode(account), attestationType: 'none',
      excludeCredentials: this.#book.passkeysOf(account).map(([id]) => ({ id })),
      authenticatorSelection: { residentKey: 'preferred', userVerification: 'preferred' },
    });
    this.#making.hold(account, options.challenge);
    return options;
  }

  /** @throws BadRequest where the answer does not hold */
  async finishMaking(account: string, name: string, answer: object, place: PasskeyPlace): Promise<{ readonly id: string }> {
    const challenge = this.#making.take(account);
    if (challenge === undefined) throw new BadRequest('answer', 'answer: nothing was asked for, or it took longer than five minutes; begin again');
    const verified = await verifyRegistrationResponse({
      response: answer as RegistrationResponseJSON, expectedChallenge: challenge, expectedOrigin: place.origin, expectedRPID: place.host, requireUserVerification: false,
    }).catch((cause: unknown) => {
      throw new BadRequest('answer', `answer: ${(cause as Error).message}`);
    });
    if (!verified.verified) throw new BadRequest('answer', 'answer: the passkey does not hold');
    const { id, publicKey, counter, transports = [] } = verified.registrationInfo.credential;
    const passkey: Passkey = { account, name, publicKey: Buffer.from(publicKey).toString('base64url'), counter, transports, made: this.#book.now(), lastUsed: null };
    await this.#book.exclusively(async () => {
      if (this.#book.passkeys.get(id) !== undefined) throw new BadRequest('answer', 'answer: this passkey is known already');
      await this.#book.write([this.#book.passkeys.written(id, passkey)], [changeOf('passkey', this.#nameOf(account), `passkey ${name}`, null, 'made')]);
    });
    return { id };
  }

  /** @throws NotFound */
  remove(account: string, id: string): Promise<void> {
    return this.#book.exclusively(async () => {
      const passkey = this.#book.passkeys.get(id);
      if (passkey?.account !== account) throw new NotFound('there is no such passkey');
      await this.#book.write([this.#book.passkeys.dropped(id)], [changeOf('passkey', this.#nameOf(account), `passkey ${passkey.name}`, 'made', 'removed')]);
    });
  }

  /** For an account whose password was right and that has a passkey; undefined where it has none. */
  ticketFor(account: string): string | undefined {
    if (this.#book.passkeysOf(account).length === 0) return undefined;
    const ticket = newSecret('vt_');
    this.#tickets.hold(ticket, account);
    return ticket;
  }

  /** What a device needs to answer for somebody: for the account of a ticket, or for whoever it knows. @throws NotSignedIn */
  async beginSignIn(ticket: string | undefined, place: PasskeyPlace): Promise<object> {
    const account = ticket === undefined ? undefined : this.#tickets.look(ticket);
    if (ticket !== undefined && account === undefined) throw new NotSignedIn('It took too long; begin again.');
    const options = await generateAuthenticationOptions({
      rpID: place.host,
      userVerification: account === undefined ? 'required' : 'preferred',
      ...(account === undefined ? {} : { allowCredentials: this.#book.passkeysOf(account).map(([id, { transports }]) => ({ id, transports: transports as Transports[] as never })) }),
    });
    this.#asking.hold(options.challenge, ticket ?? '');
    return options;
  }

  /** @throws NotSignedIn */
  async finishSignIn(ticket: string | undefined, answer: object, place: PasskeyPlace, from: Origin): Promise<Begun> {
    const response = answer as AuthenticationResponseJSON;
    const id = typeof response.id === 'string' ? response.id : '';
    const passkey = this.#book.passkeys.get(id);
    const account = ticket === undefined ? passkey?.account : this.#tickets.look(ticket);
    if (passkey === undefined || account === undefined || passkey.account !== account) throw new NotSignedIn('This passkey is not known here.');
    const verified = await verifyAuthenticationResponse({
      response,
      // The challenge is used up by the first answer to it, whether that holds or not.
      expectedChallenge: (challenge) => this.#asking.take(challenge) === (ticket ?? ''),
      expectedOrigin: place.origin, expectedRPID: place.host, requireUserVerification: ticket === undefined,
      credential: { id, publicKey: new Uint8Array(Buffer.from(passkey.publicKey, 'base64url')), counter: passkey.counter },
    }).catch(() => undefined);
    if (verified?.verified !== true) throw new NotSignedIn('The passkey does not hold.');
    if (ticket !== undefined) this.#tickets.take(ticket);
    await this.#book.exclusively(async () => {
      const kept = this.#book.passkeys.get(id);
      if (kept === undefined) throw new NotSignedIn('This passkey is not known here.');
      await this.#book.write([this.#book.passkeys.written(id, { ...kept, counter: verified.authenticationInfo.newCounter, lastUsed: this.#book.now() })]);
    });
    return this.#signIn.begin(account, from, ticket === undefined ? 'passkey' : 'password and passkey');
  }

  #nameOf(account: string): string {
    return this.#book.accounts.get(account)?.shownAs ?? account;
  }
}
