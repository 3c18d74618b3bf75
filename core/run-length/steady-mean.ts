import { requireInside } from '../bound/out-of-domain.ts';
import { chanceOfMeanDemonstration, type SupposedProcess } from '../plan/mean-demonstration.ts';
import type { MeanPromise } from '../plan/mean-margin.ts';
import { crossingPoint } from '../sequential/crossing-point.ts';
import type { Tail } from '../units.ts';

/**
 * The normal mean nearest to the line at which a window keeps a promise about a mean demonstrated all but a share of
 * the time. (The window for a given normal mean is `meanDemonstrationUnits` with the complement of that share.)
 *
 * @param measurements of the window, whole, 2 to 1e12 (1 with a known sigma)
 * @param process its mean is not looked at
 * @param lost share of the time a well line may stand not demonstrated, above 0, below 1
 * @returns in the unit of measure; on the bad side of the line where even a line on it is seldom lost (lost above 1 - tail)
 * @throws OutOfDomain
 * @coverage of the window's bound: at one look
 * @source own derivation: the mean at which `chanceOfMeanDemonstration` is 1 - lost; that chance rises with the distance
 */
export function nearestNormalMean(measurements: number, promise: MeanPromise, process: Omit<SupposedProcess, 'mean'>, tail: Tail, lost: Tail): number {
  requireInside('lost', lost);
  const toGood = promise.side === 'at-least' ? process.sigma : -process.sigma;
  const step = toGood / Math.sqrt(measurements);
  const over = (steps: number): number => chanceOfMeanDemonstration(measurements, promise, { ...process, mean: promise.line + steps * step }, tail) - (1 - lost);
  return promise.line + crossingPoint(over, 4) * step;
}
