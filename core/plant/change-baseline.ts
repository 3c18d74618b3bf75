import { decimalComplement } from '../figure/decimal-complement.ts';
import type { Promised } from './guarantee.ts';

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
 * The rate a change detector takes as well: the declared one, else the guarantee line.
 *
 * @param declared normal rate in the promise's unit
 * @returns nonconforming units per unit, or nonconformities per unit of exposure; NaN for what is not counted
 */
export function changeBaseline(promise: Promised, declared: number | undefined): number {
  switch (promise.quantity) {
    case 'yield':
      return declared === undefined ? promise.atMostNonconforming : decimalComplement(declared);
    case 'rate':
      return (declared ?? promise.atMost) / promise.per;
    case 'nonconforming-fraction':
    case 'fraction-beyond-limit':
    case 'lot-fraction':
      return declared ?? promise.atMost;
    case 'mean':
    case 'chained-yield':
      return NaN;
  }
}
