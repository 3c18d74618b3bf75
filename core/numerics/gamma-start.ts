import { normalStart } from './normal-start.ts';
import { stirlingError } from './stirling.ts';

/**
 * A first value for the mean at which a gamma distribution of shape a has this lower tail.
 *
 * @param lnTail ln of the tail, below 0
 * @source E. B. Wilson, M. M. Hilferty 1931 (memory); far below the middle the leading power of the tail
 */
export function gammaLowerStart(a: number, lnTail: number): number {
  return startAt(a, -normalStart(lnTail), lnTail);
}

/** The same for the upper tail. */
export function gammaUpperStart(a: number, lnTail: number): number {
  return startAt(a, normalStart(lnTail), Math.log1p(-Math.exp(lnTail)));
}

function startAt(a: number, z: number, lnLower: number): number {
  const root = 1 - 1 / (9 * a) + z / (3 * Math.sqrt(a));
  return root > 0.3 ? a * root * root * root : leadingPower(a, lnLower);
}

/** (tail Gamma(a + 1))^(1/a): the tail without its exponential factor, exact where the mean is far below 1. */
export function leadingPower(a: number, lnTail: number): number {
  const lnGamma = 0.5 * Math.log(2 * Math.PI * a) + a * Math.log(a) - a + stirlingError(a);
  return Math.exp((lnTail + lnGamma) / a);
}
