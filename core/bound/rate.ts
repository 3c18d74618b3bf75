import { gammaOfLowerTail, gammaOfUpperTail } from '../numerics/gamma-quantile.ts';
import { midPoissonAbove, midPoissonBelow } from '../numerics/mid-tail.ts';
import type { Tail } from '../units.ts';
import { requireInside, requirePositive, requireWhole } from './out-of-domain.ts';

/**
 * Exact upper bound on a rate of nonconformities: the largest rate at which seeing this few would
 * still happen with probability `tail`.
 *
 * @param count nonconformities seen; whole, 0 or more
 * @param exposure what was inspected, in the plant's unit (units, metres, square metres, hours); above 0
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns nonconformities per unit of exposure, above 0
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage never below 1 - tail, at one look fixed in advance; counts must come independently
 * @source F. Garwood, Biometrika 28 (1936) 437-442 (memory)
 */
export function rateUpper(count: number, exposure: number, tail: Tail): number {
  requireCounted(count, exposure, tail);
  return gammaOfUpperTail(count + 1, tail) / exposure;
}

/**
 * Exact lower bound on a rate; arguments, errors and source as of `rateUpper`.
 *
 * @returns nonconformities per unit of exposure; exactly 0 if none was seen
 * @coverage never below 1 - tail, at one look fixed in advance
 */
export function rateLower(count: number, exposure: number, tail: Tail): number {
  requireCounted(count, exposure, tail);
  return count === 0 ? 0 : gammaOfLowerTail(count, tail) / exposure;
}

/**
 * Mid-P upper bound on a rate: P(X < x) + P(X = x)/2 = tail. Arguments and errors as of `rateUpper`.
 *
 * @returns for no nonconformity and tails from 1/2 up exactly 0
 * @coverage near 1 - tail on average, never below 1 - 2 tail; at one look fixed in advance
 * @source H. O. Lancaster 1961 (memory)
 */
export function midPRateUpper(count: number, exposure: number, tail: Tail): number {
  requireCounted(count, exposure, tail);
  return midMean(count, tail, 'above') / exposure;
}

/**
 * Mid-P lower bound on a rate, the mirror of `midPRateUpper`.
 *
 * @returns for no nonconformity and tails up to 1/2 exactly 0
 * @coverage near 1 - tail on average, never below 1 - 2 tail; at one look fixed in advance
 * @source H. O. Lancaster 1961 (memory)
 */
export function midPRateLower(count: number, exposure: number, tail: Tail): number {
  requireCounted(count, exposure, tail);
  return midMean(count, tail, 'below') / exposure;
}

/**
 * Upper quantile of the Jeffreys posterior Gamma(x + 1/2) of a rate. Arguments and errors as of `rateUpper`.
 *
 * @coverage 1 - tail on average only; at 95 % down to 0.85, the lower quantile 0 below its value for no nonconformity; one look
 * @source H. Jeffreys 1961 (memory)
 */
export function jeffreysRateUpper(count: number, exposure: number, tail: Tail): number {
  requireCounted(count, exposure, tail);
  return gammaOfUpperTail(count + 0.5, tail) / exposure;
}

/** Lower quantile of the same posterior; all as of `jeffreysRateUpper`. @coverage as there */
export function jeffreysRateLower(count: number, exposure: number, tail: Tail): number {
  requireCounted(count, exposure, tail);
  return gammaOfLowerTail(count + 0.5, tail) / exposure;
}

function midMean(count: number, tail: number, side: 'above' | 'below'): number {
  if (tail > 0.5) return midMean(count, 1 - tail, side === 'above' ? 'below' : 'above');
  if (count === 0) return side === 'above' ? -Math.log(2 * tail) : 0;
  return side === 'above' ? midPoissonAbove(count, tail) : midPoissonBelow(count, tail);
}

function requireCounted(count: number, exposure: number, tail: number): void {
  requireWhole('count', count, 0);
  requirePositive('exposure', exposure);
  requireInside('tail', tail);
}
