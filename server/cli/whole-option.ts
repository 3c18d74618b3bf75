import { CommandFault } from './exit-codes.ts';

/** Reads the value of an option that is a whole number. @throws CommandFault naming option, value and range */
export function wholeOption(flag: string, text: string, least: number, most: number): number {
  const value = /^\d{1,16}$/.test(text) ? Number(text) : NaN;
  if (Number.isSafeInteger(value) && value >= least && value <= most) return value;
  throw new CommandFault(`${flag}: ${JSON.stringify(text)}; expected a whole number from ${least} to ${most}`);
}
