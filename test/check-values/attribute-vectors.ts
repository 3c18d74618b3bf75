import { lindstromMaddenLower, sidakYieldLower } from '../../core/bound/chained-yield-compared.ts';
import { chainedYieldLower, type StationCount } from '../../core/bound/chained-yield.ts';
import { demonstratedCount, demonstrationUnits, violatedCount } from '../../core/bound/critical-count.ts';
import { chiSquareDispersion } from '../../core/bound/dispersion.ts';
import { knownErrorUpper, triedErrorUpper, type InspectionRefusal } from '../../core/bound/inspection-error.ts';
import { fractionLower, fractionUpper } from '../../core/bound/nonconforming-fraction.ts';
import type { Result } from '../../core/result.ts';
import type { Answer, Inputs, VectorEvaluator } from './evaluator.ts';
import { numberOf, numbersOf, tailIn } from './inputs.ts';

const stationsIn = (inputs: Inputs): readonly StationCount[] => {
  const inspected = numbersOf(inputs, 'n');
  return numbersOf(inputs, 'x').map((nonconforming, i) => ({ station: String(i), nonconforming, inspected: inspected[i] ?? NaN }));
};

const rejectsIn = (inputs: Inputs): { readonly rejected: number; readonly inspected: number } =>
  ({ rejected: numberOf(inputs, 'rejects'), inspected: numberOf(inputs, 'n') });

const given = (result: Result<number, InspectionRefusal>): number => {
  if (result.ok) return result.value;
  throw new Error(result.fault.because);
};

const dispersion = (inputs: Inputs): Answer => {
  const inspected = numberOf(inputs, 'm');
  const found = chiSquareDispersion(numbersOf(inputs, 'batch_counts').map((nonconforming) => ({ nonconforming, inspected })));
  return { phi: found?.factor ?? NaN, p_value: found?.chance ?? NaN };
};

const knownError = (row: Inputs): number => {
  const error = { sensitivity: numberOf(row, 'se'), falseReject: numberOf(row, 'fr') };
  return given(knownErrorUpper(rejectsIn(row), error, tailIn(row)));
};

const triedError = (row: Inputs): number => {
  const error = {
    seeded: numberOf(row, 'se_n'),
    caught: numberOf(row, 'se_hits'),
    good: numberOf(row, 'fr_n'),
    rejectedGood: numberOf(row, 'false_rejects'),
  };
  return given(triedErrorUpper(rejectsIn(row), error, tailIn(row)));
};

/** Test vectors about counts and verdicts at one look. */
export const attributeVectors: readonly VectorEvaluator[] = [
  { fn: 'cp_upper', compute: (row) => fractionUpper(numberOf(row, 'x'), numberOf(row, 'n'), tailIn(row)) },
  { fn: 'cp_lower', compute: (row) => fractionLower(numberOf(row, 'x'), numberOf(row, 'n'), tailIn(row)) },
  { fn: 'c_dem', compute: (row) => demonstratedCount(numberOf(row, 'w'), numberOf(row, 'p0'), tailIn(row)) },
  { fn: 'c_viol', compute: (row) => violatedCount(numberOf(row, 'w'), numberOf(row, 'p0'), tailIn(row)) },
  { fn: 'n_required_fixed', compute: (row) => demonstrationUnits(numberOf(row, 'x'), numberOf(row, 'p0'), tailIn(row)) },
  { fn: 'rty_lower_gamma_log', compute: (row) => chainedYieldLower(stationsIn(row), tailIn(row)).lower },
  { fn: 'rty_lower_lindstrom_madden', compute: (row) => lindstromMaddenLower(stationsIn(row), tailIn(row)) },
  { fn: 'rty_lower_sidak', compute: (row) => sidakYieldLower(stationsIn(row), tailIn(row)) },
  { fn: 'dispersion', compute: dispersion },
  { fn: 'inspection_upper_known', compute: knownError },
  { fn: 'inspection_upper_bonferroni_622', compute: triedError },
];
