import { decimalComplement } from '../figure/decimal-complement.ts';
import type { Tail } from '../units.ts';
import type { Promised } from './guarantee.ts';
import { detectorLine, type Remedies } from './remedies-of.ts';

/** Quantities whose change can be watched: those that are counted. */
export function canWatchChange(promise: Promised): boolean {
  switch (promise.quantity) {
    case 'nonconforming-fraction':
    case 'yield':
    case 'rate':
      return true;
    case 'fraction-beyond-limit':
      return promise.model === 'counted';
    case 'mean':
    case 'chained-yield':
    case 'lot-fraction':
      return false;
  }
}

/**
 * The rate a change detector takes as well: the declared one, else the guarantee line; as it shows in what is counted.
 *
 * @param declared normal rate in the promise's unit
 * @returns what is counted (nonconforming units, rejects, events) per unit, or nonconformities per unit of exposure; NaN
 * for what is not counted
 */
export function changeBaseline(guarantee: Remedies & { readonly promise: Promised; readonly tail: Tail }, declared: number | undefined): number {
  const { promise, tail } = guarantee;
  switch (promise.quantity) {
    case 'yield':
      return detectorLine(guarantee, declared === undefined ? promise.atMostNonconforming : decimalComplement(declared), tail);
    case 'rate':
      return (declared ?? promise.atMost) / promise.per;
    case 'nonconforming-fraction':
      return detectorLine(guarantee, declared ?? promise.atMost, tail);
    case 'fraction-beyond-limit':
    case 'lot-fraction':
      return declared ?? promise.atMost;
    case 'mean':
    case 'chained-yield':
      return NaN;
  }
}
