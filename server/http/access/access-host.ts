import type { FastifyRequest } from 'fastify';
import type { AccessBook } from '../../access/access-book.ts';
import type { ActingPeople } from '../../access/acting.ts';
import type { Caller } from '../../access/caller.ts';
import type { Invitations } from '../../access/invitations.ts';
import type { OwnAccount } from '../../access/own-account.ts';
import type { PasskeyPlace, Passkeys } from '../../access/passkeys.ts';
import { sessionCookie } from '../../access/session-cookie.ts';
import type { Begun, Origin, SignIn } from '../../access/sign-in.ts';

/** What the routes of people are answered from. */
export interface AccessHost {
  readonly book: AccessBook;
  readonly signIn: SignIn;
  readonly invitations: Invitations;
  readonly own: OwnAccount;
  readonly acting: ActingPeople;
  readonly passkeys: Passkeys;
  /** How long a browser keeps the cookie, s. */
  readonly sessionSeconds: number;
  readonly lines: () => readonly string[];
}

export const originOf = (request: FastifyRequest): Origin => ({ address: request.ip, agent: request.headers['user-agent'] ?? '' });

export const isSecure = (request: FastifyRequest): boolean => request.protocol === 'https';

/** The cookie that goes with a session that has begun. */
export const cookieOf = ({ secret }: Begun, request: FastifyRequest, seconds: number): string => sessionCookie(secret, isSecure(request), seconds);

/** The account that asks; routes of one's own account are only reached with one. */
export const accountOf = ({ account }: Caller): string => account ?? '';

/** The name under which a person's act is recorded. */
export const nameOf = ({ name }: Caller): string => name ?? 'unknown';

/** Where a passkey holds: at the host the browser asked for. */
export const placeOf = (request: FastifyRequest): PasskeyPlace => ({ host: request.hostname, origin: `${request.protocol}://${request.host}` });
