import { timeAt, type TimeColumn } from '../record/time-column.ts';
import type { EpochMs } from '../units.ts';

/** When something was decided, and by which record; by the clock alone where source and sequence are absent. */
export interface Moment {
  readonly at: EpochMs;
  readonly source: string | undefined;
  readonly sequence: number | undefined;
}

/** A moment of the plant clock. */
export function clockMoment(at: EpochMs): Moment {
  return { at, source: undefined, sequence: undefined };
}

/**
 * A moment that walks along the records of a part: `place` is the record that was taken last. One object serves
 * a whole part, so that the record path makes none.
 */
export class RecordMoment implements Moment {
  source = '';
  place = 0;
  #first = 0;
  #time: TimeColumn = { kind: 'steady', start: 0, step: 0 };

  /** Stands before the first record of a part whose first record has sequence `first`. */
  begin(source: string, first: number, time: TimeColumn): void {
    this.source = source;
    this.#first = first;
    this.#time = time;
    this.place = 0;
  }

  get at(): EpochMs {
    return timeAt(this.#time, this.place) as EpochMs;
  }

  get sequence(): number {
    return this.#first + this.place;
  }
}
