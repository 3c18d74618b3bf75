import { exactDecimal } from './exact-decimal.ts';
import type { Draw } from './hypergeometric-tail.ts';

/** Two logarithms nearer than this may stand the other way round in exact arithmetic. */
const doubt = 1e-10;
/** Beyond this many factors whole numbers would take seconds; no tie is known to exist there. */
const mostFactors = 20_000;

/**
 * Whether P(X <= x) of a sample without replacement is at most `tail`, read as the decimal it is
 * written as. Doubles decide unless they are too near; then whole numbers do, so that a tie is a tie.
 *
 * @param lnLower the answer in doubles
 * @source own derivation
 */
export function lotTailAtMost(lnLower: number, x: number, draw: Draw, tail: number): boolean {
  const gap = lnLower - Math.log(tail);
  const few = Math.min(draw.marked, draw.drawn);
  if (Math.abs(gap) > doubt || few > mostFactors) return gap <= 0;
  const limit = exactDecimal(tail);
  if (limit === undefined) return gap <= 0;
  const marked = BigInt(Math.max(draw.marked, draw.drawn));
  return ways(x, few, marked, BigInt(draw.size)) * 10n ** BigInt(limit.scale) <= limit.digits * choose(BigInt(draw.size), few);
}

/** Ways to draw `few` of `size` with at most x of the marked; drawn and marked may change places. */
function ways(x: number, few: number, marked: bigint, size: bigint): bigint {
  const other = size - marked;
  const least = BigInt(few) > other ? few - Number(other) : 0;
  let term = choose(marked, least) * choose(other, few - least);
  let sum = 0n;
  for (let k = least; k <= x && k <= few; k++) {
    sum += term;
    const up = (marked - BigInt(k)) * BigInt(few - k);
    term = (term * up) / (BigInt(k + 1) * (other - BigInt(few - k) + 1n));
  }
  return sum;
}

function choose(from: bigint, count: number): bigint {
  let result = 1n;
  for (let k = 0n; k < BigInt(count); k++) result = (result * (from - k)) / (k + 1n);
  return result;
}
