import type { Tail } from '../../core/units.ts';
import type { Given } from './given.ts';

/** How a field is written: a number, a share of units, one of some words, or stations with their counts. */
export type FieldForm = 'number' | 'share' | 'stations' | readonly string[];

/** A field of a request besides `quantity`, `confidence` and `tail`; a request holds no others. */
export interface Field {
  readonly name: string;
  readonly form: FieldForm;
  /** one line for people: what it is, in what range */
  readonly help: string;
}

/** A quantity that can be asked for: its fields and how its figure is computed. */
export interface Quantity {
  readonly name: string;
  /** the field of the answer that carries the figure */
  readonly answer: 'bound' | 'k' | 'n' | 'rank';
  readonly fields: readonly Field[];
  /** names of core's arguments that differ from the fields' */
  readonly named: Readonly<Record<string, string>>;
  /** @throws OutOfDomain naming the argument; NoConvergence */
  readonly compute: (given: Given, tail: Tail) => number;
}

export const side: Field = { name: 'side', form: ['lower', 'upper'], help: 'which side the bound is on' };
export const looks: Field = { name: 'looks', form: ['one', 'all'], help: 'one look fixed in advance, or all looks of a run (then with the line)' };
export const line: Field = { name: 'line', form: 'share', help: 'guarantee line; the bound for all looks is tightest there' };
export const units: Field = { name: 'n', form: 'number', help: 'units inspected, whole, 1 or more' };
export const measurements: Field = { name: 'n', form: 'number', help: 'measurements, whole, 2 to 1e12' };
export const nonconforming: Field = { name: 'nonconforming', form: 'number', help: 'of these nonconforming, whole, 0 to n' };
