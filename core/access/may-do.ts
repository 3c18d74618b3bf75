import { actionRules, type Action, type ActionRule } from './action.ts';
import type { Grant } from './role.ts';

/** As far as a decision needs to know a person, a display or a token: without a grant it may do nothing. */
export interface Granted {
  readonly grants: readonly Grant[];
  /** What a token is for; absent: everything its grants allow. */
  readonly onlyActions?: readonly Action[];
}

/**
 * Whether someone may do something. A role given for the whole plant holds for every line; a role given for a line
 * never reaches what concerns the plant, nor another line.
 *
 * @param line id of the line it concerns; undefined: the whole plant
 */
export function mayDo(granted: Granted, action: Action, line: string | undefined): boolean {
  const rule: ActionRule = actionRules[action];
  return isFor(granted, action) && granted.grants.some((grant) => rule.roles.includes(grant.role) && (grant.line === undefined || (rule.reach === 'line' && grant.line === line)));
}

/** Whether there is a place, a line or the plant, where someone may do something. */
export function mayDoSomewhere(granted: Granted, action: Action): boolean {
  const rule: ActionRule = actionRules[action];
  return isFor(granted, action) && granted.grants.some((grant) => rule.roles.includes(grant.role) && (grant.line === undefined || rule.reach === 'line'));
}

const isFor = ({ onlyActions }: Granted, action: Action): boolean => onlyActions === undefined || onlyActions.includes(action);
