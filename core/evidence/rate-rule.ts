import type { Margin } from '../view/guarantee-view.ts';
import type { ExposureSum } from '../window/exposure-sum.ts';
import type { Assessment } from './assessment.ts';
import { countBounds } from './count-bounds.ts';
import { countMargin } from './count-margin.ts';
import type { CountRule } from './count-rule.ts';
import type { Bounds } from './evidence.ts';
import type { HeldRecords } from './held-records.ts';
import type { RecordRule } from './record-rule.ts';

/** Judges nonconformities over an exposure by the thresholds of a count rule. */
export class RateRule implements RecordRule<ExposureSum> {
  readonly #rule: CountRule;

  constructor(rule: CountRule) {
    this.#rule = rule;
  }

  assess({ exposure, count }: ExposureSum, ripe: boolean, waiting: boolean): Assessment {
    return this.#rule.judge.assess(exposure, count, ripe, waiting);
  }

  doubt(): undefined {
    return undefined;
  }

  figures({ count, exposure, records }: ExposureSum): Readonly<Record<string, number>> {
    const filled = exposure / this.#rule.thresholds.sizeToDemonstrate(0);
    return { count, exposure, records, ...(filled < 1 ? { filled } : {}) };
  }

  bounds({ count, exposure }: ExposureSum): Bounds {
    return countBounds(this.#rule, exposure, count, false);
  }

  /** Exposure that is wanting is told in records of the window's average; a full window gains none by another record. */
  margin({ sum: { exposure, count }, records, size }: HeldRecords<ExposureSum>): Margin {
    const { thresholds } = this.#rule;
    const each = exposure / records;
    const { unitsToGather, ...margin } = countMargin(thresholds, exposure, count, () => inRecords(thresholds.sizeToDemonstrate(count) - exposure));
    return unitsToGather === undefined ? margin : toGather(inRecords(thresholds.sizeToDemonstrate(0) - exposure));

    function inRecords(wanting: number): number {
      const more = wanting / each;
      return size === undefined || records + more <= size ? more : NaN;
    }
  }

  warnings(): readonly string[] {
    return [];
  }
}

function toGather(records: number): Margin {
  return Number.isFinite(records) ? { unitsToGather: Math.ceil(records) } : {};
}
