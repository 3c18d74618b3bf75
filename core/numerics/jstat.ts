import jstat from 'jstat';
import { OutOfDomain, requirePositive } from '../bound/out-of-domain.ts';

/*
 * The one door to jstat. The library clamps a probability of 1.5 to an answer, answers others with NaN and loses digits
 * where its series end too early; here it is asked only within the range in which it was measured against our own
 * tails, and what it says is checked. It serves as a second, independent computation of a chance: too coarse for the
 * bounds themselves, which want 1e-12, it shows a slip in them.
 */

const { jStat } = jstat;

/** Relative error of every chance below, for chances from 1e-6 up. */
export const jstatAccuracy = 1e-6;

/** Largest parameters within which that was measured. */
const mostUnits = 1e7;
const mostCount = 1e4;
const mostFreedom = 1e4;

/**
 * Chance that a beta variable is at most x.
 *
 * @param x above 0, below 1
 * @param a above 0, to 1e7; the smaller of a and b at most 1e4
 * @param b likewise
 * @returns 0 to 1
 * @throws OutOfDomain naming the argument
 * @source jstat 1.9.6, beta.cdf; accuracy measured in the test
 */
export function betaChance(x: number, a: number, b: number): number {
  if (!(x > 0 && x < 1)) throw new OutOfDomain('x', x, 'a number above 0 and below 1');
  requireAtMost('a', a, mostUnits);
  requireAtMost('b', b, mostUnits);
  requireAtMost('smaller of a and b', Math.min(a, b), mostCount);
  return checked('beta', jStat.beta.cdf(x, a, b));
}

/**
 * Chance that a gamma variable of scale 1 is at most x.
 *
 * @param shape above 0, to 1e4
 * @param x     above 0, finite
 * @returns 0 to 1
 * @throws OutOfDomain naming the argument
 * @source jstat 1.9.6, lowRegGamma; accuracy measured in the test
 */
export function gammaChance(shape: number, x: number): number {
  requireAtMost('shape', shape, mostCount);
  requirePositive('x', x);
  return checked('gamma', jStat.lowRegGamma(shape, x));
}

/**
 * Chance that a Student t variable is at most t.
 *
 * @param t       finite
 * @param freedom above 0, to 1e4: beyond, jstat loses its digits
 * @returns 0 to 1
 * @throws OutOfDomain naming the argument
 * @source jstat 1.9.6, studentt.cdf; accuracy measured in the test
 */
export function studentChance(t: number, freedom: number): number {
  if (!Number.isFinite(t)) throw new OutOfDomain('t', t, 'a finite number');
  requireAtMost('freedom', freedom, mostFreedom);
  return checked('Student t', jStat.studentt.cdf(t, freedom));
}

function requireAtMost(argument: string, value: number, most: number): void {
  if (!(value > 0 && value <= most)) throw new OutOfDomain(argument, value, `a number above 0, at most ${most}`);
}

/** Rounding may carry a chance past its ends by less than its accuracy; anything else is no chance. */
function checked(distribution: string, chance: number): number {
  if (chance >= -jstatAccuracy && chance <= 1 + jstatAccuracy) return chance;
  throw new OutOfDomain(distribution, chance, 'arguments for which jstat has a chance');
}
