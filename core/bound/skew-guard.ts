import { requireWhole } from './out-of-domain.ts';
import { requireFinite } from './mean.ts';

/** The measurements are skewed so that the t bound promises more than it keeps. */
export interface SkewWarning {
  readonly kind: 'skewed against the bound';
  /** of the sample, dimensionless */
  readonly skewness: number;
  /** the size from which it is called */
  readonly limit: number;
}

/**
 * Whether the skewness of the measurements stands against a t bound on their mean: a long tail on the
 * bad side (below for a lower bound, above for an upper one) makes the bound cover less than it says.
 *
 * @param side     of the bound
 * @param skewness of the sample (third moment over the 3/2 power of the second), finite
 * @param n        measurements, whole, 3 or more
 * @returns undefined when it does not speak against the bound
 * @throws OutOfDomain naming the argument
 * @source own rule: beyond 0.3 by more than two standard errors sqrt(6/n) of a normal sample's skewness
 */
export function skewAgainstBound(side: 'lower' | 'upper', skewness: number, n: number): SkewWarning | undefined {
  requireWhole('n', n, 3);
  requireFinite('skewness', skewness);
  const limit = 2 * Math.sqrt(6 / n) + 0.3;
  const against = side === 'lower' ? -skewness : skewness;
  return against > limit ? { kind: 'skewed against the bound', skewness, limit } : undefined;
}
