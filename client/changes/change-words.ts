import type { ChangeKind } from '../../core/access/change.ts';
import { lineNameOf, type LineName } from '../access/role-words.ts';

/** What happened, for the list and its filter. */
export const changeWord: Readonly<Record<ChangeKind, string>> = {
  acknowledge: 'Alarm acknowledged',
  restart: 'Evidence restarted',
  plant: 'Plant file loaded',
  'source-made': 'Source made',
  'token-renewed': 'Source’s token renewed',
  'token-withdrawn': 'Source withdrawn',
  refused: 'Refused',
  'sign-in': 'Signed in',
  'sign-in-failed': 'Sign-in failed',
  'sign-out': 'Signed out',
  account: 'Account changed',
  invitation: 'Invitation',
  session: 'Session',
  token: 'API token',
  display: 'Display',
  passkey: 'Passkey',
  pin: 'PIN',
};

/** A part of a record, and what it was and became; absent where it was not there. */
export interface Difference {
  /** Empty where the record speaks of one thing only. */
  readonly name: string;
  readonly before: string | undefined;
  readonly after: string | undefined;
}

/** JSON of a record as it comes from the server, where absence is undefined. */
export type Told = undefined | null | boolean | number | string | readonly Told[] | { readonly [name: string]: Told };

type Parts = { readonly [name: string]: Told };

const isList = (value: Told): value is readonly Told[] => Array.isArray(value);
const isParts = (value: Told): value is Parts => typeof value === 'object' && value !== null && !isList(value);

/** What differs between before and after, part by part; what stayed is left out. */
export function differencesOf(before: Told, after: Told, lines: readonly LineName[]): readonly Difference[] {
  const [was, is] = [before ?? {}, after ?? {}];
  if (isParts(was) && isParts(is)) return partsOf(was, is, '', lines);
  return before === after ? [] : [{ name: '', before: wordsOf(before, lines), after: wordsOf(after, lines) }];
}

/** Parts of parts are told under both names: 'guarantees, leak-A, guarantee line'. */
function partsOf(was: Parts, is: Parts, within: string, lines: readonly LineName[]): readonly Difference[] {
  return [...new Set([...Object.keys(was), ...Object.keys(is)])].flatMap((key) => {
    const [from, to] = [was[key], is[key]];
    const name = within === '' ? nameWords(key) : `${within}, ${nameWords(key)}`;
    if (isParts(from) && isParts(to)) return partsOf(from, to, name, lines);
    const part = { name, before: partWords(key, from, lines), after: partWords(key, to, lines) };
    return part.before === part.after ? [] : [part];
  });
}

/** 'shownAs' is 'shown as'; an id stays as it is. */
const nameWords = (name: string): string => (/^[a-z]+([A-Z][a-z]+)+$/.test(name) ? name.replace(/([A-Z])/g, ' $1').toLowerCase() : name);

const times: ReadonlySet<string> = new Set(['expires', 'made', 'until', 'lastUsed', 'lastSeen']);

const partWords = (name: string, value: Told, lines: readonly LineName[]): string | undefined =>
  typeof value === 'number' && times.has(name) ? new Date(value).toISOString().slice(0, 16).replace('T', ' ') + ' UTC' : wordsOf(value, lines);

/** A value in words; undefined where there is none. */
function wordsOf(value: Told, lines: readonly LineName[]): string | undefined {
  if (value === undefined || value === null) return undefined;
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (isList(value)) return value.length === 0 ? 'none' : value.map((one) => wordsOf(one, lines) ?? 'none').join(', ');
  if (!isParts(value)) return String(value);
  const { role, line } = value;
  if (typeof role === 'string') return `${role} for ${typeof line === 'string' ? lineNameOf(lines, line) : 'the whole plant'}`;
  return Object.entries(value).map(([name, part]) => `${nameWords(name)} ${wordsOf(part, lines) ?? 'none'}`).join(', ');
}
