import { cusumPlan } from '../run-length/cusum-run-length.ts';
import { fractionDetector, rateDetector } from '../sequential/detector-tuning.ts';
import { usualShifts, usualStakes, type MeanDetectorTuning } from '../sequential/mean-detector.ts';
import type { MeanPromised } from '../evidence/mean-rule.ts';
import type { Limit } from '../evidence/nonconforming-places.ts';
import { cusumRatio } from '../plant/deterioration-of.ts';
import { changeBaseline } from '../plant/change-baseline.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import type { ChangeWatch } from './change-watch.ts';
import { CountWatch } from './count-watch.ts';
import { cusumArithmetic, mixtureArithmetic } from './detector-arithmetic.ts';
import { MeanWatch } from './mean-watch.ts';

export type DeteriorationRule = Extract<AlarmRule, { kind: 'deterioration' }>;

/** The detector a deterioration rule asks for; undefined for a quantity for which none is known. */
export function changeWatchOf(guarantee: Guarantee, rule: DeteriorationRule): ChangeWatch | undefined {
  const { promise } = guarantee;
  const baseline = changeBaseline(guarantee, rule.baseline === 'normal-rate' ? guarantee.normalRate : undefined);
  switch (promise.quantity) {
    case 'nonconforming-fraction':
    case 'yield':
      return unitsWatch(baseline, rule, undefined);
    case 'fraction-beyond-limit':
      return unitsWatch(baseline, rule, promise.limit);
    case 'rate':
      return new CountWatch(mixtureArithmetic(rateDetector(baseline, rule.unitsBetweenFalseCalls)), baseline, undefined, true);
    case 'mean': {
      const tuning = meanTuning(promise, baseline, rule.unitsBetweenFalseCalls);
      return tuning && new MeanWatch(tuning);
    }
    case 'chained-yield':
    case 'lot-fraction':
      return undefined;
  }
}

function unitsWatch(baseline: number, { unitsBetweenFalseCalls, detector }: DeteriorationRule, limit: Limit | undefined): ChangeWatch {
  if (detector === 'cusum') return new CountWatch(cusumArithmetic(cusumPlan(baseline, cusumRatio, unitsBetweenFalseCalls).tuning), baseline, limit, false);
  return new CountWatch(mixtureArithmetic(fractionDetector(baseline, unitsBetweenFalseCalls)), baseline, limit, false);
}

function meanTuning({ side, sigma, range }: MeanPromised, baseline: number, threshold: number): MeanDetectorTuning | undefined {
  const watchesFor = side === 'at-least' ? 'fallen' : 'risen';
  if (range) return { baseline, watchesFor, threshold, model: { kind: 'bounded', ...range, stakes: usualStakes } };
  return sigma && { baseline, watchesFor, threshold, model: { kind: 'known sigma', sigma: sigma.value, shifts: usualShifts } };
}
