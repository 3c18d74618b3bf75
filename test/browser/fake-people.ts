import type { Json } from '../../core/access/canonical-json.ts';
import type { ChangeKind, RecordedChange } from '../../core/access/change.ts';
import type { Grant, Role } from '../../core/access/role.ts';
import { day, hour, type FakeAccessOptions, type FakeAccount, type FakeDisplay, type FakeInvitation, type FakeSource } from './fake-access.ts';

const now = Date.now();
const grant = (role: Role, line?: string): Grant => ({ role, line });

function person(id: string, shownAs: string, grants: readonly Grant[], part: Partial<FakeAccount> = {}): FakeAccount {
  return { id, name: id, shownAs, password: `${id}-password-1`, grants, made: now - 90 * day, lastSeen: now - 5 * hour, disabled: false, pin: undefined, passkeys: [], tokens: [], ...part };
}

/** Five people of the plant: an administrator, an engineer, a supervisor and two of maintenance; one is disabled. */
export const people: readonly FakeAccount[] = [
  person('ada', 'Ada Lindqvist', [grant('administrator'), grant('engineer')], { lastSeen: now - 60_000 }),
  person('ines', 'Ines Maurer', [grant('supervisor', 'a'), grant('maintenance', 'a'), grant('viewer')], { pin: '4711' }),
  person('tom', 'Tom Reiter', [grant('maintenance')], { pin: '2580' }),
  person('mette', 'Mette Sørensen', [grant('viewer')], { lastSeen: null }),
  person('olaf', 'Olaf Brandt', [grant('supervisor', 'b'), grant('supervisor', 'f')], { disabled: true, lastSeen: now - 60 * day }),
];

export const displays: readonly FakeDisplay[] = [
  { id: 'hall', token: 'token-hall', name: 'Hall 2, by the gate', line: null, acting: false, made: now - 40 * day, by: 'Ada Lindqvist', lastSeen: now - 20_000 },
  { id: 'bench', token: 'token-bench', name: 'Bench of hose line A', line: 'a', acting: true, made: now - 12 * day, by: 'Ada Lindqvist', lastSeen: now - 3 * hour },
];

/** Accounts as they are in the plant, with whoever comes taken for one of them. */
export const signedInAs = (as: string, part: FakeAccessOptions = {}): FakeAccessOptions => ({ access: 'accounts', accounts: people, displays, as, ...part });

const source = (name: string, stations: readonly string[], part: Partial<FakeSource> = {}): FakeSource =>
  ({ id: name, name, stations, products: [], made: now - 80 * day, lastUsed: now - 2_000, revoked: null, connected: true, oldTokenUntil: null, ...part });

export const sources: readonly FakeSource[] = [
  source('leak-a-1', ['a.leak-test'], { products: ['bh-4', 'bh-5'], oldTokenUntil: now + 20 * hour }),
  source('crimp-b', ['b.crimp', 'b.final'], { connected: false, lastUsed: now - 3 * hour }),
  source('cap-torque-1', ['f.capping'], { connected: false, lastUsed: null }),
  source('old-tester', ['*'], { connected: false, lastUsed: now - 50 * day, revoked: now - 30 * day }),
];

const invitation = (id: string, part: Partial<FakeInvitation>): FakeInvitation =>
  ({ id, code: `code-${id}`, kind: 'account', grants: [grant('viewer')], account: null, shownAs: null, made: now - 3 * hour, by: 'Ada Lindqvist', expires: now + 6 * day, ...part });

export const invitations: readonly FakeInvitation[] = [
  invitation('one', { shownAs: 'Selma Aydin', grants: [grant('maintenance', 'a'), grant('maintenance', 'b')] }),
  invitation('two', {}),
];

const told = (...grants: Grant[]): Json => grants.map(({ role, line }) => ({ role, line: line ?? null }));
const happened: readonly (readonly [ChangeKind, string, string, Json, Json, string])[] = [
  ['acknowledge', 'Ines Maurer', 'alarm 40', 'unacknowledged', 'acknowledged', 'Die changed, watching'],
  ['sign-in', 'Ines Maurer', 'account ines', null, { by: 'password', address: '10.0.4.17' }, ''],
  ['refused', 'Mette Sørensen', 'POST /api/guarantees/:id/restart', null, { action: 'restart-evidence', by: 'account' }, ''],
  ['restart', 'Tom Reiter', 'guarantee leak-bh4', null, 'evidence gathered anew', 'Seal of the test head replaced'],
  ['account', 'Ada Lindqvist', 'account ines', { shownAs: 'Ines Maurer', grants: told(grant('supervisor', 'a'), grant('viewer')), disabled: false }, { shownAs: 'Ines Maurer', grants: told(grant('supervisor', 'a'), grant('maintenance', 'a'), grant('viewer')), disabled: false }, 'Takes over for Olaf'],
  ['account', 'Ada Lindqvist', 'account olaf', { disabled: false }, { disabled: true }, 'Left the plant'],
  ['sign-in-failed', 'unknown', 'account admin', null, { address: '10.0.9.2' }, ''],
  ['plant', 'Ada Lindqvist', 'plant file', { version: 'b1946ac92492', guarantees: { fill: { guaranteeLine: 249.5 } } }, { version: '591785b794601e21', guarantees: { fill: { guaranteeLine: 250 } } }, 'New limit of the fill volume after the customer’s audit'],
  ['token-renewed', 'Ada Lindqvist', 'source leak-a-1', null, { expires: now + 20 * hour }, 'Yearly'],
  ['display', 'Ada Lindqvist', 'display hall: Hall 2, by the gate', null, { line: null, acting: false }, ''],
];

/** The record of changes, `count` of them, the newest first. */
export const changesOf = (count: number): readonly RecordedChange[] => Array.from({ length: count }, (_, index) => {
  const [kind, who, what, before, after, why] = happened[index % happened.length]!;
  const id = count - index;
  return { id, at: now - index * 37 * 60_000, hash: id.toString(16).padStart(64, 'c0de'), kind, who, what, before, after, why, entry: null };
});

/** Everything a page can show, with whoever comes taken for the administrator. */
export const fullPlant = (part: FakeAccessOptions = {}): FakeAccessOptions => signedInAs('ada', {
  sources, invitations, changes: changesOf(230), passkeys: true,
  accounts: people.map((one) => (one.id !== 'ada' ? one : {
    ...one, passkeys: [{ id: 'key', name: 'Key on my ring', made: now - 30 * day, lastUsed: now - day }],
    tokens: [{ id: 't', name: 'Shift report', actions: ['see', 'read-changes'] as const, grants: one.grants, made: now - 20 * day, expires: now + 70 * day, lastUsed: now - hour }],
  })), ...part,
});
