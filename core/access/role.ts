/** What a person is to a line or to the plant. */
export const roles = ['viewer', 'supervisor', 'maintenance', 'engineer', 'administrator'] as const;
export type Role = (typeof roles)[number];

/** One role given to a person. */
export interface Grant {
  readonly role: Role;
  /** Id of the line it holds for; undefined: the whole plant. */
  readonly line: string | undefined;
}
