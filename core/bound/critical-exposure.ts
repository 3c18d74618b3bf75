import { gammaOfLowerTail, gammaOfUpperTail } from '../numerics/gamma-quantile.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import { normalStart } from '../numerics/normal-start.ts';
import { lnPoissonLower, lnPoissonUpper } from '../numerics/poisson-tail.ts';
import type { Tail } from '../units.ts';
import { OutOfDomain, requireInside, requirePositive, requireWhole } from './out-of-domain.ts';

/**
 * The most nonconformities with which this exposure still demonstrates a rate of at most `line`:
 * the largest x with P(X <= x | exposure line) <= tail.
 *
 * @param exposure in the plant's unit, above 0
 * @param line guaranteed rate per unit of exposure, above 0
 * @param tail above 0, below 1
 * @returns whole; -1 when not even none demonstrates it (still gathering)
 * @throws OutOfDomain
 * @coverage at one look fixed in advance, as `rateUpper`
 * @source F. Garwood 1936 (memory), turned round
 */
export function demonstratedNonconformities(exposure: number, line: number, tail: Tail): number {
  const mean = expectedAt(exposure, line, tail);
  const lnTail = Math.log(tail);
  const guess = countNear(mean, -normalStart(lnTail)) - 0.5;
  return lastWhere((x) => lnPoissonLower(x, mean) <= lnTail, 0, mostCount, guess);
}

/**
 * The fewest nonconformities that show a rate above `line`: the smallest x with
 * P(X >= x | exposure line) <= tail. Arguments and errors as of `demonstratedNonconformities`.
 *
 * @returns whole, 1 or more; there always is one
 * @coverage at one look fixed in advance, as `rateLower`
 * @source as `demonstratedNonconformities`
 */
export function violatedNonconformities(exposure: number, line: number, tail: Tail): number {
  const mean = expectedAt(exposure, line, tail);
  const lnTail = Math.log(tail);
  const guess = countNear(mean, normalStart(lnTail)) + 0.5;
  return lastWhere((x) => lnPoissonUpper(x, mean) > lnTail, 0, mostCount, guess) + 1;
}

/**
 * The least exposure that demonstrates a rate of at most `line` with this many nonconformities.
 *
 * @param count whole, 0 or more
 * @returns exposure in the plant's unit, above 0
 * @throws OutOfDomain
 * @coverage at one look fixed in advance, as `rateUpper`
 * @source F. Garwood 1936 (memory), turned round
 */
export function demonstrationExposure(count: number, line: number, tail: Tail): number {
  requireCount(count, line, tail);
  return gammaOfUpperTail(count + 1, tail) / line;
}

/**
 * The most exposure over which this many nonconformities still show a rate above `line`.
 *
 * @returns exposure in the plant's unit; 0 when there is none (no nonconformity)
 * @throws OutOfDomain
 * @coverage at one look fixed in advance, as `rateLower`
 * @source as `demonstrationExposure`
 */
export function violationExposure(count: number, line: number, tail: Tail): number {
  requireCount(count, line, tail);
  return count === 0 ? 0 : gammaOfLowerTail(count, tail) / line;
}

/** Beyond this a count of 1 more is lost in the rounding of the expectation. */
const mostCount = 1e15;

function expectedAt(exposure: number, line: number, tail: number): number {
  requirePositive('exposure', exposure);
  requirePositive('line', line);
  requireInside('tail', tail);
  const mean = exposure * line;
  if (mean > 0 && mean < mostCount / 2) return mean;
  throw new OutOfDomain('exposure', exposure, 'with this line an expected count above 0 and below 5e14');
}

function requireCount(count: number, line: number, tail: number): void {
  requireWhole('count', count, 0);
  requirePositive('line', line);
  requireInside('tail', tail);
}

function countNear(mean: number, z: number): number {
  return mean + z * Math.sqrt(mean) + (z * z - 1) / 6;
}
