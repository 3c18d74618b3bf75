import { OutOfDomain, requirePositive } from '../bound/out-of-domain.ts';

/** One detector of the plant, as the budget sees it. */
export interface BudgetStream {
  /** units (or exposure) it judges in a shift, above 0 */
  readonly perShift: number;
  /** how large a part of the false calls it may have against others of its size; above 0, 1 for all alike */
  readonly weight: number;
}

/**
 * How the accepted false calls are shared out: 'by size' gives every unit the same part, so that all
 * streams of weight 1 get one threshold; 'by stream' gives every stream the same part, for streams
 * that are not counted in the same measure (units here, metres there).
 */
export type BudgetSharing = 'by size' | 'by stream';

/**
 * Spreads one number, the false calls a shift that the whole plant accepts, over its detectors.
 *
 * @param falseCalls accepted a shift over all streams, above 0
 * @param streams one or more
 * @returns thresholds in the order of the streams: each one's units (or exposure) between false calls
 * @throws OutOfDomain
 * @coverage run length: expected false calls a shift over all streams at most falseCalls, whatever ties the streams together
 * @source own derivation: a stream calls falsely at most perShift / threshold times a shift, and these add up
 */
export function spreadBudget(falseCalls: number, streams: readonly BudgetStream[], sharing: BudgetSharing = 'by size'): number[] {
  requirePositive('falseCalls', falseCalls);
  if (streams.length === 0) throw new OutOfDomain('streams', streams, 'one stream or more');
  for (const stream of streams) {
    requirePositive('perShift', stream.perShift);
    requirePositive('weight', stream.weight);
  }
  const part = ({ perShift, weight }: BudgetStream): number => (sharing === 'by size' ? weight * perShift : weight);
  const whole = streams.reduce((sum, stream) => sum + part(stream), 0);
  return streams.map((stream) => (stream.perShift * whole) / (falseCalls * part(stream)));
}

/**
 * False calls a shift that given thresholds allow at most, over all streams.
 *
 * @param thresholds in the order of the streams, above 0
 * @throws OutOfDomain
 * @source as `spreadBudget`
 */
export function falseCallsAtMost(thresholds: readonly number[], streams: readonly BudgetStream[]): number {
  if (thresholds.length !== streams.length) throw new OutOfDomain('thresholds', thresholds.length, `one for each of the ${streams.length} streams`);
  return streams.reduce((sum, stream, k) => {
    const threshold = thresholds[k] as number;
    requirePositive('threshold', threshold);
    return sum + stream.perShift / threshold;
  }, 0);
}
