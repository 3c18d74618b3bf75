import { decimalComplement } from '../figure/decimal-complement.ts';
import type { Tail } from '../units.ts';
import type { Promised } from './guarantee.ts';
import { detectorLine, type Remedies } from './remedies-of.ts';

/**
 * What a change detector takes as well: the declared rate or mean, else the guarantee line; as it shows in what is counted.
 *
 * @param declared normal rate in the promise's unit
 * @returns what is counted (nonconforming units, rejects, events) per unit, nonconformities per unit of exposure, or a
 * mean; NaN for a chain
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
      return declared ?? promise.line;
    case 'chained-yield':
      return NaN;
  }
}
