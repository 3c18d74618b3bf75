import { doubleOf, exactOfText } from './exact.ts';

/** What an amount over an exposure may look like; stands in messages and in the published schema. */
export const amountForms = 'an amount over an exposure, e.g. 2 per 100 m, 0.5 per m2 or 3 per 1000 h';

/** So many of something over so much of something else: `value` per `per` of `unit`. */
export interface Amount {
  /** Finite, 0 or more. */
  readonly value: number;
  /** Finite, above 0. */
  readonly per: number;
  /** 1 to 16 characters without spaces, e.g. m, m2, h, units. */
  readonly unit: string;
}

/** Reads '2 per 100 m' or '2 per m'; undefined if it is none. */
export function amountOf(text: string): Amount | undefined {
  const parts = /^(\S+) +per(?: +(\d\S*))? +([^\s\d]\S{0,15})$/.exec(text.trim());
  const value = finiteOf(parts?.[1] ?? '');
  const per = finiteOf(parts?.[2] ?? '1');
  const unit = parts?.[3];
  if (value === undefined || per === undefined || unit === undefined || value < 0 || per <= 0) return undefined;
  return { value, per, unit };
}

/** Reads a plain decimal number into the nearest double; undefined if it is none or beyond the largest double. */
export function finiteOf(text: string): number | undefined {
  const exact = exactOfText(text);
  const value = exact === undefined ? Number.NaN : doubleOf(exact);
  return Number.isFinite(value) ? value : undefined;
}
