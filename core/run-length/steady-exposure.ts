import { demonstratedNonconformities, demonstrationExposure } from '../bound/critical-exposure.ts';
import { OutOfDomain, requireInside, requirePositive } from '../bound/out-of-domain.ts';
import { rateLower } from '../bound/rate.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import { lnPoissonUpper } from '../numerics/poisson-tail.ts';
import type { Tail } from '../units.ts';
import type { SteadyWish } from './steady-window.ts';

/*
 * As `steady-window.ts`, of a guarantee on a rate: the window is an exposure, the line a rate per unit of it.
 */

/** More nonconformities in a window than anyone wants; a normal rate that near the line is refused. */
const mostCount = 1_000_000;

/**
 * The exposure from which on every larger window, too, keeps a well line demonstrated.
 *
 * @param normal the declared normal rate per unit of exposure, 0 to below the line
 * @returns in the line's unit of exposure, above 0
 * @throws OutOfDomain, also where the normal rate is so near the line that a million nonconformities would not tell them apart
 * @coverage of the window's bound: at one look
 * @source own derivation, as `steadyWindow`: just before an exposure that allows one more, the share lost is at its highest
 */
export function steadyExposure(wish: SteadyWish, normal: number): number {
  return exposureFrom(wish, normal, 1);
}

/**
 * The least exposure that keeps a well line demonstrated; a window a little larger may not, until it allows one more.
 * Arguments, errors and coverage as of `steadyExposure`.
 *
 * @source own derivation, as `windowProposal`: with a count allowed the best window is the least that allows it
 */
export function leastExposure(wish: SteadyWish, normal: number): number {
  return exposureFrom(wish, normal, 0);
}

/** @param worst 1: each count in the largest window that allows no more than it; 0: in the least that allows it */
function exposureFrom({ line, tail, lost }: SteadyWish, normal: number, worst: 0 | 1): number {
  requirePositive('line', line);
  requireInside('lost', lost);
  if (!(normal >= 0 && normal < line)) throw new OutOfDomain('normal', normal, `0 to below the line ${line}`);
  if (normal === 0) return demonstrationExposure(0, line, tail);
  const short = (count: number): boolean => lostAt(count, demonstrationExposure(count + worst, line, tail) * normal) > lost;
  const gap = 1 - normal / line;
  const count = lastWhere(short, 0, mostCount, 8 / (gap * gap)) + 1;
  if (count > mostCount) throw new OutOfDomain('normal', normal, `farther below the line ${line}`);
  return demonstrationExposure(count, line, tail);
}

/**
 * Share of the time a line at a given rate stands not demonstrated in a window of this exposure.
 *
 * @param exposure above 0
 * @param rate per unit of exposure, above 0
 * @returns in [0, 1]; 1 where even a faultless window demonstrates nothing yet
 * @throws OutOfDomain
 */
export function lostShareOfExposure(exposure: number, rate: number, line: number, tail: Tail): number {
  requirePositive('rate', rate);
  return lostAt(demonstratedNonconformities(exposure, line, tail), exposure * rate);
}

/**
 * The highest normal rate at which a window of this exposure keeps a line demonstrated.
 *
 * @returns per unit of exposure, in [0, line); 0 where even a faultless window demonstrates nothing yet
 * @throws OutOfDomain
 * @source as `highestNormalRate`
 */
export function highestRateOverExposure({ line, tail, lost }: SteadyWish, exposure: number): number {
  const count = demonstratedNonconformities(exposure, line, tail);
  return count < 0 ? 0 : rateLower(count + 1, exposure, lost);
}

const lostAt = (count: number, expected: number): number => (count < 0 ? 1 : Math.exp(lnPoissonUpper(count + 1, expected)));
