import { normalStart } from './normal-start.ts';
import { stirlingError } from './stirling.ts';

/**
 * A first value for the mean at which a gamma distribution of shape a has this lower tail.
 *
 * @param lnTail ln of the tail, below 0
 * @source E. B. Wilson, M. M. Hilferty 1931 (memory), two more terms: own expansion; far below the middle the leading power of the tail
 */
export function gammaLowerStart(a: number, lnTail: number): number {
  return startAt(a, -normalStart(lnTail), lnTail);
}

/** The same for the upper tail. */
export function gammaUpperStart(a: number, lnTail: number): number {
  return startAt(a, normalStart(lnTail), Math.log1p(-Math.exp(lnTail)));
}

function startAt(a: number, z: number, lnLower: number): number {
  const w = 1 / Math.sqrt(a);
  const root = 1 + w * (z / 3 - w * (1 / 9 - beyondNormal(z, w)));
  return root > 0.3 ? a * root * root * root : leadingPower(a, lnLower);
}

/** The next two terms of the cube root in 1/sqrt(a), where they are small. */
function beyondNormal(z: number, w: number): number {
  const square = z * z;
  if (square * w * w > 4) return 0;
  return w * (z * ((3 - square) / 324) + (w * (square * (square + 4) - 7)) / 1215);
}

/** (tail Gamma(a + 1))^(1/a): the tail without its exponential factor, exact where the mean is far below 1. */
export function leadingPower(a: number, lnTail: number): number {
  const lnGamma = 0.5 * Math.log(2 * Math.PI * a) + a * Math.log(a) - a + stirlingError(a);
  return Math.exp((lnTail + lnGamma) / a);
}
