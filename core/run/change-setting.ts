import type { Limit } from '../evidence/nonconforming-places.ts';
import { canWatchChange, changeBaseline } from '../plant/change-baseline.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import { fractionDetector, rateDetector } from '../sequential/detector-tuning.ts';
import type { ChangeSetting, DeteriorationRule } from './change-watch.ts';

/**
 * How the change of a guarantee is watched; undefined without a deterioration rule.
 *
 * @throws OutOfDomain where the units between false calls do not fit the baseline; the plant file's reader asks first
 */
export function changeSettingOf(guarantee: Guarantee): ChangeSetting | undefined {
  const { promise, normalRate, rules } = guarantee;
  const rule = rules.find((one): one is DeteriorationRule => one.kind === 'deterioration');
  if (rule === undefined || !canWatchChange(promise)) return undefined;
  const baseline = changeBaseline(guarantee, rule.baseline === 'normal-rate' ? normalRate : undefined);
  const tuning = promise.quantity === 'rate' ? rateDetector(baseline, rule.unitsBetweenFalseCalls) : fractionDetector(baseline, rule.unitsBetweenFalseCalls);
  const limit: Limit | undefined = promise.quantity === 'fraction-beyond-limit' ? promise.limit : undefined;
  return { guarantee, rule, tuning, baseline, limit };
}
