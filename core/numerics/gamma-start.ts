import { normalQuantileOfTail } from './normal.ts';
import { stirlingError } from './stirling.ts';

/**
 * A first value for the mean at which a gamma distribution of shape a has this lower tail.
 *
 * @source E. B. Wilson, M. M. Hilferty 1931; far below the middle the leading power of the tail
 */
export function gammaLowerStart(a: number, tail: number): number {
  const root = cubeRootAt(a, -normalQuantileOfTail(tail));
  return root > 0.3 ? a * root * root * root : leadingPower(a, tail);
}

/** The same for the upper tail. */
export function gammaUpperStart(a: number, tail: number): number {
  const root = cubeRootAt(a, normalQuantileOfTail(tail));
  return root > 0.3 ? a * root * root * root : leadingPower(a, 1 - tail);
}

function cubeRootAt(a: number, z: number): number {
  return 1 - 1 / (9 * a) + z / (3 * Math.sqrt(a));
}

/** (tail Gamma(a + 1))^(1/a): the tail without its exponential factor, exact where the mean is far below 1. */
export function leadingPower(a: number, tail: number): number {
  const lnGamma = 0.5 * Math.log(2 * Math.PI * a) + a * Math.log(a) - a + stirlingError(a);
  return Math.exp((Math.log(tail) + lnGamma) / a);
}
