/** Which way a figure may be off after rounding: a bound is never made to say more than it does. */
export type Rounding = 'up' | 'down' | 'nearest';

/**
 * A figure in few digits, thousands apart by a space, without trailing zeros: 12 345.6, 0.000237, 1.2e-9.
 *
 * @param value finite
 * @param digits significant ones, 1 to 15; whole numbers below 1e15 that have no fraction are written out in full
 */
export function writtenNumber(value: number, digits: number, rounding: Rounding = 'nearest'): string {
  if (Number.isInteger(value) && Math.abs(value) < 1e15) return grouped(String(value));
  const text = digitsOf(value, digits, rounding);
  const size = Math.abs(Number(text));
  if (size >= 1e15 || (size > 0 && size < 1e-6)) return shortest(Number(text).toExponential(digits - 1));
  const decimals = Math.max(0, digits - 1 - Math.floor(Math.log10(size === 0 ? 1 : size)));
  return grouped(shortest(Number(text).toFixed(Math.min(decimals, 20))));
}

/** The same to a number of decimals rather than digits. @param decimals 0 to 20 */
export function writtenTo(value: number, decimals: number, rounding: Rounding = 'nearest'): string {
  const text = value.toFixed(decimals);
  const short = rounding === 'up' ? Number(text) < value : rounding === 'down' && Number(text) > value;
  return grouped(shortest(short ? (Number(text) + (rounding === 'up' ? 1 : -1) * 10 ** -decimals).toFixed(decimals) : text));
}

function digitsOf(value: number, digits: number, rounding: Rounding): string {
  const text = value.toExponential(digits - 1);
  const step = 10 ** (Number(text.slice(text.indexOf('e') + 1)) - digits + 1);
  if (rounding === 'up' && Number(text) < value) return (Number(text) + step).toExponential(digits - 1);
  if (rounding === 'down' && Number(text) > value) return (Number(text) - step).toExponential(digits - 1);
  return text;
}

function shortest(text: string): string {
  return text.replace(/(\.\d*?)0+(?=e|$)/, '$1').replace(/\.(?=e|$)/, '');
}

function grouped(text: string): string {
  const [whole = '', part] = text.split('.');
  if (/e/.test(text) || whole.replace('-', '').length < 5) return text;
  const apart = whole.replace(/\B(?=(\d{3})+$)/g, ' ');
  return part === undefined ? apart : `${apart}.${part}`;
}
