import { amountForms, amountOf, finiteOf, type Amount } from '../../core/figure/amount.ts';
import { complementOf, doubleOf } from '../../core/figure/exact.ts';
import { shareForms, shareOf } from '../../core/figure/share.ts';
import type { Tail } from '../../core/units.ts';
import { CommandFault } from './exit-codes.ts';

/*
 * Figures as they are told to a command: by option name and text. Each reader refuses with the option, the text and
 * what was expected; ranges beyond the form are for core to refuse.
 */

/** An option that cannot be used. */
export const badOption = (flag: string, text: string, expected: string): CommandFault =>
  new CommandFault(`--${flag}: ${JSON.stringify(text)}; expected ${expected}`);

export function toldNumber(flag: string, text: string): number {
  const value = finiteOf(text.trim());
  if (value === undefined) throw badOption(flag, text, 'a number, with a point for decimals');
  return value;
}

/** @returns whole, from `least` to `most` */
export function toldWhole(flag: string, text: string, least = 0, most = Number.MAX_SAFE_INTEGER): number {
  const value = finiteOf(text.trim());
  if (value === undefined || !Number.isSafeInteger(value) || value < least || value > most) {
    throw badOption(flag, text, `a whole number, ${most === Number.MAX_SAFE_INTEGER ? `${least} or more` : `from ${least} to ${most}`}`);
  }
  return value;
}

/** @returns 0 to 1, rounded once from what was written */
export function toldShare(flag: string, text: string): number {
  const exact = shareOf(text);
  if (exact === undefined) throw badOption(flag, text, shareForms);
  return doubleOf(exact);
}

/** A share above 0 and below 1. */
export function toldPart(flag: string, text: string): Tail {
  const share = toldShare(flag, text);
  if (share > 0 && share < 1) return share as Tail;
  throw badOption(flag, text, 'a share above 0 and below 100 %');
}

/** An amount over an exposure, value above 0. */
export function toldAmount(flag: string, text: string): Amount {
  const amount = amountOf(text);
  if (amount === undefined) throw badOption(flag, text, amountForms);
  return amount;
}

/** A rate per unit of an exposure that was told elsewhere. */
export function toldRateIn(flag: string, unit: string, text: string): number {
  const amount = toldAmount(flag, text);
  if (amount.unit !== unit) throw badOption(flag, text, `a rate per ${unit}, as the line is`);
  return amount.value / amount.per;
}

/** An exposure with its unit or without: '4600 m' or '4600'. @returns above 0 */
export function toldExposure(flag: string, unit: string, text: string): number {
  const [figure = '', ...rest] = text.trim().split(/ +/);
  const value = finiteOf(figure);
  if (value === undefined || !(value > 0) || (rest.length > 0 && rest.join(' ') !== unit)) throw badOption(flag, text, `an exposure above 0 in ${unit}, e.g. 4600 ${unit}`);
  return value;
}

/** The tail of a confidence level: its exact complement. */
export function toldTail(flag: string, text: string): Tail {
  const exact = shareOf(text);
  const tail = exact === undefined ? Number.NaN : doubleOf(complementOf(exact));
  if (tail > 0 && tail < 1) return tail as Tail;
  throw badOption(flag, text, 'a confidence level above 0 and below 100 %, e.g. 95 % or 0.95');
}

/** Two ends: '0..5'. */
export function toldRange(flag: string, text: string): { readonly from: number; readonly to: number } {
  const [from, to, ...more] = text.split('..').map((end) => finiteOf(end.trim()));
  if (from === undefined || to === undefined || more.length > 0 || !(from < to)) throw badOption(flag, text, 'two numbers, the lower one first, e.g. 0..5');
  return { from, to };
}

/** @throws CommandFault where the option was not given */
export function required(flag: string, text: string | undefined, what: string): string {
  if (text === undefined) throw new CommandFault(`--${flag} is missing; expected ${what}`);
  return text;
}
