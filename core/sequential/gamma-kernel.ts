import { gammaLowerRatio, gammaUpperRatio, lnGammaDensity } from '../numerics/gamma-tail.ts';

/**
 * ln of the integral of t^(shape-1) e^-t from 0 to z, over z^shape e^-z: the kernel of the evidence
 * on a rate, in which every power and gamma function cancels.
 *
 * @param shape above 0
 * @param z above 0
 * @returns any real number; absolute error about 1e-14, or 1e-16 of the value where that is more
 * @throws NoConvergence
 * @source own derivation; the smaller side is summed, the other is the whole without it
 */
export function logGammaBelow(shape: number, z: number): number {
  if (z < shape) return Math.log(gammaLowerRatio(shape, z));
  const whole = -lnGammaDensity(shape, z);
  return whole + Math.log1p(-Math.exp(Math.log(gammaUpperRatio(shape, z)) - whole));
}

/** The same from z to infinity. */
export function logGammaAbove(shape: number, z: number): number {
  if (z >= shape) return Math.log(gammaUpperRatio(shape, z));
  const whole = -lnGammaDensity(shape, z);
  return whole + Math.log1p(-Math.exp(Math.log(gammaLowerRatio(shape, z)) - whole));
}
