import { OutOfDomain, requireInside, requireWhole } from '../bound/out-of-domain.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Tail } from '../units.ts';
import { type BetaPrior, requirePrior } from './nonconforming-evidence.ts';

/** A sample drawn without replacement from a lot, so far. */
export interface LotSample {
  /** nonconforming units found, whole, 0 to inspected */
  readonly nonconforming: number;
  /** units inspected, whole, 0 to size */
  readonly inspected: number;
  /** units in the lot, whole, 1 or more */
  readonly size: number;
}

/**
 * ln of the evidence that a lot holds fewer than `count` nonconforming units.
 *
 * @param count tested number, whole, 1 to size
 * @param prior where the share of nonconforming units was expected before the lot, fixed in advance
 * @returns any real number; Infinity where the sample rules the count out
 * @throws OutOfDomain
 * @coverage at all looks: the chance that it ever reaches ln(1 / tail) with `count` or more in the lot is at most tail
 * @source prior-posterior ratio, I. Waudby-Smith, A. Ramdas 2020 (opening read); one-sided: own derivation
 */
export function logLotEvidenceBelow(sample: LotSample, count: number, prior: BetaPrior): number {
  requireLot(sample, prior);
  requireWhole('count', count, 1, sample.size);
  const { nonconforming, inspected, size } = sample;
  const uninspected = size - inspected;
  const left = count - nonconforming;
  if (left > uninspected) return Infinity;
  if (left <= 0) return -Infinity;
  const { a, b } = prior;
  const posterior = logSumDown(left, uninspected, { a: a + nonconforming, b: b + inspected - nonconforming });
  return posterior - logSumDown(count, size, prior);
}

/**
 * ln of the evidence that a lot holds more than `count` nonconforming units: the mirror of
 * `logLotEvidenceBelow`. Arguments and errors likewise, but for count: whole, 0 to size - 1.
 *
 * @coverage at all looks: the chance that it ever reaches ln(1 / tail) with `count` or fewer in the lot is at most tail
 * @source as `logLotEvidenceBelow`
 */
export function logLotEvidenceAbove(sample: LotSample, count: number, prior: BetaPrior): number {
  requireLot(sample, prior);
  requireWhole('count', count, 0, sample.size - 1);
  return logLotEvidenceBelow(mirrored(sample), sample.size - count, { a: prior.b, b: prior.a });
}

/**
 * Upper bound on the nonconforming units of a lot that holds at every look at the sample.
 *
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns whole, the number found to size
 * @throws OutOfDomain
 * @coverage never below 1 - tail at all looks together
 * @source inversion of `logLotEvidenceBelow`
 */
export function allLooksLotUpper(sample: LotSample, tail: Tail, prior: BetaPrior): number {
  requireLot(sample, prior);
  requireInside('tail', tail);
  const stands = (count: number): boolean => count < 1 || !(logLotEvidenceBelow(sample, count, prior) >= -Math.log(tail));
  const share = (sample.nonconforming + 3) / (sample.inspected + 3);
  return lastWhere(stands, sample.nonconforming, sample.size - sample.inspected + sample.nonconforming, sample.size * share);
}

/**
 * Lower bound on the nonconforming units of a lot; arguments, errors and coverage as of `allLooksLotUpper`.
 *
 * @returns whole, the number found to size
 * @coverage never below 1 - tail at all looks together
 * @source inversion of `logLotEvidenceAbove`
 */
export function allLooksLotLower(sample: LotSample, tail: Tail, prior: BetaPrior): number {
  return sample.size - allLooksLotUpper(mirrored(sample), tail, { a: prior.b, b: prior.a });
}

function mirrored({ nonconforming, inspected, size }: LotSample): LotSample {
  return { nonconforming: inspected - nonconforming, inspected, size };
}

/**
 * ln of the chances of fewer than `top` nonconforming units among `size`, over the chance of `top`,
 * under a beta-binomial law; summed downwards by ratios, so that no gamma function is needed.
 */
function logSumDown(top: number, size: number, { a, b }: BetaPrior): number {
  let term = 1;
  let sum = 0;
  let scale = 0;
  for (let k = top; k > 0; k--) {
    const ratio = (k * (b + size - k)) / ((size - k + 1) * (a + k - 1));
    term *= ratio;
    sum += term;
    if (term > 1e250) {
      scale += Math.log(term);
      sum /= term;
      term = 1;
    }
    if (ratio < 1 && term * k < 1e-17 * sum) break;
  }
  return scale + Math.log(sum);
}

function requireLot({ nonconforming, inspected, size }: LotSample, prior: BetaPrior): void {
  requireWhole('size', size, 1);
  requireWhole('inspected', inspected, 0, size);
  requireWhole('nonconforming', nonconforming, 0);
  if (nonconforming > inspected) throw new OutOfDomain('nonconforming', nonconforming, `at most the ${inspected} inspected`);
  requirePrior(prior);
}
