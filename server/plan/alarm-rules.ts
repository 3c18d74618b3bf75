import { writtenNumber } from '../../core/describe/rounded.ts';
import { batchRunLength } from '../../core/run-length/batch-run-length.ts';
import { cusumDelay, cusumPlan, cusumRunLength } from '../../core/run-length/cusum-run-length.ts';
import { seededUniform } from '../../core/run-length/seeded-uniform.ts';
import { simulateDelay, simulateRunLength } from '../../core/run-length/simulated-run-length.ts';
import { detectorWatch, windowWatch } from '../../core/run-length/watch.ts';
import { windowRunLength, type WindowCall } from '../../core/run-length/window-run-length.ts';
import { fractionDetector } from '../../core/sequential/detector-tuning.ts';
import type { AlarmRule, MeanUnits } from './alarm-rule.ts';
import { chanceAt, piecesOf, type Counted } from './counted.ts';
import { fixedSeed } from './fixed-seed.ts';

const computed = (units: number, { grain }: Counted): MeanUnits => ({ units: units * grain, standardError: undefined, standing: 'about' });

const saidOf = ({ unit, rate, things, grain }: Counted): AlarmRule['said'] => ({
  unit,
  level: 'rate',
  rate,
  assumes: `${things[0]?.toUpperCase() ?? ''}${things.slice(1)} come one by one and independently; where they come in clusters, false calls are more frequent than said.${grain === 1 ? '' : ' Each is known where it happens: a record over more exposure is looked at once, at its end.'}`,
});

/** How large a window is and with how many it calls; sizes in the plant's unit. */
export interface WindowSetting {
  readonly size: number;
  readonly count: number;
  /** between looks; undefined: after every unit */
  readonly batch: number | undefined;
}

/** 'The last `size` hold `count` nonconforming ones or more', looked at after every unit or once a batch. */
export function windowRule(counted: Counted, { size, count, batch }: WindowSetting, runs: number): AlarmRule {
  const call: WindowCall = { units: piecesOf(counted, size), count };
  const perLook = batch === undefined ? 1 : piecesOf(counted, batch);
  const looked = batch === undefined ? `looked at after every ${counted.grain === 1 ? 'unit' : 'nonconformity'}` : `looked at once every ${counted.size(batch)}`;
  const { grain, things } = counted;
  return {
    said: saidOf(counted),
    sentence: `Window rule: calls when the last ${counted.size(size)} hold ${count} ${grain === 1 ? 'nonconforming' : things} or more, ${looked}.`,
    betweenCalls: (rate) => (batch === undefined ? computed(windowRunLength(call, chanceAt(counted, rate)).units, counted) : batched(batchRunLength(call, perLook, chanceAt(counted, rate)), counted)),
    delay: (normal, rate) => ({ grain, steps: simulateDelay({ watch: windowWatch(call), runs, uniform: seededUniform(fixedSeed) }, chanceAt(counted, normal), chanceAt(counted, rate)) }),
    notes: [
      ['Source', 'J. I. Naus, Journal of the American Statistical Association 77 (1982), 177–183; for rare calls D. Aldous 1989 (clumps); delays simulated'],
      ...(batch === undefined ? [] : [['Mind', 'Delays are those of a look after every unit; looking once a batch adds half a batch on average.'] as const]),
    ],
    json: { rule: 'window', ...(grain === 1 ? { units: size } : { exposure: size, unit: counted.unit }), count, batch: batch ?? (grain === 1 ? 1 : null) },
  };
}

const batched = ({ units, standing }: ReturnType<typeof batchRunLength>, { grain }: Counted): MeanUnits => ({ units: units * grain, standardError: undefined, standing: standing === 'close' ? 'about' : 'at least' });

/** A cumulative sum that is set for a wanted number of units (or exposure) between false calls at the baseline. */
export function cusumRule(counted: Counted, baseline: number, ratio: number, wanted: number): AlarmRule {
  const plan = cusumPlan(chanceAt(counted, baseline), ratio, wanted / counted.grain);
  const { grain, unit, rate } = counted;
  const tuning = { ...plan.tuning, down: plan.tuning.down / grain };
  return {
    said: saidOf(counted),
    sentence: `CUSUM against ${rate(baseline)}, tuned to a rate ${writtenNumber(plan.ratio, 4)} times as high: threshold ${writtenNumber(tuning.threshold, 5)}, up ${writtenNumber(tuning.up, 5)} a ${grain === 1 ? 'nonconforming unit' : 'nonconformity'}, down ${writtenNumber(tuning.down, 5)} a ${grain === 1 ? 'unit' : unit}.`,
    betweenCalls: (at) => computed(cusumRunLength(plan, chanceAt(counted, at)), counted),
    delay: (normal, at) => computed(cusumDelay(plan, chanceAt(counted, normal), chanceAt(counted, at)), counted),
    notes: [['Source', 'E. S. Page 1954; Markov chain on whole steps, M. R. Reynolds, Z. G. Stoumbos 1999 (both from memory)']],
    json: { rule: 'cusum', baseline, ratio: plan.ratio, wanted, ...tuning },
  };
}

/** The mixture detector, whose units (or exposure) between false calls are guaranteed. */
export function detectorRule(counted: Counted, baseline: number, between: number, runs: number): AlarmRule {
  const { grain } = counted;
  const tuning = fractionDetector(chanceAt(counted, baseline), between / grain);
  const simulation = () => ({ watch: detectorWatch(tuning), runs, uniform: seededUniform(fixedSeed) });
  return {
    said: saidOf(counted),
    sentence: `Change detector against ${counted.rate(baseline)}: at least ${counted.size(between)} between false calls on average, guaranteed for every stream that keeps to it.`,
    betweenCalls: (rate) => (rate < baseline ? { units: between, standardError: undefined, standing: 'at least' } : { grain, steps: simulateRunLength(simulation(), chanceAt(counted, rate)) }),
    delay: (normal, rate) => ({ grain, steps: simulateDelay(simulation(), chanceAt(counted, normal), chanceAt(counted, rate)) }),
    notes: [['Source', detectorSource]],
    json: { rule: 'detector', baseline, threshold: between },
  };
}

export const detectorSource = 'mixture Shiryaev–Roberts e-detector, J. Shin, A. Ramdas, A. Rinaldo (abstract read), argument derived anew; actual figures simulated, seed fixed';
