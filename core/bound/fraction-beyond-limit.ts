import { normalTail } from '../numerics/normal.ts';
import type { Fraction, Tail } from '../units.ts';
import { distanceLower, distanceUpper } from './capability.ts';

/**
 * Upper bound on the fraction of units beyond ONE specification limit, by the normal model. Nothing is
 * counted: the whole statement about the far tail rests on the model, so it may only be shown together with the
 * verdict on its fit (`modelledFractionUpper` refuses without one). The model-free bound counts the units beyond
 * the limit and is `fractionUpper`.
 *
 * @param n    measurements, whole, 2 to 1e12
 * @param k    (USL - mean)/sd or (mean - LSL)/sd of the sample, -1e9 to 1e9; negative when the mean is beyond the limit
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns above 0, at most 1; the smallest double where the bound is below it
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage exactly 1 - tail at one look fixed in advance, for independent measurements of a normal distribution only
 * @source upper tail of the normal distribution beyond the lower bound on the true distance (noncentral t); D. B. Owen,
 *   survey of properties and applications of the noncentral t distribution, Technometrics 10 (1968) (memory)
 */
export function fractionBeyondUpper(n: number, k: number, tail: Tail): Fraction {
  return Math.max(normalTail(distanceLower(n, k, tail)), Number.MIN_VALUE) as Fraction;
}

/** Lower bound on the same fraction, 0 where it is below every double; all else as of `fractionBeyondUpper`. */
export function fractionBeyondLower(n: number, k: number, tail: Tail): Fraction {
  return normalTail(distanceUpper(n, k, tail)) as Fraction;
}
