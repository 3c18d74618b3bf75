import type { WindowRule } from '../plant/guarantee.ts';
import type { ShiftCalendar } from '../shift/shift-calendar.ts';
import type { EpochMs } from '../units.ts';

/** Where a record stands in the period (lot or shift) its guarantee's window covers. */
export type Belonging = 'present' | 'begins anew' | 'past';

export interface PeriodSnapshot {
  readonly lot: string | undefined;
  readonly pastLots: readonly string[];
  readonly shiftSince: number;
  readonly shiftUntil: number;
}

/** Lots remembered as over: a late record of one of them must not look like a new lot. */
const mostPastLots = 32;

/**
 * Tells a window that covers a lot or a shift which records belong to it. Windows by number, by time and by run
 * have no period: everything is present.
 */
export class Period {
  readonly #kind: WindowRule['kind'];
  readonly #calendar: ShiftCalendar;
  #lot: string | undefined;
  #pastLots: string[] = [];
  #shiftSince = 0;
  #shiftUntil = 0;

  constructor(kind: WindowRule['kind'], calendar: ShiftCalendar) {
    this.#kind = kind;
    this.#calendar = calendar;
  }

  /** When the present shift is over by the clock, ms; Infinity where no shift bounds the window. */
  get until(): number {
    return this.#kind === 'shift' && this.#shiftUntil > 0 ? this.#shiftUntil : Infinity;
  }

  /** Where a record inspected at `at`, of lot `lot`, belongs; the period moves on when it begins anew. */
  of(at: number, lot: string | undefined): Belonging {
    switch (this.#kind) {
      case 'units':
      case 'time':
      case 'run':
        return 'present';
      case 'lot':
        return this.#ofLot(lot);
      case 'shift':
        return this.#ofShift(at);
    }
  }

  /** The shift is over although no record said so. */
  end(): void {
    this.#shiftSince = this.#shiftUntil;
    this.#shiftUntil = 0;
  }

  snapshot(): PeriodSnapshot {
    return { lot: this.#lot, pastLots: [...this.#pastLots], shiftSince: this.#shiftSince, shiftUntil: this.#shiftUntil };
  }

  restore(from: PeriodSnapshot): void {
    this.#lot = from.lot;
    this.#pastLots = [...from.pastLots];
    this.#shiftSince = from.shiftSince;
    this.#shiftUntil = from.shiftUntil;
  }

  #ofLot(lot: string | undefined): Belonging {
    if (lot === this.#lot) return 'present';
    if (lot === undefined) return 'present';
    if (this.#pastLots.includes(lot)) return 'past';
    if (this.#lot !== undefined) {
      this.#pastLots.push(this.#lot);
      if (this.#pastLots.length > mostPastLots) this.#pastLots.shift();
    }
    this.#lot = lot;
    return 'begins anew';
  }

  /** A record between shifts belongs to no window, like one of an earlier shift. */
  #ofShift(at: number): Belonging {
    if (at >= this.#shiftSince && at < this.#shiftUntil) return 'present';
    if (at < this.#shiftSince) return 'past';
    const shift = this.#calendar.instanceAt(at as EpochMs);
    if (shift === undefined) return 'past';
    this.#shiftSince = shift.since;
    this.#shiftUntil = shift.until;
    return 'begins anew';
  }
}
