import { NoConvergence } from '../numerics/no-convergence.ts';
import { devianceTerm, stirlingError } from '../numerics/stirling.ts';

/**
 * ln of the integral of t^(shape-1) e^-t from 0 to z, over z^shape e^-z: the kernel of the evidence
 * on a rate, in which every power and gamma function cancels.
 *
 * @param shape above 0
 * @param z above 0
 * @returns any real number; absolute error about 1e-14, or 1e-16 z where that is more
 * @throws NoConvergence
 * @source DLMF 8.7.1 (series) below the mean, 8.9.2 (continued fraction) above it; own arrangement
 */
export function logGammaBelow(shape: number, z: number): number {
  if (z < shape + 1) return Math.log(seriesBelow(shape, z));
  const whole = logGammaWhole(shape, z);
  return whole + Math.log1p(-Math.exp(Math.log(fractionAbove(shape, z)) - whole));
}

/** The same from z to infinity. */
export function logGammaAbove(shape: number, z: number): number {
  if (z >= shape + 1) return Math.log(fractionAbove(shape, z));
  const whole = logGammaWhole(shape, z);
  return whole + Math.log1p(-Math.exp(Math.log(seriesBelow(shape, z)) - whole));
}

/** The same from 0 to infinity: ln[Gamma(shape) z^-shape e^z]. */
function logGammaWhole(shape: number, z: number): number {
  return 0.5 * Math.log((2 * Math.PI) / shape) + stirlingError(shape) + z * devianceTerm((shape - z) / z);
}

function seriesBelow(shape: number, z: number): number {
  let term = 1 / shape;
  let sum = term;
  for (let k = 1; term > 1e-17 * sum; k++) {
    term *= z / (shape + k);
    sum += term;
  }
  return sum;
}

function fractionAbove(shape: number, z: number): number {
  let bottom = z + 1 - shape;
  let c = bottom;
  let d = 0;
  let value = c;
  for (let m = 1; m < 10_000_000; m++) {
    const top = m * (shape - m);
    bottom += 2;
    d = 1 / (bottom + top * d);
    c = bottom + top / c;
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < 4e-16) return 1 / value;
  }
  throw new NoConvergence(`gamma tail at shape ${shape}, z = ${z}`);
}
