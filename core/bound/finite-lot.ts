import { exactDecimal } from '../numerics/exact-decimal.ts';
import { lotTailAtMost } from '../numerics/exact-hypergeometric.ts';
import { lnChance, lnHypergeometricLower, type Draw } from '../numerics/hypergeometric-tail.ts';
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
  const tails = new LotTails(sample);
  const believed = (marked: number): boolean => !lotTailAtMost(tails.lnLower(marked), nonconforming, tails.draw(marked), tail);
  return lastWhere(believed, nonconforming, most, startOf(sample, tail, most, tails));
}

/** The bound of sampling with replacement, then a few Newton steps on ln(tail): one more marked unit takes (n - x)/(N - D) P(x). */
function startOf({ nonconforming: x, sampled, lotSize }: LotSample, tail: Tail, most: number, tails: LotTails): number {
  if (x === sampled || sampled === lotSize) return most;
  const share = Math.sqrt(1 - sampled / lotSize);
  const seen = (x + 0.5) / sampled;
  let marked = Math.min(lotSize * (seen + share * (fractionUpper(x, sampled, tail) - seen)), most - 1);
  for (let i = 0; i < 4; i++) {
    const at = Math.max(Math.round(marked), x + 1);
    if (x * lotSize >= at * sampled) break;
    const step = (tails.lnLower(at) - Math.log(tail)) / tails.lossAt(at);
    marked = Math.min(Math.max(at + step, x), most);
    if (Math.abs(step) < 0.5) break;
  }
  return marked;
}

/** ln P(X <= x) by the number marked in the lot: a neighbour of the last one asked for costs one chance in place of a sum. */
class LotTails {
  readonly #sample: LotSample;
  #marked = -2;
  #lnLower = 0;

  constructor(sample: LotSample) {
    this.#sample = sample;
  }

  draw(marked: number): Draw {
    return { size: this.#sample.lotSize, marked, drawn: this.#sample.sampled };
  }

  lnLower(marked: number): number {
    const ln = this.#ofNeighbour(marked) ?? lnHypergeometricLower(this.#sample.nonconforming, this.draw(marked));
    this.#marked = marked;
    this.#lnLower = ln;
    return ln;
  }

  /** Share of the last tail asked for that one more marked unit takes away. @param marked the last one asked for */
  lossAt(marked: number): number {
    const { nonconforming: x, sampled, lotSize } = this.#sample;
    return Math.exp(lnChance(x, this.draw(marked)) - this.#lnLower) * ((sampled - x) / (lotSize - marked));
  }

  #ofNeighbour(marked: number): number | undefined {
    const { nonconforming: x, sampled, lotSize } = this.#sample;
    const last = this.#lnLower;
    if (!(last < 0 && last > -Infinity)) return undefined;
    if (marked === this.#marked) return last;
    if (marked === this.#marked + 1) {
      const loss = this.lossAt(this.#marked);
      return loss < 0.5 ? last + Math.log1p(-loss) : undefined;
    }
    if (marked === this.#marked - 1) return last + Math.log1p(Math.exp(lnChance(x, this.draw(marked)) - last) * ((sampled - x) / (lotSize - marked)));
    return undefined;
  }
}

function requireLotSample({ nonconforming, sampled, lotSize }: LotSample, tail: number): void {
  requireWhole('lotSize', lotSize, 1);
  requireWhole('sampled', sampled, 1, lotSize);
  requireWhole('nonconforming', nonconforming, 0, sampled);
  requireInside('tail', tail);
}
