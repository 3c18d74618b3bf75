/** A decimal number above 0 and below 1, exactly: digits / 10^scale. */
export interface ExactDecimal {
  readonly digits: bigint;
  readonly scale: number;
}

/**
 * @param value a decimal text, or a number, which stands for its shortest decimal text
 * @returns undefined when it is no decimal number above 0 and below 1
 */
export function exactDecimal(value: number | string): ExactDecimal | undefined {
  const parts = /^\+?(\d*)\.?(\d*)(?:e([+-]?\d{1,4}))?$/i.exec(String(value).trim());
  const [, whole = '', part = '', power = '0'] = parts ?? [];
  const digits = BigInt(`${whole}${part}` || '0');
  const shift = part.length - Number(power);
  const scale = Math.max(shift, 0);
  const exact = shift >= 0 ? digits : digits * 10n ** BigInt(-shift);
  return exact > 0n && exact < 10n ** BigInt(scale) ? { digits: exact, scale } : undefined;
}

/** 1 - value in decimal digits, as the nearest double; undefined when the value is no decimal above 0 and below 1. */
export function decimalComplement(value: number | string): number | undefined {
  const decimal = exactDecimal(value);
  if (decimal === undefined) return undefined;
  return Number(`${String(10n ** BigInt(decimal.scale) - decimal.digits)}e-${decimal.scale}`);
}
