import { fractionLower, fractionUpper } from '../../core/bound/nonconforming-fraction.ts';
import { boundMethods } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import type { ColumnFigures } from './column-figures.ts';
import { numberIn } from './given.ts';
import type { ToldLimit } from './limit-distance.ts';
import { quantityNamed } from './quantities.ts';
import type { ToldRequest } from './told-request.ts';

/** The same question answered without a model: the measurements beyond the limit are counted. */
export interface CountedBeyond {
  readonly asked: AskedQuantity;
  readonly request: ToldRequest;
  readonly figure: number;
}

/** @param request with a side, upper or lower */
export function countedBeyond(column: ColumnFigures, limit: ToldLimit, request: ToldRequest): CountedBeyond {
  const beyond = column.values.filter((value) => (limit.name === 'USL' ? value > limit.value : value < limit.value)).length;
  const bound = request.side === 'lower' ? fractionLower : fractionUpper;
  return {
    asked: {
      command: 'fraction-beyond-limit',
      quantity: quantityNamed('nonconforming-fraction'),
      summary: '',
      usualSide: 'upper',
      promise: 'at most',
      scale: 'share',
      beside: [],
      seen: (given) => `${writtenNumber(beyond, 15)} of ${writtenNumber(numberIn(given, 'n'), 15)} measurements beyond the ${limit.name} ${writtenNumber(limit.value, 12)}`,
      subject: () => 'the fraction beyond the limit',
      method: () => boundMethods.binomial,
    },
    request: { ...request, given: { n: column.n, nonconforming: beyond, side: request.side } },
    figure: bound(beyond, column.n, request.tail),
  };
}
