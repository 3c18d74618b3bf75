import type { Grant } from '../../core/access/role.ts';
import type { Ask } from '../ask.ts';

/** An account as those see it who manage accounts. Times are wall time, ms since 1970. */
export interface Person {
  readonly id: string;
  /** To sign in with. */
  readonly name: string;
  /** As others see it. */
  readonly shownAs: string;
  readonly grants: readonly Grant[];
  readonly made: number;
  readonly lastSeen: number | undefined;
  readonly disabled: boolean;
  readonly hasPin: boolean;
  readonly passkeys: number;
  readonly sessions: number;
}

export interface PersonChange {
  readonly grants?: readonly Grant[];
  readonly disabled?: boolean;
  readonly shownAs?: string;
}

export interface PersonInvitation {
  readonly id: string;
  readonly kind?: 'first' | 'account' | 'new-password';
  readonly grants: readonly Grant[];
  readonly shownAs: string | undefined;
  readonly made: number;
  readonly by: string;
  readonly expires: number;
}

/** A link that is told this once. */
export interface MadeLink {
  readonly link: string;
  readonly expires: number;
}

export interface PeopleDesk {
  readonly people: () => Promise<readonly Person[]>;
  readonly change: (id: string, change: PersonChange, why: string) => Promise<void>;
  readonly newPasswordLink: (id: string, why: string) => Promise<MadeLink>;
  readonly signOutEverywhere: (id: string, why: string) => Promise<void>;
  readonly invitations: () => Promise<readonly PersonInvitation[]>;
  /** @param shownAs  empty: the person says */
  readonly invite: (grants: readonly Grant[], shownAs: string, days: number) => Promise<MadeLink>;
  readonly withdraw: (id: string) => Promise<void>;
}

const told = (grants: readonly Grant[]): object[] => grants.map(({ role, line }) => ({ role, line: line ?? null }));
const ofAccount = (id: string): string => `/api/accounts/${encodeURIComponent(id)}`;

/** The whole address of a link the server told. */
export const wholeLink = (link: string): string => new URL(link, location.origin).href;

export const peopleDesk = (ask: Ask): PeopleDesk => ({
  people: () => ask('GET', '/api/accounts'),
  change: async (id, { grants, ...change }, why) => {
    await ask('PUT', ofAccount(id), { ...change, ...(grants === undefined ? {} : { grants: told(grants) }), why });
  },
  newPasswordLink: (id, why) => ask('POST', `${ofAccount(id)}/new-password-link`, { why }),
  signOutEverywhere: (id, why) => ask('POST', `${ofAccount(id)}/sign-out-everywhere`, { why }),
  invitations: () => ask('GET', '/api/invitations'),
  invite: (grants, shownAs, days) => ask('POST', '/api/invitations', { grants: told(grants), ...(shownAs === '' ? {} : { shownAs }), days }),
  withdraw: (id) => ask('DELETE', `/api/invitations/${encodeURIComponent(id)}`),
});
