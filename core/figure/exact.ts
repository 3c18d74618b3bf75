/**
 * A figure as it was written, before it becomes a double: numerator / denominator, lowest terms not required.
 * The denominator is above 0.
 */
export interface Exact {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

const decimal = /^([+-]?)(\d*)(?:\.(\d*))?(?:e([+-]?\d{1,3}))?$/i;

/**
 * Reads a decimal number without rounding it, e.g. '98.5', '.02', '1e-6'. A comma is refused: it means
 * thousands to one reader and a decimal point to another.
 *
 * @param text at most 60 characters; exponent at most 400 either way
 * @returns undefined if the text is not such a number
 */
export function exactOfText(text: string): Exact | undefined {
  const parts = text.length > 60 ? null : decimal.exec(text);
  const digits = parts === null ? '' : `${parts[2] ?? ''}${parts[3] ?? ''}`;
  if (parts === null || digits === '') return undefined;
  const exponent = Number(parts[4] ?? 0) - (parts[3]?.length ?? 0);
  if (Math.abs(exponent) > 400) return undefined;
  const numerator = BigInt(digits) * (parts[1] === '-' ? -1n : 1n);
  return exponent >= 0
    ? { numerator: numerator * 10n ** BigInt(exponent), denominator: 1n }
    : { numerator, denominator: 10n ** BigInt(-exponent) };
}

/** 1 - value, without rounding. */
export function complementOf(value: Exact): Exact {
  return { numerator: value.denominator - value.numerator, denominator: value.denominator };
}

/**
 * The double nearest to an exact figure.
 *
 * @param value its denominator is a power of ten, or both parts are at most 2^53 in size: the two cases in which
 *   the platform rounds once and to nearest
 */
export function doubleOf({ numerator, denominator }: Exact): number {
  const text = denominator.toString();
  return /^10*$/.test(text) ? Number(`${numerator}e-${text.length - 1}`) : Number(numerator) / Number(denominator);
}
