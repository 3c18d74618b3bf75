import type { Formats } from '../format.ts';
import { counted } from '../words.ts';

/** A source as those see it who manage them. Times are wall time, ms since 1970. */
export interface Source {
  readonly id: string;
  readonly name: string;
  readonly stations: readonly string[];
  /** Empty: every product. */
  readonly products: readonly string[];
  readonly made: number;
  readonly lastUsed: number | undefined;
  readonly revoked: number | undefined;
  readonly connected: boolean;
  readonly tokens: readonly { readonly made: number; readonly expires: number | undefined }[];
}

/** Names with commas or blanks between them. */
export const namesIn = (text: string): readonly string[] => [...new Set(text.split(/[\s,;]+/).filter((name) => name !== ''))];

export function lastUseWords({ lastUsed, revoked }: Source, formats: Formats): string {
  const used = lastUsed === undefined ? 'Never used.' : `Last used ${formats.moment(lastUsed)}.`;
  return revoked === undefined ? used : `${used} Withdrawn ${formats.moment(revoked)}.`;
}

/** Which tokens hold, and until when those that run out. */
export function tokenWords(tokens: Source['tokens'], formats: Formats): string {
  const ending = tokens.flatMap(({ expires }) => (expires === undefined ? [] : [expires]));
  const made = Math.max(...tokens.map((token) => token.made));
  const since = tokens.length === 0 ? '' : `Token since ${formats.date(made)}.`;
  return ending.length === 0 ? since : `${since} ${counted(formats, ending.length, 'old token')} until ${formats.moment(Math.max(...ending))}.`;
}
