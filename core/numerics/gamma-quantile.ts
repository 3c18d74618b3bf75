import { gammaLowerStart, gammaUpperStart, leadingPower } from './gamma-start.ts';
import { gammaLowerRatio, gammaUpperRatio, lnGammaDensity } from './gamma-tail.ts';
import { rootOfTail, writePoint, type TailPoint } from './tail-root.ts';

/**
 * The mean at which a gamma distribution of shape a (scale 1) has this upper tail. Half a chi-square
 * quantile with 2a degrees of freedom.
 *
 * @param a shape, above 0
 * @param tail above 0, below 1
 * @returns above 0, possibly below the smallest double (then 0)
 * @throws NoConvergence
 * @source Newton-Halley iteration on ln(tail), own derivation
 */
export function gammaOfUpperTail(a: number, tail: number): number {
  if (a === 1) return -Math.log(tail);
  if (tail > 0.5) return lowerRoot(a, 1 - tail);
  const curve = (mean: number, point: TailPoint): void => {
    const ratio = gammaUpperRatio(a, mean);
    writePoint(point, lnGammaDensity(a, mean) + Math.log(ratio), -1 / ratio, a - mean, -mean, -mean);
  };
  const lnTail = Math.log(tail);
  return rootOfTail(curve, lnTail, gammaUpperStart(a, lnTail));
}

/** The mean at which the lower tail has this size; all else as of `gammaOfUpperTail`. */
export function gammaOfLowerTail(a: number, tail: number): number {
  if (a === 1) return -Math.log1p(-tail);
  return tail > 0.5 ? gammaOfUpperTail(a, 1 - tail) : lowerRoot(a, tail);
}

function lowerRoot(a: number, tail: number): number {
  const lnTail = Math.log(tail);
  if (lnTail < -30 * a) {
    const mean = leadingPower(a, lnTail);
    if (mean < 1e-17) return mean;
  }
  const curve = (mean: number, point: TailPoint): void => {
    const ratio = gammaLowerRatio(a, mean);
    writePoint(point, lnGammaDensity(a, mean) + Math.log(ratio), 1 / ratio, a - mean, -mean, -mean);
  };
  return rootOfTail(curve, lnTail, gammaLowerStart(a, lnTail));
}
