import type { CountRule } from './count-rule.ts';
import type { Bounds } from './evidence.ts';

const none: Bounds = { estimate: undefined, bound: undefined, opposite: undefined };

/** Estimate and bounds of 'count in size' in the quantity's unit; a yield is the complement of the nonconforming fraction. */
export function countBounds(rule: CountRule, size: number, count: number, asYield: boolean): Bounds {
  if (!(size > 0 && size < Infinity)) return none;
  const estimate = rule.estimate?.(size, count) ?? (count / size) * rule.per;
  const bound = rule.upper(size, count);
  const opposite = rule.lower(size, count);
  return asYield ? { estimate: 1 - estimate, bound: 1 - bound, opposite: 1 - opposite } : { estimate, bound, opposite };
}
