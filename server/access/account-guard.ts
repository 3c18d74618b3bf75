import type { Action } from '../../core/access/action.ts';
import type { Grant } from '../../core/access/role.ts';
import { bearerToken } from '../ingest/bearer-token.ts';
import { changeOf, type AccessBook, type SessionSpans } from './access-book.ts';
import { grantsOf } from './access-items.ts';
import type { ActingPeople } from './acting.ts';
import type { Caller } from './caller.ts';
import type { Guard, Shown } from './guard.ts';
import type { Kept } from './kept.ts';
import { hashOfSecret } from './secret.ts';
import { sessionSecret } from './session-cookie.ts';
import { Sparing } from './sparing.ts';

const minute = 60_000;
/** Refusals on record a minute at most, of all callers; the same one once. */
const mostRefused = 1_200;
/** Places a display sees but nothing else. */
const viewer = (line: string | null): readonly Grant[] => [{ role: 'viewer', line: line ?? undefined }];

/** Tells from cookie or token who asks, and records who was refused. */
export class AccountGuard implements Guard {
  readonly #book: AccessBook;
  readonly #acting: ActingPeople;
  readonly #spans: SessionSpans;
  readonly #onFault: (cause: unknown) => void;
  readonly #refused: Sparing;
  readonly #touching = new Set<string>();

  constructor(book: AccessBook, acting: ActingPeople, spans: SessionSpans, onFault: (cause: unknown) => void) {
    this.#book = book;
    this.#acting = acting;
    this.#spans = spans;
    this.#refused = new Sparing(mostRefused, book.now);
    this.#onFault = onFault;
  }

  callerOf({ headers }: Shown): Caller | undefined {
    const token = bearerToken(headers);
    if (token !== undefined) return this.#byToken(hashOfSecret(token));
    const secret = sessionSecret(headers);
    return secret === undefined ? undefined : (this.#bySession(hashOfSecret(secret)) ?? this.#byDisplay(hashOfSecret(secret)));
  }

  noteActed(by: string): void {
    this.#acting.acted(by);
  }

  async noteRefused(caller: Caller, action: Action, what: string): Promise<void> {
    if (!this.#refused.lets(JSON.stringify([caller.by, action, what]))) return;
    await this.#book.write([], [changeOf('refused', caller.name ?? 'unknown', what, null, { action, by: caller.kind })]).catch(this.#onFault);
  }

  #bySession(hash: string): Caller | undefined {
    const found = this.#book.sessions.find((session) => session.hash === hash);
    if (found === undefined) return undefined;
    const [id, session] = found;
    const now = this.#book.now();
    const person = this.#book.accounts.get(session.account);
    const until = Math.min(session.lastSeen + this.#spans.idleMs, session.made + this.#spans.mostMs);
    if (person === undefined || person.disabled || until <= now) return undefined;
    if (now - session.lastSeen >= minute) this.#touch(this.#book.sessions, id, (kept) => ({ ...kept, lastSeen: now }));
    return { kind: 'account', name: person.shownAs, account: session.account, by: id, cookie: true, grants: grantsOf(person.grants), until, acting: this.#acting.at(id) };
  }

  #byDisplay(hash: string): Caller | undefined {
    const found = this.#book.displays.find((display) => display.hash === hash);
    if (found === undefined) return undefined;
    const [id, display] = found;
    const now = this.#book.now();
    if (now - (display.lastSeen ?? 0) >= minute) this.#touch(this.#book.displays, id, (kept) => ({ ...kept, lastSeen: now }));
    return { kind: 'display', name: `display ${display.name}`, account: undefined, by: id, cookie: true, grants: viewer(display.line), onlyActions: ['see'], acting: display.acting ? this.#acting.at(id) : undefined };
  }

  /** A token does what it is for, within what its owner may do now. */
  #byToken(hash: string): Caller | undefined {
    const found = this.#book.tokens.find((token) => token.hash === hash);
    if (found === undefined) return undefined;
    const [id, token] = found;
    const now = this.#book.now();
    const owner = this.#book.accounts.get(token.account);
    if (owner === undefined || owner.disabled || token.expires <= now) return undefined;
    if (now - (token.lastUsed ?? 0) >= minute) this.#touch(this.#book.tokens, id, (kept) => ({ ...kept, lastUsed: now }));
    const own = grantsOf(owner.grants);
    const grants = token.grants === null ? own : grantsOf(token.grants).filter((grant) => holds(own, grant));
    return { kind: 'token', name: owner.shownAs, account: token.account, by: id, cookie: false, grants, onlyActions: token.actions, until: token.expires };
  }

  /** Notes a use; of something that is dropped meanwhile nothing comes back. */
  #touch<T>(kept: Kept<T>, id: string, touched: (item: T) => T): void {
    if (this.#touching.has(id)) return;
    this.#touching.add(id);
    const write = this.#book.exclusively(async () => {
      const item = kept.get(id);
      if (item !== undefined) await this.#book.write([kept.written(id, touched(item))]);
    });
    this.#keep(write.finally(() => this.#touching.delete(id)));
  }

  #keep(written: Promise<void>): void {
    written.catch(this.#onFault);
  }
}

/** Whether somebody has a role at a place, by a grant for it or for the whole plant. */
const holds = (own: readonly Grant[], { role, line }: Grant): boolean => own.some((grant) => grant.role === role && (grant.line === undefined || grant.line === line));
