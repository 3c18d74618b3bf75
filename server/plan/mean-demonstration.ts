import { boundMethods, lookRules } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { confidenceText } from '../../core/describe/share-text.ts';
import { chanceOfMeanDemonstration, meanDemonstrationUnits, type SupposedProcess } from '../../core/plan/mean-demonstration.ts';
import type { MeanPromise } from '../../core/plan/mean-margin.ts';
import type { Tail } from '../../core/units.ts';
import { curvePicture } from './curve-picture.ts';
import { percent } from './demonstration-answer.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** A mean to be demonstrated, and how the process is supposed to run. */
export interface AskedMean {
  readonly promise: MeanPromise;
  readonly process: SupposedProcess;
  readonly tail: Tail;
  /** wanted chance of passing, above 0, below 1 */
  readonly chance: number;
  readonly unit: string | undefined;
}

const usualChances = [0.5, 0.8, 0.9, 0.95, 0.99];

export function meanDemonstration({ promise, process, tail, chance, unit }: AskedMean): PlanAnswer {
  const units = (wanted: number): number | undefined => meanDemonstrationUnits(promise, process, tail, wanted);
  const n = units(chance);
  const written = (value: number): string => `${writtenNumber(value, 6)}${unit === undefined ? '' : ` ${unit}`}`;
  const chances = usualChances.includes(chance) ? usualChances : [...usualChances, chance].sort((a, b) => a - b);
  const plans = chances.map((wanted) => ({ chance: wanted, n: units(wanted) }));
  const method = process.sigmaKnown ? boundMethods.knownSigmaMean : boundMethods.studentMean;
  const side = promise.side === 'at-least' ? 'at least' : 'at most';
  const reach = 1.5 * (process.mean - promise.line);
  return {
    sentences: [
      `To demonstrate a mean of ${side} ${written(promise.line)} at ${confidenceText(tail)} confidence with a chance of ${percent(chance)}, where the process runs at ${written(process.mean)} ± ${written(process.sigma)}: ${n === undefined ? 'not even 1e12 measurements' : `${writtenNumber(n, 15)} measurements`}.`,
    ],
    table: { head: ['chance of passing', 'measurements'], rows: plans.map((plan) => [percent(plan.chance), plan.n === undefined ? 'none' : writtenNumber(plan.n, 15)]) },
    picture:
      n === undefined
        ? []
        : curvePicture({
            chance: (mean) => chanceOfMeanDemonstration(n, promise, { ...process, mean }, tail),
            from: Math.min(promise.line, promise.line + reach),
            to: Math.max(promise.line, promise.line + reach),
            line: promise.line,
            label: 'true mean',
            title: `Chance of passing with ${writtenNumber(n, 15)} measurements`,
            written,
          }),
    notes: [['Method', method.name], ['Assumes', method.assumes.join(' ')], ['Looks', lookRules.one], ['Source', method.source]],
    json: { plan: 'demonstration', line: promise.line, side: promise.side, tail, confidence: confidenceText(tail), process, chance, n: n ?? null, plans, method: method.name, looks: lookRules.one, source: method.source },
  };
}
