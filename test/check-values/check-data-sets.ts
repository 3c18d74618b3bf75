import { valuesOf, type DataSet } from './data-sets.ts';
import { dataSetEvaluator } from './measurements.ts';
import { outcomeOf, relativeError, type Outcome } from './outcome.ts';

/** Each certified figure of each data set: the mean, the standard deviation and the bounds on the mean. */
export function checkDataSets(sets: Readonly<Record<string, DataSet>>): readonly Outcome[] {
  return Object.entries(sets).flatMap(([name, set]) => checkDataSet(name, set));
}

function checkDataSet(name: string, set: DataSet): readonly Outcome[] {
  const evaluator = dataSetEvaluator;
  if (evaluator === undefined) return [{ kind: 'unanswered', row: name }];
  const data = valuesOf(set);
  const certified = (what: string, found: () => number, text: string): Outcome =>
    outcomeOf(`${name}: ${what} ${text}`, () => {
      const value = found();
      const error = relativeError(value, Number(text));
      return { error, within: error <= reachOf(data), found: String(value) };
    });
  const bounds = Object.entries(set.bounds ?? {}).flatMap(([confidence, pair]) => [
    certified(`lower ${confidence}`, () => evaluator.bound(data, 'lower', confidence), pair.lower),
    certified(`upper ${confidence}`, () => evaluator.bound(data, 'upper', confidence), pair.upper),
  ]);
  return [
    certified('mean', () => evaluator.mean(data), set.certified_mean),
    certified('standard deviation', () => evaluator.deviation(data), set.certified_sd),
    ...bounds,
  ];
}

/**
 * Fourteen digits, or what doubles allow: a value of 1000000.2 is stored with an error of 6e-11,
 * which a deviation of 0.1 sees as 6e-10 of itself.
 */
function reachOf(data: readonly number[]): number {
  const mean = data.reduce((sum, value) => sum + value, 0) / data.length;
  const spread = Math.sqrt(data.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (data.length - 1));
  return Math.max(1e-14, (Number.EPSILON * Math.abs(mean)) / spread);
}
