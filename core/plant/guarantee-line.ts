import type { Promised } from './guarantee.ts';

/** The drawn line of a guarantee: in the quantity's own unit (shares as fractions, rates per the promised exposure). */
export interface GuaranteeLine {
  readonly side: 'at-most' | 'at-least';
  readonly line: number;
  readonly target: number;
}

export function guaranteeLineOf(promise: Promised): GuaranteeLine {
  const { target } = promise;
  switch (promise.quantity) {
    case 'nonconforming-fraction':
    case 'fraction-beyond-limit':
    case 'lot-fraction':
    case 'rate':
      return { side: 'at-most', line: promise.atMost, target };
    case 'yield':
    case 'chained-yield':
      return { side: 'at-least', line: promise.atLeast, target };
    case 'mean':
      return { side: promise.side, line: promise.line, target };
  }
}
