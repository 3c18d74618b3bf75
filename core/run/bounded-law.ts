import type { Side } from '../evidence/mean-method.ts';
import type { ValueRange } from '../evidence/measured-sum.ts';
import { admitBounded, allLooksBoundedLower, emptyBoundedRun, type BoundedRun } from '../sequential/mean-bounded.ts';
import type { MeanLaw, MeanLevels } from './mean-law.ts';

interface BoundedSnapshot {
  readonly above: BoundedRun;
  readonly below: BoundedRun;
}

/** More values than anyone waits for. */
const mostGathered = 100_000;

/** The mean of values between two known ends, whatever their distribution: a bet against each side of the line. */
export class BoundedLaw implements MeanLaw {
  readonly #levels: MeanLevels;
  readonly #range: ValueRange;
  readonly least: number;
  #above = emptyBoundedRun;
  #below = emptyBoundedRun;

  /** @param good side of the line on which the mean was promised to be */
  constructor(levels: MeanLevels, range: ValueRange, good: Side) {
    this.#levels = levels;
    this.#range = range;
    let best = emptyBoundedRun;
    while (best.logEvidence < levels.enough[good] && best.values < mostGathered) best = admitBounded(best, 1, this.#scaled(good, levels.line), levels.tail[good]);
    this.least = best.values;
  }

  get values(): number {
    return this.#above.values;
  }

  admit(value: number): void {
    const { line, tail } = this.#levels;
    this.#above = admitBounded(this.#above, this.#scaled('above', value), this.#scaled('above', line), tail.above);
    this.#below = admitBounded(this.#below, this.#scaled('below', value), this.#scaled('below', line), tail.below);
  }

  clear(): void {
    [this.#above, this.#below] = [emptyBoundedRun, emptyBoundedRun];
  }

  lnOn(side: Side): number {
    return (side === 'above' ? this.#above : this.#below).logEvidence;
  }

  isOn(side: Side): boolean {
    return this.lnOn(side) >= this.#levels.enough[side];
  }

  stands(side: Side, line: number): boolean {
    return this.#lower(side) >= this.#scaled(side, line);
  }

  bounds(): ReturnType<MeanLaw['bounds']> {
    if (this.values === 0) return { estimate: undefined, above: undefined, below: undefined };
    const { from, to } = this.#range;
    const inside = (share: number): number | undefined => (share > 0 ? share * (to - from) : undefined);
    const [above, below] = [inside(this.#lower('above')), inside(this.#lower('below'))];
    return {
      estimate: from + (this.#above.sum / this.values) * (to - from),
      above: above === undefined ? above : from + above,
      below: below === undefined ? below : to - below,
    };
  }

  snapshot(): BoundedSnapshot {
    return { above: this.#above, below: this.#below };
  }

  restore({ above, below }: BoundedSnapshot): void {
    [this.#above, this.#below] = [above, below];
  }

  #lower(side: Side): number {
    return allLooksBoundedLower(side === 'above' ? this.#above : this.#below, this.#levels.tail[side]);
  }

  #scaled(side: Side, value: number): number {
    const { from, to } = this.#range;
    return side === 'above' ? (value - from) / (to - from) : (to - value) / (to - from);
  }
}
