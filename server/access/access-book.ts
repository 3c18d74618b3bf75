import type { Change, ChangeKind, RecordedChange } from '../../core/access/change.ts';
import type { Json } from '../../core/access/canonical-json.ts';
import type { AccessFile, AccessItem, ChangeQuery } from './access-file.ts';
import type { Passkey } from './access-items.ts';
import { accountSchema, displaySchema, identitySchema, invitationSchema, passkeySchema, sessionSchema, tokenSchema } from './access-items.ts';
import { Kept, type Staged } from './kept.ts';

/** How long sessions hold. */
export interface SessionSpans {
  /** Without being used, ms. */
  readonly idleMs: number;
  /** At most, ms. */
  readonly mostMs: number;
}

/** A line for the record of changes; `entry` is none of the journal's. */
export function changeOf(kind: ChangeKind, who: string, what: string, before: Json, after: Json, why = ''): Change {
  return { kind, who, what, before, after, why, entry: null };
}

/**
 * Accounts, invitations, sessions, displays and tokens. Held in memory, so that every request is decided without
 * waiting; changed one after the other, each durable before it holds.
 */
export class AccessBook {
  readonly accounts = new Kept('account', accountSchema);
  readonly invitations = new Kept('invitation', invitationSchema);
  readonly sessions = new Kept('session', sessionSchema);
  readonly displays = new Kept('display', displaySchema);
  readonly tokens = new Kept('token', tokenSchema);
  readonly passkeys = new Kept('passkey', passkeySchema);
  readonly identities = new Kept('identity', identitySchema);
  readonly now: () => number;
  readonly #file: AccessFile;
  readonly #onEnded: ((by: string) => void)[] = [];
  #last: Promise<unknown> = Promise.resolve();

  private constructor(file: AccessFile, now: () => number) {
    this.#file = file;
    this.now = now;
  }

  /** @param now wall time, ms @throws DamagedAccessItem */
  static async load(file: AccessFile, now: () => number): Promise<AccessBook> {
    const book = new AccessBook(file, now);
    for (const item of await file.items()) book.#keptOf(item)?.load(item);
    return book;
  }

  /** What stands on record. */
  changes(query: Partial<ChangeQuery> & Pick<ChangeQuery, 'limit'>): Promise<readonly RecordedChange[]> {
    return this.#file.changes({ from: 0, to: Number.MAX_SAFE_INTEGER, ...query });
  }

  /** Runs one change at a time: what it looked at is still so when it writes. */
  exclusively<T>(change: () => Promise<T>): Promise<T> {
    const done = this.#last.then(change);
    this.#last = done.catch(() => undefined);
    return done;
  }

  /** Durable when it resolves, and only then in force. */
  async write(staged: readonly Staged[], changes: readonly Change[] = []): Promise<void> {
    await this.#file.write({
      put: staged.flatMap(({ put }) => (put === undefined ? [] : [put])),
      drop: staged.flatMap(({ drop }) => (drop === undefined ? [] : [drop])),
      changes,
    });
    for (const { apply } of staged) apply();
  }

  /** Sessions of an account, displays or tokens are over: who holds a connection by them is told. */
  ended(by: readonly string[]): void {
    for (const id of by) for (const listener of this.#onEnded) listener(id);
  }

  onEnded(listener: (by: string) => void): void {
    this.#onEnded.push(listener);
  }

  sessionsOf(account: string): [string, ReturnType<AccessBook['sessions']['get']> & object][] {
    return this.sessions.entries().filter(([, session]) => session.account === account);
  }

  /** Whether a session, display or token holds no more, revoked or by time. */
  isOver(by: string, { idleMs, mostMs }: SessionSpans): boolean {
    const now = this.now();
    const session = this.sessions.get(by);
    if (session !== undefined) return Math.min(session.lastSeen + idleMs, session.made + mostMs) <= now;
    const token = this.tokens.get(by);
    return token === undefined ? this.displays.get(by) === undefined : token.expires <= now;
  }

  /** Sessions, tokens and invitations whose time is over go; what they were stays on record. */
  async dropOver(spans: SessionSpans): Promise<void> {
    const now = this.now();
    await this.exclusively(() => this.write([
      ...this.sessions.entries().filter(([id]) => this.isOver(id, spans)).map(([id]) => this.sessions.dropped(id)),
      ...this.tokens.entries().filter(([id]) => this.isOver(id, spans)).map(([id]) => this.tokens.dropped(id)),
      ...this.invitations.entries().filter(([, { expires }]) => expires <= now).map(([id]) => this.invitations.dropped(id)),
    ]));
  }

  passkeysOf(account: string): [string, Passkey][] {
    return this.passkeys.entries().filter(([, passkey]) => passkey.account === account);
  }

  #keptOf({ kind }: AccessItem): { load(item: AccessItem): void } | undefined {
    return [this.accounts, this.invitations, this.sessions, this.displays, this.tokens, this.passkeys, this.identities].find((kept) => kept.kind === kind);
  }
}
