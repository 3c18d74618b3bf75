import type { Role } from './role.ts';

/** Who may do something, and whether it concerns one line or always the whole plant. */
export interface ActionRule {
  /** 'line': a role given for that line is enough; 'plant': only a role given for the whole plant. */
  readonly reach: 'line' | 'plant';
  readonly roles: readonly Role[];
}

/** What can be done, and which roles may; what stands nowhere here may nobody do. */
export const actionRules = {
  /** Boards, guarantees, histories, events and alarms. */
  see: { reach: 'line', roles: ['viewer', 'supervisor', 'maintenance', 'engineer', 'administrator'] },
  acknowledge: { reach: 'line', roles: ['supervisor', 'maintenance', 'engineer'] },
  'restart-evidence': { reach: 'line', roles: ['maintenance', 'engineer'] },
  'load-plant': { reach: 'plant', roles: ['engineer'] },
  'read-changes': { reach: 'plant', roles: ['supervisor', 'engineer', 'administrator'] },
  'manage-sources': { reach: 'plant', roles: ['engineer', 'administrator'] },
  'manage-displays': { reach: 'plant', roles: ['administrator'] },
  'manage-accounts': { reach: 'plant', roles: ['administrator'] },
  /** One's own password, PIN, passkeys, sessions and tokens. */
  'keep-own-account': { reach: 'line', roles: ['viewer', 'supervisor', 'maintenance', 'engineer', 'administrator'] },
} as const satisfies Readonly<Record<string, ActionRule>>;

export type Action = keyof typeof actionRules;

/** In the order of the table. */
export const actions = Object.keys(actionRules) as readonly Action[];
