import type { IncomingMessage } from 'node:http';
import { actions, type Action } from '../../core/access/action.ts';
import type { ChangeKind, RecordedChange } from '../../core/access/change.ts';
import type { Json } from '../../core/access/canonical-json.ts';
import { mayDo, type Granted } from '../../core/access/may-do.ts';
import type { Grant } from '../../core/access/role.ts';

export const hour = 3_600_000;
export const day = 24 * hour;
export const lineIds = ['a', 'b', 'f'];

export interface FakeAccount {
  readonly id: string;
  readonly name: string;
  shownAs: string;
  password: string;
  grants: readonly Grant[];
  readonly made: number;
  lastSeen: number | null;
  disabled: boolean;
  pin: string | undefined;
  passkeys: { id: string; name: string; made: number; lastUsed: number | null }[];
  tokens: { id: string; name: string; actions: readonly Action[]; grants: readonly Grant[]; made: number; expires: number; lastUsed: number | null }[];
}

export interface FakeSession {
  readonly id: string;
  readonly account: string | undefined;
  readonly display: string | undefined;
  readonly made: number;
  lastSeen: number;
  readonly address: string;
  readonly agent: string;
  pin: { readonly account: string; until: number } | undefined;
}

export interface FakeInvitation {
  readonly id: string;
  readonly code: string;
  readonly kind: 'first' | 'account' | 'new-password';
  readonly grants: readonly Grant[];
  readonly account: string | null;
  readonly shownAs: string | null;
  readonly made: number;
  readonly by: string;
  readonly expires: number;
}

export interface FakeDisplay {
  readonly id: string;
  readonly token: string;
  readonly name: string;
  readonly line: string | null;
  readonly acting: boolean;
  readonly made: number;
  readonly by: string;
  readonly lastSeen: number | null;
}

export interface FakeSource {
  readonly id: string;
  readonly name: string;
  readonly stations: readonly string[];
  readonly products: readonly string[];
  readonly made: number;
  readonly lastUsed: number | null;
  revoked: number | null;
  oldTokenUntil: number | null;
  readonly connected: boolean;
}

export interface FakeAccessOptions {
  /** 'open' where absent. */
  readonly access?: 'open' | 'accounts';
  /** Account or display that whoever comes without a cookie is taken for. */
  readonly as?: string;
  readonly accounts?: readonly FakeAccount[];
  readonly displays?: readonly FakeDisplay[];
  readonly sources?: readonly FakeSource[];
  readonly invitations?: readonly FakeInvitation[];
  readonly changes?: readonly RecordedChange[];
  readonly passkeys?: boolean;
  readonly directory?: string;
  /** How long acting by PIN lasts, ms. */
  readonly actingMs?: number;
}

export interface FakeAnswer {
  readonly status: number;
  readonly body?: unknown;
  readonly headers?: Readonly<Record<string, string>>;
}

/** A refusal of the fake server. */
export class FakeRefusal extends Error {
  readonly answer: FakeAnswer;

  constructor(status: number, message: string, field?: string, headers: Readonly<Record<string, string>> = {}) {
    super(message);
    this.answer = { status, body: { message, field }, headers };
  }
}

export interface FakeCaller extends Granted {
  readonly session: FakeSession | undefined;
  readonly account: FakeAccount | undefined;
  readonly display: FakeDisplay | undefined;
  readonly name: string | undefined;
}

const cookieName = 'vouchline-session';
const everything: readonly Grant[] = [{ role: 'engineer', line: undefined }, { role: 'administrator', line: undefined }];

/** Accounts over HTTP as the server has them, in memory and without any secret being one. */
export class FakeAccess {
  readonly options: FakeAccessOptions;
  readonly accounts = new Map<string, FakeAccount>();
  readonly sessions = new Map<string, FakeSession>();
  readonly invitations = new Map<string, FakeInvitation>();
  readonly displays = new Map<string, FakeDisplay>();
  readonly sources = new Map<string, FakeSource>();
  readonly changes: RecordedChange[] = [];
  /** Failed sign-ins in a row; from the third on one has to wait. */
  failures = 0;
  #count = 0;
  #default: FakeSession | undefined;

  constructor(options: FakeAccessOptions = {}) {
    this.options = options;
    for (const one of options.accounts ?? []) this.accounts.set(one.id, structuredClone(one));
    for (const one of options.displays ?? []) this.displays.set(one.id, one);
    for (const one of options.sources ?? []) this.sources.set(one.name, structuredClone(one));
    for (const one of options.invitations ?? []) this.invitations.set(one.code, one);
    this.changes.push(...(options.changes ?? []));
    if (options.as !== undefined) this.#default = this.sessionFor(this.accounts.has(options.as) ? { account: options.as } : { display: options.as }, '10.0.4.17', 'Firefox on Windows').session;
  }

  get open(): boolean {
    return this.options.access !== 'accounts';
  }

  id(kind: string): string {
    this.#count += 1;
    return `${kind}-${this.#count}`;
  }

  sessionFor(of: { account?: string; display?: string }, address: string, agent: string): { readonly session: FakeSession; readonly cookie: string } {
    const id = this.id('session');
    const session: FakeSession = { id, account: of.account, display: of.display, made: Date.now(), lastSeen: Date.now(), address, agent, pin: undefined };
    this.sessions.set(id, session);
    return { session, cookie: `${cookieName}=${id}; HttpOnly; SameSite=Strict; Path=/` };
  }

  /** Ends a session, or all of them, as the server does when one is revoked. */
  end(id?: string): void {
    if (id === undefined) this.sessions.clear();
    else this.sessions.delete(id);
  }

  callerOf(request: IncomingMessage): FakeCaller | undefined {
    if (this.open) return { session: undefined, account: undefined, display: undefined, name: undefined, grants: everything };
    const cookie = new RegExp(`${cookieName}=([^;]+)`).exec(request.headers.cookie ?? '')?.[1];
    const session = this.sessions.get(cookie ?? this.#default?.id ?? '');
    const display = session?.display === undefined ? undefined : this.displays.get(session.display);
    const account = session?.account === undefined ? undefined : this.accounts.get(session.account);
    if (display !== undefined) return { session, account: undefined, display, name: `display ${display.name}`, grants: [{ role: 'viewer', line: display.line ?? undefined }] };
    if (account === undefined || account.disabled) return undefined;
    return { session, account, display: undefined, name: account.shownAs, grants: account.grants };
  }

  /** Who acts by PIN at this caller's session. */
  pinOf(caller: FakeCaller): FakeAccount | undefined {
    const pin = caller.session?.pin;
    return pin === undefined || pin.until < Date.now() ? undefined : this.accounts.get(pin.account);
  }

  reachOf(granted: Granted, action: Action): { plant: boolean; lines: 'all' | string[] } {
    const lines = lineIds.filter((line) => mayDo(granted, action, line));
    return { plant: mayDo(granted, action, undefined), lines: lines.length === lineIds.length ? 'all' : lines };
  }

  me(caller: FakeCaller | undefined): object {
    const { passkeys = false, directory = null } = this.options;
    const pin = caller === undefined ? undefined : this.pinOf(caller);
    const may = (action: Action): object => this.reachOf(action === 'acknowledge' && pin !== undefined ? pin : (caller ?? { grants: [] }), action);
    return {
      access: this.open ? 'open' : 'accounts', firstAccount: this.accounts.size === 0, passkeys, directory,
      caller: caller === undefined ? null : {
        kind: this.open ? 'open' : caller.display === undefined ? 'account' : 'display',
        name: caller.name ?? null, account: caller.account?.id ?? null, grants: caller.grants.map(({ role, line }) => ({ role, line: line ?? null })), until: null,
        may: Object.fromEntries(actions.map((action) => [action, may(action)])),
        pin: pin === undefined ? null : { name: pin.shownAs, until: caller.session?.pin?.until },
        terminal: caller.account !== undefined || caller.display?.acting === true, hasPassword: caller.account !== undefined && caller.account.password !== '',
      },
    };
  }

  /** Under which name an acknowledgement goes on record; refuses what the server refuses. */
  acknowledges(request: IncomingMessage, line: string | undefined, by: string | undefined): string {
    const caller = this.callerOf(request);
    if (caller === undefined) throw new FakeRefusal(401, 'Sign in first, or send a token that holds.');
    if (this.open) return by ?? '';
    const pin = this.pinOf(caller);
    const name = (pin?.shownAs ?? caller.name) as string;
    if (!mayDo(pin ?? caller, 'acknowledge', line)) throw new FakeRefusal(403, 'Your roles do not allow this (acknowledge).');
    if (by !== undefined && by !== name) throw new FakeRefusal(403, `by: got "${by}"; you act under your own name, "${name}"`);
    if (pin !== undefined && caller.session?.pin !== undefined) caller.session.pin.until = Date.now() + (this.options.actingMs ?? 120_000);
    this.record('acknowledge', name, 'alarm', 'unacknowledged', 'acknowledged', '');
    return name;
  }

  record(kind: ChangeKind, who: string, what: string, before: Json, after: Json, why: string): void {
    const id = (this.changes[0]?.id ?? 0) + 1;
    this.changes.unshift({ id, at: Date.now(), hash: id.toString(16).padStart(64, 'c0de'), kind, who, what, before, after, why, entry: null });
  }
}
