import type { Grant, Role } from '../../core/access/role.ts';
import { day, hour, type FakeAccessOptions, type FakeAccount, type FakeDisplay } from './fake-access.ts';

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
