import type { Logger } from 'pino';
import type { AccessHost } from '../http/access/access-host.ts';
import { accountRoutes } from '../http/access/account-routes.ts';
import { directoryRoutes } from '../http/access/directory-routes.ts';
import { displayRoutes } from '../http/access/display-routes.ts';
import { meRoute } from '../http/access/me-route.ts';
import { ownRoutes } from '../http/access/own-routes.ts';
import { passkeyRoutes } from '../http/access/passkey-routes.ts';
import { signInRoutes } from '../http/access/sign-in-routes.ts';
import { isTerminal, terminalRoutes } from '../http/access/terminal-routes.ts';
import type { AnyRoute } from '../http/route.ts';
import type { Settings } from '../settings/settings.ts';
import { AccessBook } from './access-book.ts';
import type { AccessFile } from './access-file.ts';
import { AccountGuard } from './account-guard.ts';
import { ActingPeople } from './acting.ts';
import { Directory, type DirectorySetting } from './directory.ts';
import { openGuard, type Guard } from './guard.ts';
import { Invitations } from './invitations.ts';
import { OwnAccount } from './own-account.ts';
import { Passkeys } from './passkeys.ts';
import { Passwords } from './passwords.ts';
import { SignIn } from './sign-in.ts';

export interface AccessSetting {
  readonly file: AccessFile;
  readonly settings: Pick<Settings, 'access' | 'sessionIdleHours' | 'sessionDays'>;
  /** undefined: none is set up. */
  readonly directory: DirectorySetting | undefined;
  readonly plantName: () => string;
  readonly lines: () => readonly string[];
  readonly log: Logger;
  /** Wall time, ms. */
  readonly now?: () => number;
}

/** Who is let in, how they come in, and how those that are in are told that they are no more. */
export interface Access {
  readonly guard: Guard;
  readonly routes: readonly AnyRoute[];
  /** Code of the link for the first account; undefined where there is one, or where access is open. */
  readonly firstCode: string | undefined;
  /** Told the session, display or token that is over. */
  onEnded(listener: (by: string) => void): void;
  /** Whether a session, display or token is over, by time too. */
  isOver(by: string): boolean;
}

/** @throws DamagedAccessItem, StoreError */
export async function accessOf({ file, settings, directory: told, plantName, lines, log, now = Date.now }: AccessSetting): Promise<Access> {
  const { access } = settings;
  if (access === 'open') {
    return { guard: openGuard, routes: [meRoute({ access, hasAccounts: () => false, hasPasskeys: () => false, directory: undefined, lines, hasPassword: () => false, isTerminal: () => false })], firstCode: undefined, onEnded: () => undefined, isOver: () => false };
  }
  const book = await AccessBook.load(file, now);
  const passwords = new Passwords();
  const signIn = new SignIn(book, passwords);
  const acting = new ActingPeople(book, passwords, signIn);
  const spans = { idleMs: settings.sessionIdleHours * 3_600_000, mostMs: settings.sessionDays * 86_400_000 };
  const guard = new AccountGuard(book, acting, spans, (cause) => log.error({ err: cause }, 'a use or a refusal was not kept'));
  const invitations = new Invitations(book, passwords, plantName);
  const host: AccessHost = { book, signIn, passkeys: new Passkeys(book, signIn), invitations, own: new OwnAccount(book, passwords, plantName), acting, sessionSeconds: settings.sessionDays * 86_400, lines };
  const directory = told && new Directory(told, book);
  await book.dropOver(spans);
  return {
    guard,
    routes: [
      meRoute({ access, hasAccounts: () => book.accounts.size > 0, hasPasskeys: () => book.passkeys.size > 0, directory: directory?.name, lines, hasPassword: (account) => typeof book.accounts.get(account)?.password === 'string', isTerminal: (caller) => isTerminal(book, caller) }),
      ...signInRoutes(host), ...accountRoutes(host), ...ownRoutes(host), ...displayRoutes(host), ...terminalRoutes(host), ...passkeyRoutes(host),
      ...(directory === undefined ? [] : directoryRoutes(host, directory)),
    ],
    firstCode: (await invitations.first())?.code,
    onEnded: (listener) => book.onEnded(listener),
    isOver: (by) => book.isOver(by, spans),
  };
}
