import { finiteOf } from '../../core/figure/amount.ts';
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

/** The tail of a confidence level: its exact complement. */
export function toldTail(flag: string, text: string): Tail {
  const exact = shareOf(text);
  const tail = exact === undefined ? Number.NaN : doubleOf(complementOf(exact));
  if (tail > 0 && tail < 1) return tail as Tail;
  throw badOption(flag, text, 'a confidence level above 0 and below 100 %, e.g. 95 % or 0.95');
}

/** @throws CommandFault where the option was not given */
export function required(flag: string, text: string | undefined, what: string): string {
  if (text === undefined) throw new CommandFault(`--${flag} is missing; expected ${what}`);
  return text;
}
