export interface BackoffRule {
  /** Wait before the second attempt at most, ms. */
  readonly leastMs: number;
  /** No wait is longer, ms. */
  readonly mostMs: number;
}

export const sourceBackoff: BackoffRule = { leastMs: 250, mostMs: 15_000 };

/**
 * How long to wait before trying again: doubled with every failed attempt up to a limit, less up to half of it by
 * chance, so that the sources of a plant do not all come back at the same moment.
 *
 * @param failed attempts that failed in a row, 1 or more
 * @param chance 0 (included) to 1 (not included)
 * @returns ms, above half of the doubled wait, at most all of it
 */
export function backoffMs(failed: number, { leastMs, mostMs }: BackoffRule, chance: number): number {
  const whole = Math.min(mostMs, leastMs * 2 ** Math.min(failed - 1, 52));
  return whole * (1 - chance / 2);
}
