import { exactDecimal } from '../numerics/exact-decimal.ts';
import { lotTailAtMost } from '../numerics/exact-hypergeometric.ts';
import { lnChance, lnHypergeometricLower, sumDownwards, type Draw } from '../numerics/hypergeometric-tail.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Tail } from '../units.ts';
import { fractionUpper } from './nonconforming-fraction.ts';
import { requireInside, requireWhole } from './out-of-domain.ts';

/** A sample drawn at random from a lot, without putting back. */
export interface LotSample {
  /** nonconforming units in the sample; whole, 0 to sampled */
  readonly nonconforming: number;
  /** units in the sample; whole, 1 to lotSize */
  readonly sampled: number;
  /** units in the lot; whole, 1 or more */
  readonly lotSize: number;
}

/**
 * Exact upper bound on the nonconforming units of a lot: the largest D with P(X <= x | D) > tail.
 * The rule is strict and exact: where the chance equals the tail, D is not believed.
 *
 * @param tail all of alpha in one tail, above 0, below 1; read as its shortest decimal
 * @returns whole units, nonconforming to lotSize - sampled + nonconforming
 * @throws OutOfDomain naming the argument
 * @coverage never below 1 - tail, at one look fixed in advance; the sample must be random
 * @source hypergeometric tail inverted as C. J. Clopper, E. S. Pearson 1934 (memory); ties by own exact arithmetic
 */
export function lotUpper(sample: LotSample, tail: Tail): number {
  requireLotSample(sample, tail);
  return mostBelieved(sample, tail);
}

/**
 * Exact lower bound on the nonconforming units of a lot: the smallest D with P(X >= x | D) > tail.
 * Arguments, errors and source as of `lotUpper`.
 *
 * @returns whole units, nonconforming to lotSize - sampled + nonconforming
 * @coverage never below 1 - tail, at one look fixed in advance; the sample must be random
 */
export function lotLower(sample: LotSample, tail: Tail): number {
  requireLotSample(sample, tail);
  const { nonconforming, sampled, lotSize } = sample;
  return lotSize - mostBelieved({ nonconforming: sampled - nonconforming, sampled, lotSize }, tail);
}

/** The nonconforming units that a guaranteed fraction allows a lot: line lotSize, rounded down in decimals. */
export function lotAllowance(line: number, lotSize: number): number {
  requireInside('line', line);
  requireWhole('lotSize', lotSize, 1);
  const share = exactDecimal(line);
  return share === undefined ? Math.floor(line * lotSize) : Number((share.digits * BigInt(lotSize)) / 10n ** BigInt(share.scale));
}

/** Whether P(X <= nonconforming | marked in the lot) <= tail, exactly. */
export function lotRefutes(marked: number, { nonconforming, sampled, lotSize }: LotSample, tail: number): boolean {
  const draw: Draw = { size: lotSize, marked, drawn: sampled };
  return lotTailAtMost(lnHypergeometricLower(nonconforming, draw), nonconforming, draw, tail);
}

function mostBelieved(sample: LotSample, tail: Tail): number {
  const { nonconforming, sampled, lotSize } = sample;
  const most = lotSize - sampled + nonconforming;
  return lastWhere((marked) => !lotRefutes(marked, sample, tail), nonconforming, most, startOf(sample, tail, most));
}

/** The bound of sampling with replacement, then a few Newton steps on ln(tail): one more marked unit takes (n - x)/(N - D) P(x). */
function startOf(sample: LotSample, tail: Tail, most: number): number {
  const { nonconforming: x, sampled, lotSize } = sample;
  if (x === sampled || sampled === lotSize) return most;
  const share = Math.sqrt(1 - sampled / lotSize);
  const seen = (x + 0.5) / sampled;
  let marked = Math.min(lotSize * (seen + share * (fractionUpper(x, sampled, tail) - seen)), most - 1);
  for (let i = 0; i < 4; i++) {
    const draw = { size: lotSize, marked: Math.max(Math.round(marked), x + 1), drawn: sampled };
    if (x * lotSize >= draw.marked * sampled) break;
    const sum = sumDownwards(x, draw);
    const gap = lnChance(x, draw) + Math.log(sum) - Math.log(tail);
    const step = (gap * sum * (lotSize - draw.marked)) / (sampled - x);
    marked = Math.min(Math.max(draw.marked + step, x), most);
    if (Math.abs(step) < 0.5) break;
  }
  return marked;
}

function requireLotSample({ nonconforming, sampled, lotSize }: LotSample, tail: number): void {
  requireWhole('lotSize', lotSize, 1);
  requireWhole('sampled', sampled, 1, lotSize);
  requireWhole('nonconforming', nonconforming, 0, sampled);
  requireInside('tail', tail);
}
