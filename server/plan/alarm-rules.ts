import { writtenNumber } from '../../core/describe/rounded.ts';
import { briefShare } from '../../core/describe/share-text.ts';
import { batchRunLength } from '../../core/run-length/batch-run-length.ts';
import { cusumDelay, cusumPlan, cusumRunLength } from '../../core/run-length/cusum-run-length.ts';
import { seededUniform } from '../../core/run-length/seeded-uniform.ts';
import { simulateDelay, simulateRunLength } from '../../core/run-length/simulated-run-length.ts';
import { detectorWatch, windowWatch } from '../../core/run-length/watch.ts';
import { windowRunLength, type WindowCall } from '../../core/run-length/window-run-length.ts';
import { fractionDetector } from '../../core/sequential/detector-tuning.ts';
import type { AlarmRule, MeanUnits } from './alarm-rule.ts';

/** One seed for all, so that a figure comes out the same on every machine and every day. */
const seed = 20_260_101;

const computed = (units: number): MeanUnits => ({ units, standardError: undefined, standing: 'about' });

/** 'The last `units` units hold `count` nonconforming ones or more', looked at after every unit or once a batch. */
export function windowRule(call: WindowCall, batch: number, runs: number): AlarmRule {
  const { units, count } = call;
  const looked = batch === 1 ? 'looked at after every unit' : `looked at once every ${writtenNumber(batch, 15)} units`;
  return {
    sentence: `Window rule: calls when the last ${writtenNumber(units, 15)} units hold ${count} nonconforming or more, ${looked}.`,
    betweenCalls: (rate) => (batch === 1 ? computed(windowRunLength(call, rate).units) : batched(batchRunLength(call, batch, rate))),
    delay: (normal, rate) => simulateDelay({ watch: windowWatch(call), runs, uniform: seededUniform(seed) }, normal, rate),
    notes: [
      ['Source', 'J. I. Naus, Journal of the American Statistical Association 77 (1982), 177–183; for rare calls D. Aldous 1989 (clumps); delays simulated'],
      ...(batch === 1 ? [] : [['Mind', 'Delays are those of a look after every unit; looking once a batch adds half a batch on average.'] as const]),
    ],
    json: { rule: 'window', units, count, batch },
  };
}

const batched = ({ units, standing }: ReturnType<typeof batchRunLength>): MeanUnits => ({ units, standardError: undefined, standing: standing === 'close' ? 'about' : 'at least' });

/** A cumulative sum that is set for a wanted number of units between false calls at the baseline. */
export function cusumRule(baseline: number, ratio: number, wanted: number): AlarmRule {
  const plan = cusumPlan(baseline, ratio, wanted);
  return {
    sentence: `CUSUM against ${briefShare(baseline)}, tuned to a rate ${writtenNumber(plan.ratio, 4)} times as high: threshold ${writtenNumber(plan.tuning.threshold, 5)}, up ${writtenNumber(plan.tuning.up, 5)} a nonconforming unit, down ${writtenNumber(plan.tuning.down, 5)} a unit.`,
    betweenCalls: (rate) => computed(cusumRunLength(plan, rate)),
    delay: (normal, rate) => computed(cusumDelay(plan, normal, rate)),
    notes: [['Source', 'E. S. Page 1954; Markov chain on whole steps, M. R. Reynolds, Z. G. Stoumbos 1999 (both from memory)']],
    json: { rule: 'cusum', baseline, ratio: plan.ratio, wanted, ...plan.tuning },
  };
}

/** The mixture detector, whose units between false calls are guaranteed. */
export function detectorRule(baseline: number, between: number, runs: number): AlarmRule {
  const tuning = fractionDetector(baseline, between);
  return {
    sentence: `Change detector against ${briefShare(baseline)}: at least ${writtenNumber(between, 15)} units between false calls on average, guaranteed for every stream that keeps to it.`,
    betweenCalls: (rate) =>
      rate < baseline ? { units: between, standardError: undefined, standing: 'at least' } : simulateRunLength({ watch: detectorWatch(tuning), runs, uniform: seededUniform(seed) }, rate),
    delay: (normal, rate) => simulateDelay({ watch: detectorWatch(tuning), runs, uniform: seededUniform(seed) }, normal, rate),
    notes: [['Source', 'mixture Shiryaev–Roberts e-detector, J. Shin, A. Ramdas, A. Rinaldo (abstract read), argument derived anew; actual figures simulated, seed fixed']],
    json: { rule: 'detector', baseline, threshold: between },
  };
}
