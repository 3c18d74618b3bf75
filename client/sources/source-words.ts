import type { Formats } from '../format.ts';

/** A source as those see it who manage them. Times are wall time, ms since 1970. */
export interface Source {
  readonly id: string;
  readonly name: string;
  readonly stations: readonly string[];
  /** Empty or undefined: every product. */
  readonly products: readonly string[] | undefined;
  readonly made: number;
  readonly lastUsed: number | undefined;
  readonly revoked: number | undefined;
  /** Until when the token before the newest still holds. */
  readonly oldTokenUntil: number | undefined;
  readonly connected: boolean;
}

/** Names with commas or blanks between them. */
export const namesIn = (text: string): readonly string[] => [...new Set(text.split(/[\s,;]+/).filter((name) => name !== ''))];

/** When it was used last, and which tokens hold. @param wall  wall time now, ms since 1970 */
export function useWords({ lastUsed, revoked, oldTokenUntil, made }: Source, formats: Formats, wall: number): string {
  const parts = [
    `${lastUsed === undefined ? 'Never used' : `Last used ${formats.moment(lastUsed)}`}, made ${formats.date(made)}.`,
    revoked === undefined ? undefined : `Withdrawn ${formats.moment(revoked)}.`,
    revoked === undefined && oldTokenUntil !== undefined && oldTokenUntil > wall ? `The old token holds until ${formats.moment(oldTokenUntil)}.` : undefined,
  ];
  return parts.filter((part) => part !== undefined).join(' ');
}
