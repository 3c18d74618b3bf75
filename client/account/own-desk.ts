import type { Action } from '../../core/access/action.ts';
import type { RecordedChange } from '../../core/access/change.ts';
import type { Ask } from '../ask.ts';

/** A browser somebody is signed in with. */
export interface OwnSession {
  readonly id: string;
  readonly made: number;
  readonly lastSeen: number;
  readonly address: string;
  readonly agent: string;
  readonly current: boolean;
}

export interface OwnToken {
  readonly id: string;
  readonly name: string;
  readonly actions: readonly Action[];
  readonly made: number;
  readonly expires: number;
  readonly lastUsed: number | undefined;
}

export interface OwnPasskey {
  readonly id: string;
  readonly name: string;
  readonly made: number;
  readonly lastUsed: number | undefined;
}

/** What a person does with their own account. Times are wall time, ms since 1970. */
export interface OwnDesk {
  readonly sessions: () => Promise<readonly OwnSession[]>;
  /** What happened to the account lately, newest first. */
  readonly lately: () => Promise<readonly RecordedChange[]>;
  readonly endSession: (id: string) => Promise<void>;
  readonly endAllSessions: () => Promise<void>;
  readonly setPassword: (old: string, next: string) => Promise<void>;
  readonly setPin: (password: string, pin: string) => Promise<void>;
  readonly dropPin: (password: string) => Promise<void>;
  readonly tokens: () => Promise<readonly OwnToken[]>;
  /** The token is told this once. */
  readonly makeToken: (name: string, actions: readonly Action[], days: number) => Promise<string>;
  readonly dropToken: (id: string) => Promise<void>;
  readonly passkeys: () => Promise<readonly OwnPasskey[]>;
  /** What a new passkey is made from. */
  readonly beginPasskey: (password: string) => Promise<object>;
  readonly finishPasskey: (name: string, answer: object) => Promise<void>;
  readonly dropPasskey: (id: string, password: string) => Promise<void>;
}

const path = (of: string, id: string): string => `/api/own/${of}/${encodeURIComponent(id)}`;

/** A password where there is one to be asked for. */
const known = (password: string): { readonly password?: string } => (password === '' ? {} : { password });

export const ownDesk = (ask: Ask): OwnDesk => ({
  sessions: () => ask('GET', '/api/own/sessions'),
  lately: () => ask('GET', '/api/own/changes'),
  endSession: (id) => ask('DELETE', path('sessions', id)),
  endAllSessions: () => ask('POST', '/api/own/sign-out-everywhere'),
  setPassword: (old, next) => ask('POST', '/api/own/password', { old, new: next }),
  setPin: (password, pin) => ask('PUT', '/api/own/pin', { ...known(password), pin }),
  dropPin: (password) => ask('DELETE', '/api/own/pin', known(password)),
  tokens: () => ask('GET', '/api/own/tokens'),
  makeToken: async (name, actions, days) => (await ask<{ readonly token: string }>('POST', '/api/own/tokens', { name, actions, days })).token,
  dropToken: (id) => ask('DELETE', path('tokens', id)),
  passkeys: () => ask('GET', '/api/own/passkeys'),
  beginPasskey: (password) => ask('POST', '/api/own/passkeys/begin', known(password)),
  finishPasskey: (name, answer) => ask('POST', '/api/own/passkeys/finish', { name, answer }),
  dropPasskey: (id, password) => ask('DELETE', path('passkeys', id), known(password)),
});
