import * as v from 'valibot';
import { amountForms, amountOf, finiteOf } from '../figure/amount.ts';
import { durationForms, spanMsOf } from '../figure/duration.ts';
import { complementOf, doubleOf } from '../figure/exact.ts';
import { shareForms, shareOf } from '../figure/share.ts';
import { plain, written } from './schema-parts.ts';
import type { Fraction, Tail } from '../units.ts';

const textOrNumber = (forms: string): v.UnionSchema<[v.StringSchema<string>, v.NumberSchema<string>], string> =>
  v.union([v.string(forms), v.number(forms)], forms);
const wholeFrom = (least: number, most: number) => (forms: string) =>
  v.pipe(v.number(forms), v.integer(forms), v.minValue(least, forms), v.maxValue(most, forms));
const textOf = (most: number) => (forms: string) =>
  v.pipe(v.string(forms), v.minLength(1, forms), v.maxLength(most, forms));

/** An id as records carry it: see core/record/part.ts. */
export const idSchema = plain(
  (forms) => v.pipe(v.string(forms), v.regex(/^[A-Za-z0-9._-]{1,64}$/, forms)),
  'an id of 1 to 64 letters, digits, dots, underscores and hyphens',
);
export const nameSchema = plain(textOf(120), 'a name of 1 to 120 characters');
export const unitSchema = plain(
  (forms) => v.pipe(v.string(forms), v.regex(/^\S{1,16}$/, forms)),
  'a unit of measure of 1 to 16 characters without spaces, e.g. ml',
);
export const responseSchema = plain(
  (forms) => v.pipe(v.string(forms), v.maxLength(1000, forms)),
  'what a person is to do, at most 1000 characters',
);
export const sourceSchema = plain(textOf(300), 'where the figure is known from, 1 to 300 characters');
export const flagSchema = plain((forms) => v.boolean(forms), 'true or false');

/** A share with its complement, each rounded once from what was written: 98.5 % leaves exactly 0.015. */
export interface Share {
  readonly share: Fraction;
  readonly complement: Fraction;
}

export const shareSchema = written(textOrNumber, shareForms, (text): Share | undefined => {
  const exact = shareOf(text);
  return exact && { share: doubleOf(exact) as Fraction, complement: doubleOf(complementOf(exact)) as Fraction };
});

/** A confidence level, held as its tail: the exact decimal complement. */
export const confidenceSchema = written(
  textOrNumber,
  'a confidence level of at least 50 % and below 100 %, e.g. 95 % or 0.95',
  (text): Tail | undefined => {
    const exact = shareOf(text);
    const tail = exact === undefined ? Number.NaN : doubleOf(complementOf(exact));
    return tail > 0 && tail <= 0.5 ? (tail as Tail) : undefined;
  },
);

export const amountSchema = written((forms) => v.string(forms), amountForms, amountOf);
export const spanSchema = written((forms) => v.string(forms), durationForms, spanMsOf);

/** A measured value; its unit may follow and is compared with the characteristic's. */
export interface Measure {
  readonly value: number;
  readonly unit: string | undefined;
}

export const measureSchema = written(
  textOrNumber,
  'a finite number, with its unit of measure if you like, e.g. 1000 or 1000 ml',
  (text): Measure | undefined => {
    const parts = /^(\S+)(?: +([^\s\d]\S{0,15}))?$/.exec(String(text).trim());
    const value = finiteOf(parts?.[1] ?? '');
    return value === undefined ? undefined : { value, unit: parts?.[2] };
  },
);

/** The largest number of units in a window: see core/plant/guarantee.ts. */
export const mostWindowUnits = 1e9;
export const windowUnitsSchema = plain(wholeFrom(1, mostWindowUnits), 'whole units, 1 to 1000000000');
export const returnUnitsSchema = plain(wholeFrom(0, mostWindowUnits), 'whole units, 0 to 1000000000');
export const betweenFalseCallsSchema = plain(wholeFrom(2, 1e15), 'whole units between two false calls, 2 to 1e15');
/** A number above 0 and at most 1e15. */
const above0 = (forms: string) => v.pipe(v.number(forms), v.gtValue(0, forms), v.maxValue(1e15, forms));
export const falseCallsSchema = plain(above0, 'false calls a shift that the whole plant accepts, a number above 0, e.g. 0.5');
export const perShiftSchema = plain(above0, 'units (exposure, values) inspected in a shift, a number above 0');
export const weightSchema = plain(above0, "a weight above 0: 2 gives twice the usual part of the plant's false calls");
export const countSchema = plain(wholeFrom(0, 1e9), 'a whole number, 0 to 1000000000');
export const positiveCountSchema = plain(wholeFrom(1, 1e9), 'a whole number, 1 to 1000000000');
export const sizeSchema = plain(
  (forms) => v.pipe(v.number(forms), v.minValue(1, forms), v.maxValue(1e6, forms)),
  'a number, 1 to 1000000',
);
export const returnDistanceSchema = plain(
  (forms) => v.pipe(v.number(forms), v.minValue(0, forms), v.maxValue(0.9, forms)),
  'a part of the way from target to guarantee line, 0 to 0.9',
);
