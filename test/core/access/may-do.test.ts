import { describe, expect, it } from 'vitest';
import { actions, type Action } from '../../../core/access/action.ts';
import { decisionTable } from '../../../core/access/decision-table.ts';
import { mayDo } from '../../../core/access/may-do.ts';
import { roles, type Role } from '../../../core/access/role.ts';

/** Written by hand from what each role is for: V viewer, S supervisor, M maintenance, E engineer, A administrator (own rule, no source). */
const expected: Readonly<Record<Action, { readonly letters: string; readonly perLine: boolean }>> = {
  see: { letters: 'VSMEA', perLine: true },
  acknowledge: { letters: 'SME', perLine: true },
  'restart-evidence': { letters: 'ME', perLine: true },
  'load-plant': { letters: 'E', perLine: false },
  'read-changes': { letters: 'SEA', perLine: false },
  'manage-sources': { letters: 'EA', perLine: false },
  'manage-displays': { letters: 'A', perLine: false },
  'manage-accounts': { letters: 'A', perLine: false },
  'keep-own-account': { letters: 'VSMEA', perLine: true },
};
const letter: Readonly<Record<Role, string>> = { viewer: 'V', supervisor: 'S', maintenance: 'M', engineer: 'E', administrator: 'A' };

describe('the table of roles and actions', () => {
  it('has a cell for every role, action and place, once', () => {
    const cells = decisionTable().map(({ role, action, given, asked }) => `${role} ${action} ${given} ${asked}`);
    expect(new Set(cells).size).toBe(cells.length);
    expect(cells.length).toBe(roles.length * Object.keys(expected).length * 6);
    expect([...actions].sort()).toEqual(Object.keys(expected).sort());
  });

  it.each(decisionTable())('$role given for $given, $action asked for $asked: $allowed', ({ role, action, given, asked, allowed }) => {
    const { letters, perLine } = expected[action];
    const holds = given === 'plant' || (given === 'same-line' && perLine && asked === 'line');
    expect(allowed).toBe(letters.includes(letter[role]) && holds);
  });
});

describe('who may do something', () => {
  it('is nobody without a role', () => {
    for (const action of actions) for (const line of ['A', undefined]) expect(mayDo({ grants: [] }, action, line)).toBe(false);
  });

  it('has what any one of the roles gives, and no role adds to another by meeting it', () => {
    const person = { grants: [{ role: 'viewer', line: undefined }, { role: 'maintenance', line: 'A' }] } as const;
    expect(mayDo(person, 'restart-evidence', 'A')).toBe(true);
    expect(mayDo(person, 'restart-evidence', 'B')).toBe(false);
    expect(mayDo(person, 'restart-evidence', undefined)).toBe(false);
    expect(mayDo(person, 'see', 'B')).toBe(true);
  });

  it('compares lines by their whole name', () => {
    const person = { grants: [{ role: 'engineer', line: 'A' }] } as const;
    for (const line of ['a', 'A ', 'AB', '', '__proto__', 'constructor']) expect(mayDo(person, 'acknowledge', line)).toBe(false);
  });
});
