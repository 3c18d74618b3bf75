import { exactOfText, type Exact } from './exact.ts';

/** What a share may look like; stands in messages and in the published schema. */
export const shareForms = 'a share, e.g. 200 ppm, 0.02 %, 1 in 5000 or a number from 0 to 1';

const scales: ReadonlyMap<string, bigint> = new Map([
  ['', 1n],
  ['%', 100n],
  ['‰', 1_000n],
  ['ppm', 1_000_000n],
  ['ppb', 1_000_000_000n],
]);

/**
 * Reads a share of units as the plant writes it: '200 ppm', '0.02 %', '1 in 5000', 0.0002.
 *
 * @returns the share without rounding, in [0, 1]; undefined if it is none
 */
export function shareOf(written: string | number): Exact | undefined {
  const text = String(written).trim();
  const value = oneIn(text) ?? scaled(text);
  return value === undefined || value.numerator < 0n || value.numerator > value.denominator ? undefined : value;
}

function oneIn(text: string): Exact | undefined {
  const parts = /^(\d{1,15}) +in +(\d{1,15})$/i.exec(text);
  if (parts === null) return undefined;
  const denominator = BigInt(parts[2] ?? 0);
  return denominator === 0n ? undefined : { numerator: BigInt(parts[1] ?? 0), denominator };
}

function scaled(text: string): Exact | undefined {
  const parts = /^(\S*?) *(%|‰|ppm|ppb)?$/.exec(text);
  const number = exactOfText(parts?.[1] ?? '');
  const scale = scales.get(parts?.[2] ?? '');
  if (number === undefined || scale === undefined) return undefined;
  return { numerator: number.numerator, denominator: number.denominator * scale };
}
