import type { Guarantee } from '../plant/guarantee.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { CountRule } from './count-rule.ts';
import type { Bounds } from './evidence.ts';
import { lotRule } from './lot-rule.ts';
import type { Moment } from './moment.ts';
import type { Standing } from './standing.ts';
import { UnitEvidence, type UnitEvidenceSnapshot } from './unit-evidence.ts';

export interface LotEvidenceSnapshot extends UnitEvidenceSnapshot {
  readonly lotSize: number | undefined;
}

const none: Bounds = { estimate: undefined, bound: undefined, opposite: undefined };

/**
 * Evidence on the fraction of one lot from a sample of it. The lot's size makes the rule: while it is not told, or is
 * smaller than the sample, the state is unknown.
 */
export class LotEvidence extends UnitEvidence {
  readonly #ruleOf: (lotSize: number) => CountRule;
  readonly #standing: Standing;
  #lotSize: number | undefined;

  /** @param line largest nonconforming fraction that was promised; likewise the target, below it */
  constructor(guarantee: Guarantee, { line, target }: { line: number; target: number }, standing: Standing) {
    const ruleOf = (lotSize: number): CountRule => lotRule(guarantee, line, target, lotSize);
    super({ size: undefined, gap: undefined, limit: undefined, asYield: false }, ruleOf(1), standing);
    this.#ruleOf = ruleOf;
    this.#standing = standing;
    this.setLotSize(undefined);
  }

  /** @param size units in the lot that is inspected from now on; weigh again afterwards */
  setLotSize(size: number | undefined): void {
    this.#lotSize = size;
    this.useRule(this.#ruleOf(size ?? 1));
  }

  override weigh(moment: Moment): void {
    if (this.#lotSize === undefined) this.#standing.block('lot-size', 'The lot size has not been told.');
    else if (this.window.inspected > this.#lotSize) this.#standing.block('lot-size', `More units were inspected than the ${this.#lotSize} that the lot was said to hold.`);
    else this.#standing.lift('lot-size');
    super.weigh(moment);
  }

  override figures(): Readonly<Record<string, number>> {
    if (this.#lotSize === undefined) return { inspected: this.window.inspected, nonconforming: this.window.nonconforming };
    return { ...super.figures(), lotSize: this.#lotSize };
  }

  override bounds(): Bounds {
    return this.#sizeHolds() ? super.bounds() : none;
  }

  override margin(): Margin {
    return this.#sizeHolds() ? super.margin() : {};
  }

  override warnings(): readonly string[] {
    // A sample drawn by chance has no neighbours: how its units follow each other tells nothing.
    return [];
  }

  override snapshot(): LotEvidenceSnapshot {
    return { ...super.snapshot(), lotSize: this.#lotSize };
  }

  override restore(from: LotEvidenceSnapshot): void {
    this.setLotSize(from.lotSize);
    super.restore(from);
  }

  #sizeHolds(): boolean {
    return this.#lotSize !== undefined && this.window.inspected <= this.#lotSize;
  }
}
