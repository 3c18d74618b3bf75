import type { Grant } from '../../core/access/role.ts';
import { grantsInWords, type LineName } from '../access/role-words.ts';

/** What a change of roles gives and takes, in words; empty where it changes nothing. */
export function grantsChange(before: readonly Grant[], after: readonly Grant[], lines: readonly LineName[]): string {
  const beyond = (some: readonly Grant[], others: readonly Grant[]): readonly Grant[] => some.filter(({ role, line }) => !others.some((other) => other.role === role && other.line === line));
  const part = (verb: string, grants: readonly Grant[]): readonly string[] => (grants.length === 0 ? [] : [`${verb} ${lowered(grantsInWords(grants, lines))}.`]);
  return [...part('Gives', beyond(after, before)), ...part('Takes', beyond(before, after))].join(' ');
}

const lowered = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
