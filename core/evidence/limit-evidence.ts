import type { Picture } from '../view/history.ts';
import { SlidingColumns } from '../window/sliding-columns.ts';
import type { CountRule } from './count-rule.ts';
import { distributionOf } from './distribution-of.ts';
import type { Batch } from './evidence.ts';
import type { Moment, RecordMoment } from './moment.ts';
import type { Limit } from './nonconforming-places.ts';
import { UnitEvidence, type UnitEvidenceSnapshot } from './unit-evidence.ts';
import type { Weighing } from './weighing.ts';

interface LimitEvidenceSnapshot extends UnitEvidenceSnapshot {
  readonly values: readonly Float64Array[];
}

/** Values kept for the picture at most. */
const mostValues = 5_000;

/**
 * Evidence on values counted beyond a limit. The evidence is the counts; the newest values are kept for the picture only,
 * as they came: what was corrected or came late changes the counts, not the picture.
 */
export class LimitEvidence extends UnitEvidence {
  readonly #limit: Limit;
  readonly #unit: string;
  readonly #most: number;
  readonly #values = new SlidingColumns(1);

  constructor(size: number | undefined, limit: Limit, unit: string, rule: CountRule, weighing: Weighing) {
    super({ size, gap: undefined, limit, asYield: false }, rule, weighing);
    this.#limit = limit;
    this.#unit = unit;
    this.#most = Math.min(size ?? mostValues, mostValues);
  }

  override take(batch: Batch, moment: RecordMoment): void {
    super.take(batch, moment);
    const { part, from, to } = batch;
    if (part.kind !== 'measurements') return;
    this.#values.pushAll(part.value.subarray(Math.max(from, to - this.#most), to));
    if (this.#values.length > this.#most) this.#values.dropOldest(this.#values.length - this.#most);
  }

  override clear(moment: Moment): void {
    this.#values.clear();
    super.clear(moment);
  }

  picture(): Picture {
    const visit = (see: (value: number) => void): void => {
      for (let row = 0; row < this.#values.length; row += 1) see(this.#values.get(0, row));
    };
    const sentence = 'The units beyond the limit are counted; no model of the values is used.';
    return distributionOf({ visit }, { reference: this.#limit.value, unit: this.#unit, limit: this.#limit, model: { verdict: 'not used', sentence } });
  }

  override snapshot(): LimitEvidenceSnapshot {
    return { ...super.snapshot(), values: this.#values.snapshot() };
  }

  override restore(from: LimitEvidenceSnapshot): void {
    super.restore(from);
    this.#values.restore(from.values);
  }
}
