import { lotDemonstrationUnits, lotViolationUnits, type LotPromise } from '../bound/critical-lot.ts';
import { lotAllowance, lotLower, lotUpper } from '../bound/finite-lot.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Tail } from '../units.ts';
import type { Assessment } from './assessment.ts';
import { CountJudge } from './count-judge.ts';
import { judgeThresholds, type CountRule } from './count-rule.ts';
import type { Judge } from './judge.ts';
import { levelsOf } from './rule-levels.ts';
import type { Thresholds } from './thresholds.ts';

/**
 * The rule of a guarantee on the fraction of one lot, sampled without replacement, by the exact hypergeometric bound.
 *
 * @param line    largest nonconforming fraction that was promised; likewise the target, below it
 * @param lotSize units in the lot, whole, 1 or more
 */
export function lotRule(guarantee: Guarantee, line: number, target: number, lotSize: number): CountRule {
  const { tail } = guarantee;
  const { violationTail } = levelsOf(guarantee);
  const by = judgeThresholds(guarantee, line, target, (at, level) => lotThresholds({ lotSize, allowed: lotAllowance(at, lotSize) }, level));
  return {
    per: 1,
    thresholds: by.line,
    judge: new LotJudge(new CountJudge({ ...by, neverDemonstrated: 0, neverViolated: 0 }), lotSize, lotAllowance(line, lotSize)),
    upper: (sampled, nonconforming) => lotUpper({ nonconforming, sampled, lotSize }, tail) / lotSize,
    lower: (sampled, nonconforming) => lotLower({ nonconforming, sampled, lotSize }, violationTail) / lotSize,
  };
}

function lotThresholds(promise: LotPromise, level: Tail): Thresholds {
  return {
    sizeToDemonstrate: (count) => (count > promise.allowed ? Infinity : lotDemonstrationUnits(count, promise, level)),
    sizeViolated: (count) => lotViolationUnits(count, promise, level),
  };
}

const violated: Assessment = { state: 'violated', backFromCrossing: false, backFromViolation: false };

/** A lot is judged as it stands: more found than it may hold is certain at once. More inspected than it holds is not for it to judge. */
class LotJudge implements Judge {
  readonly #counts: Judge;
  readonly #lotSize: number;
  readonly #allowed: number;

  constructor(counts: Judge, lotSize: number, allowed: number) {
    this.#counts = counts;
    this.#lotSize = lotSize;
    this.#allowed = allowed;
  }

  assess(size: number, count: number, ripe: boolean, waiting: boolean): Assessment {
    return count > this.#allowed ? violated : this.#counts.assess(size, count, ripe, waiting);
  }

  nextSize(size: number, count: number): number {
    if (size > this.#lotSize) return Infinity;
    return count > this.#allowed ? this.#lotSize + 1 : Math.min(this.#counts.nextSize(size, count), this.#lotSize + 1);
  }
}
