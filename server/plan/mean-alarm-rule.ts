import { writtenNumber } from '../../core/describe/rounded.ts';
import { seededUniform } from '../../core/run-length/seeded-uniform.ts';
import { simulateMeanDelay } from '../../core/run-length/simulated-mean-delay.ts';
import { newMeanDetector, usualShifts, usualStakes, type MeanDetectorTuning } from '../../core/sequential/mean-detector.ts';
import type { AlarmRule } from './alarm-rule.ts';
import { detectorSource } from './alarm-rules.ts';
import { fixedSeed } from './fixed-seed.ts';

/** A detector of a shifted mean, as it is asked about. */
export interface AskedMeanDetector {
  /** what the rule holds the mean to, in the unit of measure */
  readonly line: number;
  readonly side: 'at-least' | 'at-most';
  /** standard deviation of the measurements; known to the detector unless it goes by a range */
  readonly sigma: number;
  readonly range: { readonly from: number; readonly to: number } | undefined;
  /** measurements between false calls, above 1 */
  readonly between: number;
  readonly unit: string | undefined;
}

/** The mixture detector of a mean, whose measurements between false calls are guaranteed. @throws OutOfDomain */
export function meanDetectorRule({ line, side, sigma, range, between, unit }: AskedMeanDetector, runs: number): AlarmRule {
  const written = (value: number): string => `${writtenNumber(value, 6)}${unit === undefined ? '' : ` ${unit}`}`;
  const tuning: MeanDetectorTuning = {
    baseline: line,
    watchesFor: side === 'at-least' ? 'fallen' : 'risen',
    model: range === undefined ? { kind: 'known sigma', sigma, shifts: usualShifts } : { kind: 'bounded', ...range, stakes: usualStakes },
    threshold: between,
  };
  newMeanDetector(tuning); // Refuses what it cannot be set to before anything is simulated.
  const by = range === undefined ? `a known standard deviation of ${written(sigma)}` : `measurements from ${written(range.from)} to ${written(range.to)}`;
  return {
    said: {
      unit: 'measurements',
      level: 'mean',
      rate: written,
      assumes: range === undefined ? 'Measurements are independent and normally distributed, or at least no wider than that.' : 'Every measurement lies between the ends; delays are of normally distributed ones.',
    },
    sentence: `Change detector of a mean ${side === 'at-least' ? 'below' : 'above'} ${written(line)} by ${by}: at least ${writtenNumber(between, 15)} measurements between false calls on average, guaranteed for every stream that keeps to it.`,
    betweenCalls: () => ({ units: between, standardError: undefined, standing: 'at least' }),
    delay: (normal, mean) => ({ grain: 1, steps: simulateMeanDelay({ tuning, sigma, runs, uniform: seededUniform(fixedSeed) }, normal, mean) }),
    notes: [['Source', detectorSource]],
    json: { rule: 'detector', baseline: line, side, sigma, ...(range === undefined ? {} : { range }), threshold: between },
  };
}
