import type { Assessment } from './assessment.ts';

/** Turns 'count in size' into an assessment: nonconforming units of those inspected, or nonconformities in an exposure. */
export interface Judge {
  /**
   * @param ripe    whether the window may call a violation: full, or growing with no size of its own
   * @param waiting an alarm waits for its return, so that the distances are asked for too
   */
  assess(size: number, count: number, ripe: boolean, waiting: boolean): Assessment;
  /**
   * A size above `size` before which, with no further nonconforming unit, no assessment changes; it may be too
   * early (asking again then is harmless), never too late. Infinity where nothing is left to change.
   */
  nextSize(size: number, count: number): number;
}
