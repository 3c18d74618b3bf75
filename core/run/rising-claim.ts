/** Whether something holds of 'count in size': once it does it goes on to with more size, and with a lower count. */
export type HoldsAt = (size: number, count: number) => boolean;

/** How far ahead the next answer is asked for, as a share of what there is; and below which share that is not worth it. */
const farthest = 1 / 8;
const nearest = 1 / 1024;

/**
 * A claim about a run that rises with its size and falls with its count: 'demonstrated', or 'not violated'. An answer
 * at one point answers for all points beyond it, so that far from the claim's edge a run of any length costs a few
 * evaluations of its evidence, and no table of thresholds.
 */
export class RisingClaim {
  readonly #holdsAt: HoldsAt;
  readonly #most: number;
  /** The claim is open up to this size, from this count on; it is sure from that size on, up to that count. */
  #open = { size: -1, count: 0 };
  #sure = { size: Infinity, count: 0 };
  #reach = farthest;

  /** @param most largest size there is: the units of a lot, Infinity for a line that goes on */
  constructor(holdsAt: HoldsAt, most = Infinity) {
    this.#holdsAt = holdsAt;
    this.#most = most;
  }

  /** @param size 0 or more; @param count whole, 0 or more */
  holds(size: number, count: number): boolean {
    if (size <= this.#open.size && count >= this.#open.count) return false;
    if (size >= this.#sure.size && count <= this.#sure.count) return true;
    const holds = this.#holdsAt(size, count);
    if (holds) this.#sure = { size, count: this.#ahead(count, size, (more) => this.#holdsAt(size, more)) };
    else this.#open = { size: this.#ahead(size, this.#most, (more) => !this.#holdsAt(more, count)), count };
    return holds;
  }

  #ahead(from: number, most: number, same: (more: number) => boolean): number {
    if (this.#reach < nearest) {
      this.#reach *= 2;
      return from;
    }
    const more = Math.min(most, Math.ceil(from + from * this.#reach) + 1);
    if (more > from && same(more)) {
      this.#reach = Math.min(farthest, this.#reach * 2);
      return more;
    }
    this.#reach /= 4;
    return from;
  }
}
