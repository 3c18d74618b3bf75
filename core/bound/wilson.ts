import { normalQuantileOfTail } from '../numerics/normal.ts';
import type { Fraction, Tail } from '../units.ts';
import { requireSample } from './nonconforming-fraction.ts';

/**
 * Wilson score upper bound on a nonconforming fraction, without continuity correction.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 1 or more
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in [0, 1]
 * @throws OutOfDomain naming the argument
 * @coverage 1 - tail on average only; at 95 % and 1 to 300 units down to 0.88 for fractions up to 1/2 (enumerated); one look fixed in advance
 * @source E. B. Wilson, Journal of the American Statistical Association 22 (1927) 209-212 (memory)
 */
export function wilsonUpper(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return scoreRoot(nonconforming, inspected, normalQuantileOfTail(tail)) as Fraction;
}

/**
 * Wilson score lower bound; arguments, errors and source as of `wilsonUpper`.
 *
 * @returns in [0, 1]
 * @coverage 1 - tail on average only; at 95 % and 1 to 300 units down to 0.73 where nearly every unit conforms (enumerated); one look
 */
export function wilsonLower(nonconforming: number, inspected: number, tail: Tail): Fraction {
  requireSample(nonconforming, inspected, tail);
  return scoreRoot(nonconforming, inspected, -normalQuantileOfTail(tail)) as Fraction;
}

/** The root of n (x/n - p)^2 = z^2 p (1 - p) above x/n for z > 0, below it for z < 0, without cancellation. */
function scoreRoot(x: number, n: number, z: number): number {
  if (x === 0 && z <= 0) return 0;
  if (x === n && z >= 0) return 1;
  const square = z * z;
  const sum = 2 * x + square + Math.abs(z) * Math.sqrt(square + 4 * x * ((n - x) / n));
  return z >= 0 ? sum / (2 * (n + square)) : (2 * x * (x / n)) / sum;
}
