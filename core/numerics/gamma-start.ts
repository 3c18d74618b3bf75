import { normalStart } from './normal-start.ts';
import { stirlingError } from './stirling.ts';

/**
 * A first value for the mean at which a gamma distribution of shape a has this lower tail.
 *
 * @param lnTail ln of the tail, below 0
 * @source E. B. Wilson, M. M. Hilferty 1931 (memory), four more terms: own expansion; far below the middle the leading power of the tail
 */
export function gammaLowerStart(a: number, lnTail: number): number {
  const root = cubeRootAt(a, -normalStart(lnTail));
  return root > 0.3 ? a * root * root * root : leadingPower(a, lnTail);
}

/** The same for the upper tail. */
export function gammaUpperStart(a: number, lnTail: number): number {
  const root = cubeRootAt(a, normalStart(lnTail));
  return root > 0.3 ? a * root * root * root : leadingPower(a, Math.log1p(-Math.exp(lnTail)));
}

function cubeRootAt(a: number, z: number): number {
  const w = 1 / Math.sqrt(a);
  return 1 + w * (z / 3 - w * (1 / 9 - beyondNormal(z, w)));
}

/** The next four terms of the cube root in 1/sqrt(a), where they are small; the last two fitted. */
function beyondNormal(z: number, w: number): number {
  const square = z * z;
  if (square * w * w > 4) return 0;
  const fifth = z * (1.9125e-3 + square * (1.7218e-3 + square * 1.2805e-4));
  const sixth = 1.5804e-3 + square * (1.7731e-3 + square * (3.9032e-4 + square * 3.716e-6));
  return w * (z * ((3 - square) / 324) + w * ((square * (square + 4) - 7) / 1215 - w * (fifth - w * sixth)));
}

/** (tail Gamma(a + 1))^(1/a): the tail without its exponential factor, exact where the mean is far below 1. */
export function leadingPower(a: number, lnTail: number): number {
  const lnGamma = 0.5 * Math.log(2 * Math.PI * a) + a * Math.log(a) - a + stirlingError(a);
  return Math.exp((lnTail + lnGamma) / a);
}
