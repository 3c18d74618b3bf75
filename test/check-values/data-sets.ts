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
  const set = stored[name];
  if (set === undefined) throw new Error(`no data set named '${name}'`);
  return valuesOf(set);
}

/** This file runs from the sources and from the build; the reference values stand beside the sources only. */
function root(): string {
  return new URL(import.meta.url).pathname.replace(/(\.build\/)?test\/check-values\/[^/]*$/, '');
}

function valuesByRule(rule: string): readonly number[] {
  const digits = /^the first (\d+) digits of pi$/.exec(rule);
  if (digits) return piDigits(Number(digits[1]));
  const repeated = /^(\S+) then (\d+) times \(([^)]*)\)$/.exec(rule);
  if (!repeated) throw new Error(`a data set with the rule '${rule}', expected one that is known`);
  const [, first = '', times = '', cycle = ''] = repeated;
  const again = cycle.split(',').map(Number);
  return [Number(first), ...Array.from({ length: Number(times) }, () => again).flat()];
}
