import { actions, type Action } from './action.ts';
import { mayDo } from './may-do.ts';
import { roles, type Role } from './role.ts';

/** One cell: whether the role, given for the plant or for one line, may do the action where it concerns that place. */
export interface Decision {
  readonly role: Role;
  readonly action: Action;
  /** The role holds for the whole plant, for the line asked about, or for another line. */
  readonly given: 'plant' | 'same-line' | 'other-line';
  readonly asked: 'plant' | 'line';
  readonly allowed: boolean;
}

const askedLine = 'A';
const givenLine = { plant: undefined, 'same-line': askedLine, 'other-line': 'B' } as const;
const given = ['plant', 'same-line', 'other-line'] as const;

/** Every cell of the table, decided by `mayDo`; by role, then action, then where the role holds. */
export function decisionTable(): readonly Decision[] {
  return roles.flatMap((role) =>
    actions.flatMap((action) =>
      given.flatMap((where) =>
        (['plant', 'line'] as const).map((asked): Decision => ({
          role,
          action,
          given: where,
          asked,
          allowed: mayDo({ grants: [{ role, line: givenLine[where] }] }, action, asked === 'plant' ? undefined : askedLine),
        })))));
}
