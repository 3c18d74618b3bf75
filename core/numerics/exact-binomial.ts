import { exactDecimal } from './exact-decimal.ts';

/** Up to here a binomial tail is worth writing out in whole numbers. */
const mostUnits = 1000;
/** Two logarithms nearer than this may stand the other way round in exact arithmetic. */
const doubt = 1e-11;

/**
 * Whether a binomial tail is at most `tail`, where both are decimals and the answer in doubles is `lnTail`.
 * Doubles decide unless they are too near; then the sum is done in whole numbers, so that a tie
 * (0.9^2 against 0.81) counts as the tie it is.
 *
 * @param from the first count of the tail
 * @param to the last count of the tail
 * @source own derivation
 */
export function tailAtMost(lnTail: number, tail: number, from: number, to: number, n: number, p: number): boolean {
  const gap = lnTail - Math.log(tail);
  if (Math.abs(gap) > doubt || n > mostUnits) return gap <= 0;
  const share = exactDecimal(p);
  const limit = exactDecimal(tail);
  if (share === undefined || limit === undefined) return gap <= 0;
  const rest = 10n ** BigInt(share.scale) - share.digits;
  const sum = sumOfTerms(share.digits, rest, from, to, n);
  return sum * 10n ** BigInt(limit.scale) <= limit.digits * 10n ** BigInt(share.scale * n);
}

function sumOfTerms(hit: bigint, miss: bigint, from: number, to: number, n: number): bigint {
  let ways = 1n;
  let sum = 0n;
  for (let k = 0; k <= to; k++) {
    if (k >= from) sum += ways * hit ** BigInt(k) * miss ** BigInt(n - k);
    ways = (ways * BigInt(n - k)) / BigInt(k + 1);
  }
  return sum;
}
