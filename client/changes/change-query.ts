import { zoneOffset } from '../guarantee/axis-ticks.ts';

/** What of the record is looked at. */
export interface ChangeQuery {
  /** Wall time as written in a form, 'YYYY-MM-DDTHH:mm' of the plant's time zone; empty: without an end. */
  readonly from: string;
  readonly to: string;
  /** Empty: every kind. */
  readonly kind: string;
  /** Stands in who, what or why. */
  readonly holds: string;
}

export const wholeRecord: ChangeQuery = { from: '', to: '', kind: '', holds: '' };

/** A written moment of the plant's time zone as ms since 1970; undefined where nothing is written. */
export function momentOf(written: string, timeZone: string): number | undefined {
  const local = Date.parse(`${written}Z`);
  if (Number.isNaN(local)) return undefined;
  const guess = local - zoneOffset(timeZone, local);
  return local - zoneOffset(timeZone, guess); // again, for moments near a change of the clocks
}

/** The query's part of an address, with its question mark. */
export function addressPart({ from, to, kind, holds }: ChangeQuery, timeZone: string, more: Readonly<Record<string, string | number>> = {}): string {
  const parts = Object.entries({ from: momentOf(from, timeZone), to: momentOf(to, timeZone), kind, holds, ...more }).filter(([, value]) => value !== undefined && value !== '');
  return parts.length === 0 ? '' : `?${parts.map(([name, value]) => `${name}=${encodeURIComponent(String(value))}`).join('&')}`;
}
