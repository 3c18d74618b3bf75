import type { Fraction } from '../units.ts';
import type { Promised } from './guarantee.ts';

/** The promise in nonconforming fractions, each the exact complement where the promise is a yield. */
export interface Counted {
  readonly line: Fraction;
  readonly target: Fraction;
  /** Normal rate of the well line. */
  readonly well: Fraction | undefined;
}

/** What was promised, with the normal rate in the same scale. */
export interface PromiseReading {
  readonly promise: Promised;
  readonly normalRate: number | undefined;
  /** Where the evidence is units counted as conforming or not, one station or several. */
  readonly counted: Counted | undefined;
}
