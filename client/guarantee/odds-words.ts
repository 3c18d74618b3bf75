import type { Formats } from '../format.ts';

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';
const raised = (power: number): string => [...String(Math.abs(power))].map((digit) => superscripts[Number(digit)] ?? '').join('');

/** Evidence as people say it: '20 to 1', '1 to 3', '10²⁴ to 1'. @param power log10 of the evidence */
export function oddsWords(formats: Formats, power: number | undefined): string {
  if (power === undefined) return 'not known';
  const far = Math.abs(power) >= 6;
  const odds = far ? `${power <= -1000 ? 'more than ' : ''}10${raised(Math.floor(Math.abs(power)))}` : formats.plain(Number((10 ** Math.abs(power)).toPrecision(power === 0 ? 1 : 2)));
  return power < 0 ? `1 to ${odds}` : `${odds} to 1`;
}

/** A power of ten on an axis. */
export const powerLabel = (power: number): string => (power === 0 ? '1' : power === 1 ? '10' : `10${power < 0 ? '⁻' : ''}${raised(power)}`);
