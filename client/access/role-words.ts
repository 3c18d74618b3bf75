import type { Action } from '../../core/access/action.ts';
import { actionRules, type ActionRule } from '../../core/access/action.ts';
import { roles, type Grant, type Role } from '../../core/access/role.ts';

export interface LineName {
  readonly id: string;
  readonly name: string;
}

export const roleWord: Readonly<Record<Role, string>> = {
  viewer: 'Viewer',
  supervisor: 'Supervisor',
  maintenance: 'Maintenance',
  engineer: 'Engineer',
  administrator: 'Administrator',
};

/** 'a', 'a and b', 'a, b and c'. */
export const listed = (words: readonly string[], last = 'and'): string =>
  words.length < 2 ? (words[0] ?? '') : `${words.slice(0, -1).join(', ')} ${last} ${words.at(-1) ?? ''}`;

export const lineNameOf = (lines: readonly LineName[], id: string): string => lines.find((line) => line.id === id)?.name ?? id;

/** 'Engineer and administrator for the whole plant; maintenance for Hose line A'. */
export function grantsInWords(grants: readonly Grant[], lines: readonly LineName[]): string {
  const places = new Map<string, Role[]>();
  for (const { role, line } of grants) {
    const place = line === undefined ? 'the whole plant' : lineNameOf(lines, line);
    places.set(place, [...(places.get(place) ?? []), role]);
  }
  const byRoles = new Map<string, string[]>();
  for (const [place, held] of places) {
    const words = listed(roles.filter((role) => held.includes(role)).map((role) => roleWord[role].toLowerCase()));
    byRoles.set(words, [...(byRoles.get(words) ?? []), place]);
  }
  const text = [...byRoles].map(([held, where]) => `${held} for ${listed(where)}`).join('; ');
  return text === '' ? 'No role' : text.charAt(0).toUpperCase() + text.slice(1);
}

/** What an action is, after 'may'. */
export const actionWord: Readonly<Record<Action, string>> = {
  see: 'see boards, guarantees and alarms',
  acknowledge: 'acknowledge alarms',
  'restart-evidence': 'restart evidence',
  'load-plant': 'load a plant file',
  'read-changes': 'read the record of changes',
  'manage-sources': 'make and withdraw tokens of sources',
  'manage-displays': 'add and withdraw displays',
  'manage-accounts': 'invite people and change their roles',
  'keep-own-account': 'keep their own account',
};

/** Why something cannot be done here: 'Acknowledging needs the role supervisor, maintenance or engineer for Hose line A.' */
export function roleMissing(doing: string, action: Action, place: string): string {
  const rule: ActionRule = actionRules[action];
  return `${doing} needs the role ${listed(rule.roles, 'or')} for ${rule.reach === 'plant' ? 'the whole plant' : place}.`;
}
