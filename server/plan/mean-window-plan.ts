import { boundMethods, lookRules } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { confidenceText } from '../../core/describe/share-text.ts';
import { OutOfDomain } from '../../core/bound/out-of-domain.ts';
import { chanceOfMeanDemonstration, meanDemonstrationUnits, type SupposedProcess } from '../../core/plan/mean-demonstration.ts';
import type { MeanPromise } from '../../core/plan/mean-margin.ts';
import { nearestNormalMean } from '../../core/run-length/steady-mean.ts';
import type { Tail } from '../../core/units.ts';
import { curvePicture } from './curve-picture.ts';
import { percent } from './demonstration-answer.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** A promise about a mean, whose window of measurements is planned. */
export interface AskedMeanWindow {
  readonly promise: MeanPromise;
  readonly process: Omit<SupposedProcess, 'mean'>;
  readonly tail: Tail;
  /** share of the time a well line may stand not demonstrated */
  readonly lost: Tail;
  readonly unit: string | undefined;
}

/** Which window keeps a line at this normal mean demonstrated. @throws OutOfDomain */
export function meanWindowFor(asked: AskedMeanWindow, normal: number): PlanAnswer {
  const { promise, process, tail, lost } = asked;
  const units = meanDemonstrationUnits(promise, { ...process, mean: normal }, tail, 1 - lost);
  if (units === undefined) throw new OutOfDomain('mean', normal, `farther from the line ${promise.line}: 1e12 measurements do not tell them apart`);
  const answer = meanWindowOf(asked, units);
  const sentence = `A window of ${writtenNumber(units, 15)} measurements, and every larger one, keeps a line at its normal mean of ${writtenOf(asked)(normal)} demonstrated ${percent(1 - lost)} of the time.`;
  return { ...answer, sentences: [sentence, ...answer.sentences.slice(1)], json: { ...answer.json, normal } };
}

/** What a given window does: how near to the line a normal mean may be. @param measurements whole, 2 or more (1 with a known sigma) @throws OutOfDomain */
export function meanWindowOf(asked: AskedMeanWindow, measurements: number): PlanAnswer {
  const { promise, process, tail, lost } = asked;
  const written = writtenOf(asked);
  const nearest = nearestNormalMean(measurements, promise, process, tail, lost);
  const lostAt = (mean: number): number => 1 - chanceOfMeanDemonstration(measurements, promise, { ...process, mean }, tail);
  const reach = nearest - promise.line;
  const means = [0, 0.25, 0.5, 0.75, 1, 1.5].map((part) => Number((promise.line + part * reach).toPrecision(12)));
  const size = `${writtenNumber(measurements, 15)} measurements`;
  const far = promise.line + 1.5 * reach;
  const method = process.sigmaKnown ? boundMethods.knownSigmaMean : boundMethods.studentMean;
  return {
    sentences: [
      `With a standard deviation of ${written(process.sigma)}, a window of ${size} demonstrates a mean of ${promise.side === 'at-least' ? 'at least' : 'at most'} ${written(promise.line)} at ${confidenceText(tail)}.`,
      `It stays demonstrated ${percent(1 - lost)} of the time ${promise.side === 'at-least' ? 'down' : 'up'} to a normal mean of ${written(nearest)}.`,
    ],
    table: { head: ['true mean', 'not demonstrated'], rows: means.map((mean) => [written(mean), percent(lostAt(mean))]) },
    picture: curvePicture({
      chance: lostAt,
      from: Math.min(promise.line, far),
      to: Math.max(promise.line, far),
      line: promise.line,
      label: 'true mean',
      title: `Share of the time not demonstrated, with a window of ${size}`,
      written,
    }),
    notes: [
      ['Method', method.name],
      ['Assumes', method.assumes.join(' ')],
      ['Looks', lookRules.one],
      ['Mind', 'Loss of demonstration is a status; how often a rule calls falsely when watched all the time: vouchline plan alarm.'],
    ],
    json: { plan: 'window', line: promise.line, side: promise.side, process, tail, confidence: confidenceText(tail), lost, units: measurements, nearestNormalMean: nearest, lostShares: means.map((mean) => ({ mean, lost: lostAt(mean) })), method: method.name, looks: lookRules.one },
  };
}

const writtenOf = ({ unit }: AskedMeanWindow) => (value: number): string => `${writtenNumber(value, 6)}${unit === undefined ? '' : ` ${unit}`}`;
