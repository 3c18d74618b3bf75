import type { IncomingMessage } from 'node:http';
import type { Action } from '../../core/access/action.ts';
import { mayDoSomewhere } from '../../core/access/may-do.ts';
import { passwordFault } from '../../core/access/password-length.ts';
import { pinFault } from '../../core/access/pin-fault.ts';
import type { Grant } from '../../core/access/role.ts';
import { day, FakeRefusal, type FakeAccess, type FakeAccount, type FakeAnswer, type FakeCaller, type FakeInvitation } from './fake-access.ts';

interface Asked {
  readonly access: FakeAccess;
  readonly caller: FakeCaller;
  readonly known: boolean;
  readonly request: IncomingMessage;
  readonly url: URL;
  readonly body: Readonly<Record<string, unknown>>;
  /** What stands where the path has a part of its own. */
  readonly id: string;
}

interface FakeRoute {
  readonly method: 'GET' | 'POST' | 'PUT' | 'DELETE';
  readonly path: RegExp;
  /** undefined: nobody. */
  readonly needs: Action | undefined;
  readonly does: (asked: Asked) => FakeAnswer;
}

const ok = (body: unknown): FakeAnswer => ({ status: 200, body });
const done: FakeAnswer = { status: 204 };
const text = (body: Asked['body'], name: string): string => (typeof body[name] === 'string' ? body[name] : '');
const grantsIn = (body: Asked['body']): readonly Grant[] => (body['grants'] as { role: Grant['role']; line?: string | null }[]).map(({ role, line }) => ({ role, line: line ?? undefined }));
const told = (grants: readonly Grant[]): object[] => grants.map(({ role, line }) => ({ role, line: line ?? null }));
const json = (value: unknown): never => JSON.parse(JSON.stringify(value)) as never;

function enter(access: FakeAccess, request: IncomingMessage, account: FakeAccount): FakeAnswer {
  const { cookie } = access.sessionFor({ account: account.id }, '10.0.4.20', String(request.headers['user-agent']));
  account.lastSeen = Date.now();
  access.record('sign-in', account.shownAs, `account ${account.name}`, null, null, '');
  return { status: 200, body: { name: account.shownAs }, headers: { 'set-cookie': cookie } };
}

function checkPassword(field: string, password: string): void {
  const fault = passwordFault(password);
  if (fault !== undefined) throw new FakeRefusal(400, `${field}: ${fault}`, field);
}

function invite(access: FakeAccess, part: Omit<FakeInvitation, 'id' | 'code' | 'made'>): FakeInvitation {
  const id = access.id('invitation');
  const made: FakeInvitation = { ...part, id, code: `code-${id}`, made: Date.now() };
  access.invitations.set(made.code, made);
  return made;
}

function accountView(access: FakeAccess, one: FakeAccount): object {
  const { id, name, shownAs, made, lastSeen, disabled } = one;
  return { id, name, shownAs, grants: told(one.grants), made, lastSeen, disabled, hasPassword: one.password !== '', hasPin: one.pin !== undefined, passkeys: one.passkeys.length, sessions: [...access.sessions.values()].filter(({ account }) => account === id).length };
}

function accountOf({ access, id }: Asked): FakeAccount {
  const found = access.accounts.get(id);
  if (found === undefined) throw new FakeRefusal(404, 'there is no such account');
  return found;
}

const isAdministrator = (one: FakeAccount): boolean => !one.disabled && one.grants.some(({ role, line }) => role === 'administrator' && line === undefined);

function changeAccount(asked: Asked): FakeAnswer {
  const { access, body, caller } = asked;
  const one = accountOf(asked);
  const next = { ...one, grants: body['grants'] === undefined ? one.grants : grantsIn(body), disabled: typeof body['disabled'] === 'boolean' ? body['disabled'] : one.disabled, shownAs: text(body, 'shownAs') || one.shownAs };
  const others = [...access.accounts.values()].filter((other) => other.id !== one.id);
  if (![...others, next].some(isAdministrator)) throw new FakeRefusal(409, 'this is the last administrator of the plant; make another one first');
  if (text(body, 'why') === '') throw new FakeRefusal(400, 'why: say why', 'why');
  access.record('account', caller.name ?? '', `account ${one.name}`, json({ grants: told(one.grants), disabled: one.disabled }), json({ grants: told(next.grants), disabled: next.disabled }), text(body, 'why'));
  Object.assign(one, next);
  return ok(accountView(access, one));
}

function signIn({ access, body, request }: Asked): FakeAnswer {
  if (access.failures >= 3) throw new FakeRefusal(429, 'too many tries; wait a little', undefined, { 'retry-after': '30' });
  const one = [...access.accounts.values()].find(({ name, disabled }) => name === text(body, 'name') && !disabled);
  if (one === undefined || one.password !== text(body, 'password')) {
    access.failures += 1;
    throw new FakeRefusal(401, 'name or password is wrong');
  }
  access.failures = 0;
  return one.passkeys.length > 0 && access.options.passkeys === true ? ok({ second: 'passkey', ticket: `ticket-${one.id}` }) : enter(access, request, one);
}

function lookAt({ access, body }: Asked): FakeInvitation {
  const found = access.invitations.get(text(body, 'code'));
  if (found === undefined) throw new FakeRefusal(404, 'this link is unknown, used or has expired');
  return found;
}

function accept(asked: Asked): FakeAnswer {
  const { access, body, request } = asked;
  const invitation = lookAt(asked);
  checkPassword('password', text(body, 'password'));
  const known = [...access.accounts.values()].find(({ name }) => name === (invitation.account ?? text(body, 'name')));
  if (invitation.kind !== 'new-password' && known !== undefined) throw new FakeRefusal(409, 'name: somebody has this name already', 'name');
  access.invitations.delete(invitation.code);
  if (invitation.kind === 'new-password' && known !== undefined) {
    known.password = text(body, 'password');
    return enter(access, request, known);
  }
  const id = access.id('account');
  access.accounts.set(id, { id, name: text(body, 'name'), shownAs: text(body, 'shownAs'), password: text(body, 'password'), grants: invitation.grants, made: Date.now(), lastSeen: null, disabled: false, pin: undefined, passkeys: [], tokens: [] });
  access.record('account', text(body, 'shownAs'), `account ${text(body, 'name')}`, null, json({ grants: told(invitation.grants) }), '');
  return enter(access, request, access.accounts.get(id)!);
}

const own = ({ caller }: Asked): FakeAccount => {
  if (caller.account === undefined) throw new FakeRefusal(409, 'nobody is signed in with an account here');
  return caller.account;
};

function checkOwn(asked: Asked, field: string): void {
  if (own(asked).password !== text(asked.body, field)) throw new FakeRefusal(403, `${field}: this is not your password`, field);
}

function actAs({ access, caller, body }: Asked): FakeAnswer {
  const one = access.accounts.get(text(body, 'account'));
  if (one?.pin === undefined || one.pin !== text(body, 'pin') || caller.session === undefined) throw new FakeRefusal(401, 'the PIN is wrong', 'pin');
  const until = Date.now() + (access.options.actingMs ?? 120_000);
  caller.session.pin = { account: one.id, until };
  access.record('pin', one.shownAs, `screen ${caller.name ?? ''}`, null, null, '');
  return ok({ name: one.shownAs, until });
}

function changesAsked({ access, url }: Asked): FakeAnswer {
  const ask = (name: string): string | null => url.searchParams.get(name);
  const holds = (ask('holds') ?? '').toLowerCase();
  const found = access.changes.filter((change) =>
    change.at >= Number(ask('from') ?? 0) && change.at < Number(ask('to') ?? Infinity) && (ask('kind') === null || change.kind === ask('kind')) && change.id < Number(ask('before') ?? Infinity) &&
    [change.who, change.what, change.why].some((part) => part.toLowerCase().includes(holds)));
  return ok(found.slice(0, Number(ask('limit') ?? 100)));
}

const accessRoutes: readonly FakeRoute[] = [
  { method: 'GET', path: /^\/api\/me$/, needs: undefined, does: ({ access, caller, known }) => ok(access.me(known ? caller : undefined)) },
  { method: 'POST', path: /^\/api\/sign-in$/, needs: undefined, does: signIn },
  { method: 'POST', path: /^\/api\/sign-out$/, needs: undefined, does: ({ access, caller }) => { access.end(caller.session?.id ?? 'nobody'); return { ...done, headers: { 'set-cookie': 'vouchline-session=none; Path=/' } }; } },
  { method: 'POST', path: /^\/api\/invitations\/look$/, needs: undefined, does: (asked) => { const { kind, grants, account, shownAs, expires } = lookAt(asked); return ok({ kind, grants: told(grants), account, shownAs, expires }); } },
  { method: 'POST', path: /^\/api\/invitations\/accept$/, needs: undefined, does: accept },
  { method: 'GET', path: /^\/api\/accounts$/, needs: 'manage-accounts', does: ({ access }) => ok([...access.accounts.values()].map((one) => accountView(access, one))) },
  { method: 'PUT', path: /^\/api\/accounts\/([^/]+)$/, needs: 'manage-accounts', does: changeAccount },
  { method: 'POST', path: /^\/api\/accounts\/([^/]+)\/new-password-link$/, needs: 'manage-accounts', does: (asked) => {
    const { access, caller } = asked;
    const one = accountOf(asked);
    const { code, expires } = invite(access, { kind: 'new-password', grants: [], account: one.name, shownAs: one.shownAs, by: caller.name ?? '', expires: Date.now() + day });
    return ok({ link: `/join#${code}`, expires });
  } },
  { method: 'POST', path: /^\/api\/accounts\/([^/]+)\/sign-out-everywhere$/, needs: 'manage-accounts', does: (asked) => {
    const one = accountOf(asked);
    for (const session of [...asked.access.sessions.values()]) if (session.account === one.id) asked.access.end(session.id);
    return done;
  } },
  { method: 'GET', path: /^\/api\/invitations$/, needs: 'manage-accounts', does: ({ access }) => ok([...access.invitations.values()].map(({ id, kind, grants, shownAs, made, by, expires }) => ({ id, kind, grants: told(grants), shownAs, made, by, expires }))) },
  { method: 'POST', path: /^\/api\/invitations$/, needs: 'manage-accounts', does: (asked) => {
    const { access, body, caller } = asked;
    const grants = grantsIn(body);
    if (grants.length === 0) throw new FakeRefusal(400, 'grants: give at least one role', 'grants');
    const { id, code, expires } = invite(access, { kind: 'account', grants, account: null, shownAs: text(body, 'shownAs') || null, by: caller.name ?? '', expires: Date.now() + Number(body['days'] ?? 7) * day });
    return ok({ id, link: `/join#${code}`, expires });
  } },
  { method: 'DELETE', path: /^\/api\/invitations\/([^/]+)$/, needs: 'manage-accounts', does: ({ access, id }) => { for (const one of [...access.invitations.values()]) if (one.id === id) access.invitations.delete(one.code); return done; } },
  { method: 'GET', path: /^\/api\/own\/sessions$/, needs: 'keep-own-account', does: (asked) => ok([...asked.access.sessions.values()].filter(({ account }) => account === own(asked).id).map(({ id, made, lastSeen, address, agent }) => ({ id, made, lastSeen, address, agent, current: id === asked.caller.session?.id }))) },
  { method: 'GET', path: /^\/api\/own\/changes$/, needs: 'keep-own-account', does: (asked) => ok(asked.access.changes.filter(({ kind, who, what }) => what === `account ${own(asked).name}` || (who === own(asked).shownAs && (kind === 'token' || kind === 'passkey'))).slice(0, 20)) },
  { method: 'DELETE', path: /^\/api\/own\/sessions\/([^/]+)$/, needs: 'keep-own-account', does: ({ access, id }) => { access.end(id); return done; } },
  { method: 'POST', path: /^\/api\/own\/sign-out-everywhere$/, needs: 'keep-own-account', does: (asked) => { for (const { id, account } of [...asked.access.sessions.values()]) if (account === own(asked).id) asked.access.end(id); return done; } },
  { method: 'POST', path: /^\/api\/own\/password$/, needs: 'keep-own-account', does: (asked) => { checkOwn(asked, 'old'); checkPassword('new', text(asked.body, 'new')); own(asked).password = text(asked.body, 'new'); return done; } },
  { method: 'PUT', path: /^\/api\/own\/pin$/, needs: 'keep-own-account', does: (asked) => {
    checkOwn(asked, 'password');
    const fault = pinFault(text(asked.body, 'pin'));
    if (fault !== undefined) throw new FakeRefusal(400, `pin: ${fault}`, 'pin');
    own(asked).pin = text(asked.body, 'pin');
    return done;
  } },
  { method: 'DELETE', path: /^\/api\/own\/pin$/, needs: 'keep-own-account', does: (asked) => { checkOwn(asked, 'password'); own(asked).pin = undefined; return done; } },
  { method: 'GET', path: /^\/api\/own\/tokens$/, needs: 'keep-own-account', does: (asked) => ok(own(asked).tokens.map((one) => ({ ...one, grants: told(one.grants) }))) },
  { method: 'POST', path: /^\/api\/own\/tokens$/, needs: 'keep-own-account', does: (asked) => {
    const { access, body } = asked;
    const id = access.id('token');
    if (text(body, 'name') === '') throw new FakeRefusal(400, 'name: give it a name', 'name');
    own(asked).tokens.push({ id, name: text(body, 'name'), actions: body['actions'] as Action[], grants: own(asked).grants, made: Date.now(), expires: Date.now() + Number(body['days']) * day, lastUsed: null });
    return ok({ id, token: `vouchline_own_${id}_shown-once` });
  } },
  { method: 'DELETE', path: /^\/api\/own\/tokens\/([^/]+)$/, needs: 'keep-own-account', does: (asked) => { own(asked).tokens = own(asked).tokens.filter(({ id }) => id !== asked.id); return done; } },
  { method: 'GET', path: /^\/api\/own\/passkeys$/, needs: 'keep-own-account', does: (asked) => ok(own(asked).passkeys) },
  { method: 'POST', path: /^\/api\/own\/passkeys\/begin$/, needs: 'keep-own-account', does: (asked) => { checkOwn(asked, 'password'); return ok({
    challenge: 'bm90LXJhbmRvbS1hdC1hbGw', rp: { id: 'localhost', name: 'Vouchline' }, user: { id: 'aW5lcw', name: own(asked).name, displayName: own(asked).shownAs },
    pubKeyCredParams: [{ type: 'public-key', alg: -7 }], authenticatorSelection: { residentKey: 'required', userVerification: 'required' }, excludeCredentials: [],
  }); } },
  { method: 'POST', path: /^\/api\/own\/passkeys\/finish$/, needs: 'keep-own-account', does: (asked) => {
    const { id } = asked.body['answer'] as { id: string };
    own(asked).passkeys.push({ id, name: text(asked.body, 'name'), made: Date.now(), lastUsed: null });
    return ok({ id });
  } },
  { method: 'DELETE', path: /^\/api\/own\/passkeys\/([^/]+)$/, needs: 'keep-own-account', does: (asked) => { checkOwn(asked, 'password'); own(asked).passkeys = own(asked).passkeys.filter(({ id }) => id !== asked.id); return done; } },
  { method: 'POST', path: /^\/api\/sign-in\/passkey\/begin$/, needs: undefined, does: () => ok({ challenge: 'bm90LXJhbmRvbS1hdC1hbGw', rpId: 'localhost', userVerification: 'required' }) },
  { method: 'POST', path: /^\/api\/sign-in\/passkey\/finish$/, needs: undefined, does: ({ access, body, request }) => {
    const { id } = body['answer'] as { id: string };
    const one = [...access.accounts.values()].find(({ passkeys }) => passkeys.some((passkey) => passkey.id === id));
    if (one === undefined) throw new FakeRefusal(401, 'this passkey is not known');
    return enter(access, request, one);
  } },
  { method: 'GET', path: /^\/api\/displays$/, needs: 'manage-displays', does: ({ access }) => ok([...access.displays.values()].map(({ token: _token, ...view }) => view)) },
  { method: 'POST', path: /^\/api\/displays$/, needs: 'manage-displays', does: (asked) => {
    const { access, body, caller } = asked;
    const id = access.id('display');
    if (text(body, 'name') === '') throw new FakeRefusal(400, 'name: give it a name', 'name');
    access.displays.set(id, { id, token: `token-${id}`, name: text(body, 'name'), line: text(body, 'line') || null, acting: body['acting'] === true, made: Date.now(), by: caller.name ?? '', lastSeen: null });
    return ok({ id, link: `/display#token-${id}` });
  } },
  { method: 'DELETE', path: /^\/api\/displays\/([^/]+)$/, needs: 'manage-displays', does: ({ access, id }) => { access.displays.delete(id); return done; } },
  { method: 'POST', path: /^\/api\/display\/sign-in$/, needs: undefined, does: ({ access, body }) => {
    const found = [...access.displays.values()].find(({ token }) => token === text(body, 'token'));
    if (found === undefined) throw new FakeRefusal(401, 'this display is not known');
    return { status: 200, body: { name: found.name }, headers: { 'set-cookie': access.sessionFor({ display: found.id }, '10.0.4.30', '').cookie } };
  } },
  { method: 'GET', path: /^\/api\/terminal\/people$/, needs: 'see', does: ({ access }) => ok([...access.accounts.values()].filter(({ pin, disabled }) => pin !== undefined && !disabled).map(({ id, shownAs }) => ({ account: id, shownAs }))) },
  { method: 'POST', path: /^\/api\/terminal\/act-as$/, needs: 'see', does: actAs },
  { method: 'DELETE', path: /^\/api\/terminal\/act-as$/, needs: 'see', does: ({ caller }) => { if (caller.session !== undefined) caller.session.pin = undefined; return done; } },
  { method: 'GET', path: /^\/api\/changes$/, needs: 'read-changes', does: changesAsked },
  { method: 'GET', path: /^\/api\/changes\/head$/, needs: 'read-changes', does: ({ access }) => ok({ id: access.changes[0]?.id ?? 0, hash: access.changes[0]?.hash ?? '0'.repeat(64) }) },
  { method: 'GET', path: /^\/api\/changes\/export$/, needs: 'read-changes', does: ({ access, url }) => ({ status: 200, body: access.changes.map((change) => JSON.stringify(change)).join('\n'), headers: { 'content-type': 'application/x-ndjson', 'content-disposition': `attachment; filename="changes.${url.searchParams.get('form') ?? ''}"` } }) },
  { method: 'GET', path: /^\/api\/sources$/, needs: 'manage-sources', does: ({ access }) => ok([...access.sources.values()]) },
  { method: 'POST', path: /^\/api\/sources$/, needs: 'manage-sources', does: ({ access, body }) => {
    const name = text(body, 'name');
    if (access.sources.has(name)) throw new FakeRefusal(409, 'name: a source has this name already', 'name');
    access.sources.set(name, { id: access.id('source'), name, stations: body['stations'] as string[], products: (body['products'] as string[] | undefined) ?? [], made: Date.now(), lastUsed: null, revoked: null, connected: false, oldTokenUntil: null });
    return ok({ token: `vouchline_${name}_shown-once` });
  } },
  { method: 'POST', path: /^\/api\/sources\/([^/]+)\/renew$/, needs: 'manage-sources', does: ({ access, id, body }) => {
    const source = access.sources.get(id)!;
    source.oldTokenUntil = Date.now() + Number(body['overlapHours'] ?? 0) * (day / 24);
    return ok({ token: `vouchline_${id}_renewed` });
  } },
  { method: 'POST', path: /^\/api\/sources\/([^/]+)\/withdraw$/, needs: 'manage-sources', does: ({ access, id }) => { access.sources.get(id)!.revoked = Date.now(); return done; } },
];

const nobody: FakeCaller = { session: undefined, account: undefined, display: undefined, name: undefined, grants: [] };

/** Answers what is asked about access; undefined: it is about something else. */
export function answerOfAccess(access: FakeAccess, request: IncomingMessage, url: URL, body: Asked['body']): FakeAnswer | undefined {
  for (const { method, path, needs, does } of accessRoutes) {
    const match = path.exec(url.pathname);
    if (method !== request.method || match === null) continue;
    const caller = access.callerOf(request);
    if (needs !== undefined && caller === undefined) return { status: 401, body: { message: 'Sign in first, or send a token that holds.' } };
    if (needs !== undefined && caller !== undefined && !mayDoSomewhere(caller, needs)) return { status: 403, body: { message: `Your roles do not allow this (${needs}).` } };
    try {
      return does({ access, caller: caller ?? nobody, known: caller !== undefined, request, url, body, id: decodeURIComponent(match[1] ?? '') });
    } catch (cause) {
      if (cause instanceof FakeRefusal) return cause.answer;
      throw cause;
    }
  }
  return undefined;
}
