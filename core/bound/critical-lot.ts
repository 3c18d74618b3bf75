import { lastWhere } from '../numerics/integer-search.ts';
import type { Tail } from '../units.ts';
import { lotRefutes } from './finite-lot.ts';
import { OutOfDomain, requireInside, requireWhole } from './out-of-domain.ts';

/** What was promised of a lot: at most `allowed` nonconforming units among `lotSize`. */
export interface LotPromise {
  /** units in the lot; whole, 1 or more */
  readonly lotSize: number;
  /** nonconforming units that are allowed; whole, 0 to lotSize - 1 */
  readonly allowed: number;
}

/**
 * The most nonconforming units in a sample that still demonstrates the promise of a lot:
 * the largest x with P(X <= x | allowed + 1 in the lot) <= tail.
 *
 * @param sampled units in the sample; whole, 1 to lotSize
 * @param tail above 0, below 1
 * @returns whole; -1 when not even a faultless sample demonstrates it
 * @throws OutOfDomain
 * @coverage at one look fixed in advance, as `lotUpper`
 * @source `lotUpper` turned round, ties exact
 */
export function demonstratedInLot(sampled: number, promise: LotPromise, tail: Tail): number {
  requirePromise(promise, tail);
  const { lotSize, allowed } = promise;
  requireWhole('sampled', sampled, 1, lotSize);
  const guess = (sampled * allowed) / lotSize;
  const most = Math.min(sampled, allowed);
  return lastWhere((x) => lotRefutes(allowed + 1, { nonconforming: x, sampled, lotSize }, tail), 0, most, guess);
}

/**
 * The fewest nonconforming units in a sample that show the promise of a lot broken:
 * the smallest x with P(X >= x | allowed in the lot) <= tail. Arguments and errors as of `demonstratedInLot`.
 *
 * @returns whole, 1 to sampled + 1; sampled + 1 when no sample of this size can show it
 * @coverage at one look fixed in advance, as `lotLower`
 * @source `lotLower` turned round, ties exact
 */
export function violatedInLot(sampled: number, promise: LotPromise, tail: Tail): number {
  requirePromise(promise, tail);
  const { lotSize, allowed } = promise;
  requireWhole('sampled', sampled, 1, lotSize);
  const good = lotSize - allowed;
  const guess = (sampled * allowed) / lotSize;
  const shows = (x: number): boolean => lotRefutes(good, { nonconforming: sampled - x, sampled, lotSize }, tail);
  return lastWhere((x) => !shows(x), 0, sampled, guess) + 1;
}

/**
 * The smallest sample that demonstrates the promise of a lot with this many nonconforming units:
 * the smallest n with P(X <= nonconforming | allowed + 1 in the lot) <= tail.
 *
 * @param nonconforming in the sample; whole, 0 to allowed (more than are allowed demonstrate nothing)
 * @returns whole, nonconforming + 1 to lotSize
 * @throws OutOfDomain
 * @coverage at one look fixed in advance, as `lotUpper`
 * @source `lotUpper` turned round, ties exact
 */
export function lotDemonstrationUnits(nonconforming: number, promise: LotPromise, tail: Tail): number {
  requirePromise(promise, tail);
  const { lotSize, allowed } = promise;
  requireWhole('nonconforming', nonconforming, 0, allowed);
  const small = (sampled: number): boolean => !lotRefutes(allowed + 1, { nonconforming, sampled, lotSize }, tail);
  const guess = lotSize * (1 - tail ** (1 / (allowed + 1))) + (nonconforming * lotSize) / (allowed + 1);
  return lastWhere(small, nonconforming, lotSize - 1, guess) + 1;
}

/**
 * The largest sample in which this many nonconforming units still show the promise of a lot broken:
 * the largest n with P(X >= nonconforming | allowed in the lot) <= tail.
 *
 * @param nonconforming in the sample; whole, 0 to lotSize
 * @returns whole; 0 when no sample does, lotSize when more are nonconforming than are allowed
 * @throws OutOfDomain
 * @coverage at one look fixed in advance, as `lotLower`
 * @source `lotLower` turned round, ties exact
 */
export function lotViolationUnits(nonconforming: number, promise: LotPromise, tail: Tail): number {
  requirePromise(promise, tail);
  const { lotSize, allowed } = promise;
  requireWhole('nonconforming', nonconforming, 0, lotSize);
  if (nonconforming === 0) return 0;
  if (nonconforming > allowed) return lotSize;
  const good = lotSize - allowed;
  const shows = (sampled: number): boolean => lotRefutes(good, { nonconforming: sampled - nonconforming, sampled, lotSize }, tail);
  const last = lastWhere(shows, nonconforming, lotSize, ((nonconforming - 1) * lotSize) / (2 * allowed + 1));
  return last < nonconforming ? 0 : last;
}

function requirePromise({ lotSize, allowed }: LotPromise, tail: number): void {
  requireWhole('lotSize', lotSize, 1);
  if (!(Number.isSafeInteger(allowed) && allowed >= 0 && allowed < lotSize)) {
    throw new OutOfDomain('allowed', allowed, `a whole number, from 0 to ${lotSize - 1}`);
  }
  requireInside('tail', tail);
}
