import type { SpanMs } from '../units.ts';
import { exactOfText } from './exact.ts';

/** What a duration may look like; stands in messages and in the published schema. */
export const durationForms = 'a duration in whole milliseconds, e.g. 500 ms, 90 s, 3 min, 1 h 30 min, 2 d or PT5M';

const unitMs: ReadonlyMap<string, bigint> = new Map([
  ['ms', 1n],
  ['s', 1_000n],
  ['min', 60_000n],
  ['h', 3_600_000n],
  ['d', 86_400_000n],
]);

const isoUnits = ['d', 'h', 'min', 's'] as const;
const written = /^\d+(?:\.\d+)? *(?:ms|s|min|h|d)(?: +\d+(?:\.\d+)? *(?:ms|s|min|h|d))*$/;
const iso = /^P(?=[\dT])(?:(\d+)D)?(?:T(?=\d)(?:(\d+)H)?(?:(\d+)M)?(?:(\d+(?:\.\d+)?)S)?)?$/;

/** Ten years: longer spans are a slip of the pen. */
const longestMs = 3_653n * 86_400_000n;

/**
 * Reads a duration: a number with its unit ('8 h', '1 h 30 min') or ISO 8601 ('PT8H', 'P1D'). A day is 24 hours,
 * whatever the clocks do; months and years are refused because their length varies.
 *
 * @returns whole milliseconds, above 0, at most ten years; undefined if it is none
 * @source ISO 8601-1:2019, 5.5.2.2 (form of a duration; from memory)
 */
export function spanMsOf(text: string): SpanMs | undefined {
  const pieces = text.length > 60 ? undefined : (piecesOfIso(text.trim()) ?? piecesOfWritten(text.trim()));
  if (pieces === undefined) return undefined;
  let sumMs = 0n;
  for (const [figure, unit] of pieces) {
    const value = exactOfText(figure);
    const ms = unitMs.get(unit);
    if (value === undefined || ms === undefined || (value.numerator * ms) % value.denominator !== 0n) return undefined;
    sumMs += (value.numerator * ms) / value.denominator;
  }
  return sumMs > 0n && sumMs <= longestMs ? (Number(sumMs) as SpanMs) : undefined;
}

type Piece = readonly [figure: string, unit: string];

function piecesOfWritten(text: string): readonly Piece[] | undefined {
  if (!written.test(text)) return undefined;
  return [...text.matchAll(/([\d.]+) *([a-z]+)/g)].map((match) => [match[1] ?? '', match[2] ?? '']);
}

function piecesOfIso(text: string): readonly Piece[] | undefined {
  const parts = iso.exec(text);
  return parts === null ? undefined : isoUnits.map((unit, at) => [parts[at + 1] ?? '0', unit]);
}
