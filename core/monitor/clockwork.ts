import type { EpochMs } from '../units.ts';
import type { ClosedMinute } from './closed-minute.ts';
import { decidingBounds } from './decision.ts';
import { minuteMs } from './stretches.ts';
import type { Watch } from './watch.ts';

/**
 * The plant clock of a monitor. What falls due by time alone (silence, shift ends, time windows, minutes to write
 * down) happens in the order of its moments and is stamped with them, however late the clock is looked at: so
 * it does not matter when or how often that is done.
 */
export class Clockwork {
  readonly #watches: readonly Watch[];
  readonly #close: (minute: ClosedMinute) => void;
  #now = 0;
  /** No watch has anything due before this. */
  #floor = Infinity;
  #minuteDue = Infinity;

  constructor(watches: readonly Watch[], close: (minute: ClosedMinute) => void) {
    this.#watches = watches;
    this.#close = close;
  }

  get now(): EpochMs {
    return this.#now as EpochMs;
  }

  get nextDue(): number {
    return Math.min(this.#floor, this.#minuteDue);
  }

  advance(at: number): void {
    while (this.nextDue <= at) {
      const due = Math.min(this.#soonest(), this.#minuteDue);
      this.#floor = due;
      if (due > at) break;
      const ready = this.#watches.filter((watch) => watch.due() <= due); // asked before the clock moves on
      this.#now = Math.max(this.#now, due);
      for (const watch of ready) watch.moveClock(due as EpochMs);
      if (this.#minuteDue <= due) this.#closeMinutes(due);
    }
    this.#now = Math.max(this.#now, at);
  }

  /** Something may fall due at this moment that was not foreseen. */
  mayBeDue(at: number): void {
    if (at < this.#floor) this.#floor = at;
  }

  /** Records were counted by minute: the minute is written down when it is over. */
  minuteOpen(): void {
    if (this.#minuteDue === Infinity) this.#minuteDue = nextMinute(this.#now);
  }

  /** Takes up the clock of a snapshot. */
  restore(now: number): void {
    this.#now = now;
    this.#floor = now;
    this.minuteOpen();
  }

  #soonest(): number {
    let due = Infinity;
    for (const watch of this.#watches) due = Math.min(due, watch.due());
    return due;
  }

  #closeMinutes(before: number): void {
    let open = false;
    for (const watch of this.#watches) {
      const closed = watch.minutes.closeBefore(before);
      open ||= watch.minutes.size > 0;
      if (closed.length === 0) continue;
      const bounds = decidingBounds(watch);
      const { state } = watch.standing;
      for (const { minute, inspected, nonconforming } of closed) {
        this.#close({ guarantee: watch.guarantee.id, at: minute, inspected, nonconforming, ...bounds, state });
      }
    }
    this.#minuteDue = open ? nextMinute(before) : Infinity;
  }
}

const nextMinute = (at: number): number => at - (at % minuteMs) + minuteMs;
