import { demonstratedTogether } from '../../core/budget/demonstrated-together.ts';
import { latticeRunLength } from '../../core/run-length/cusum-lattice.ts';
import { clumpRunLength, productRunLength, type WindowCall } from '../../core/run-length/window-run-length.ts';
import { admitRun, newDetector } from '../../core/sequential/change-detector.ts';
import { admitFoundCusum, admitQuietCusum, fractionCusum, newCusum } from '../../core/sequential/cusum.ts';
import { fractionDetector } from '../../core/sequential/detector-tuning.ts';
import { logLotEvidenceAbove, logLotEvidenceBelow, type LotSample } from '../../core/sequential/lot-evidence.ts';
import { admitBounded, allLooksBoundedLower, type BoundedRun, emptyBoundedRun } from '../../core/sequential/mean-bounded.ts';
import { allLooksMeanDistance, logMeanEvidence, tuningFor } from '../../core/sequential/mean-known-sigma.ts';
import { allLooksMeanDistanceUnknownSigma, logMeanEvidenceUnknownSigma } from '../../core/sequential/mean-unknown-sigma.ts';
import { allLooksLower, allLooksUpper } from '../../core/sequential/nonconforming-all-looks.ts';
import { smallestUnitsDemonstrated } from '../../core/sequential/nonconforming-critical.ts';
import { type BetaPrior, logEvidenceDemonstrated, logEvidenceViolated } from '../../core/sequential/nonconforming-evidence.ts';
import { allLooksRateLower, allLooksRateUpper } from '../../core/sequential/rate-all-looks.ts';
import { type GammaPrior, logRateEvidenceDemonstrated, logRateEvidenceViolated } from '../../core/sequential/rate-evidence.ts';
import type { Answer, Inputs, VectorEvaluator } from './evaluator.ts';
import { numberOf, numbersOf, tailIn } from './inputs.ts';

const betaPriorIn = (row: Inputs): BetaPrior => ({ a: numberOf(row, 'a'), b: numberOf(row, 'b') });
const gammaPriorIn = (row: Inputs): GammaPrior => ({ shape: numberOf(row, 'a'), exposure: numberOf(row, 'b') });

const lotIn = (row: Inputs): LotSample =>
  ({ nonconforming: numberOf(row, 'x'), inspected: numberOf(row, 'n'), size: numberOf(row, 'N') });

const callIn = (row: Inputs): WindowCall => ({ units: numberOf(row, 'w'), count: numberOf(row, 'c') });

const boundedIn = (row: Inputs, line: number): BoundedRun =>
  numbersOf(row, 'x').reduce((run, value) => admitBounded(run, value, line, tailIn(row)), emptyBoundedRun);

/** Rows about detectors want the level itself, so the threshold is set out of reach. */
const farOff = Number.MAX_VALUE;

const detectorLevels = (row: Inputs): Answer => {
  const baseline = numberOf(row, 'p0');
  const tuning = fractionDetector(baseline, farOff, [numberOf(row, 'p1') / baseline]);
  let state = newDetector(tuning);
  return numbersOf(row, 'gaps').map((gap) => {
    state = admitRun(state, gap - 1, tuning);
    return state.levels[0] ?? NaN;
  });
};

const cusumSums = (row: Inputs): Answer => {
  const baseline = numberOf(row, 'p0');
  const tuning = fractionCusum(baseline, numberOf(row, 'p1') / baseline, farOff);
  let state = newCusum;
  return numbersOf(row, 'gaps').map((gap) => {
    state = admitFoundCusum(admitQuietCusum(state, gap - 1, tuning), 1, tuning);
    return state.sum;
  });
};

const cusumSteps = (row: Inputs): Answer => {
  const baseline = numberOf(row, 'p0');
  const { down, up } = fractionCusum(baseline, numberOf(row, 'p1') / baseline, farOff);
  return { up: up - down, down, gamma: down / up };
};

const productForm = (row: Inputs): Answer => {
  const { quietTwo, quietThree, perUnit, runLength } = productRunLength(callIn(row), numberOf(row, 'p'));
  return { Q2: quietTwo, Q3: quietThree, lam: perUnit, arl: runLength };
};

/** Bounds from evidence: the root is as fine as doubles carry the evidence there. */
const root = 1e-11;
/** A sum of logarithms of either sign that may end near 0. */
const sum = 1e-11;

/** Test vectors of the looks at all times: e-processes, detectors, run lengths. */
export const sequentialVectors: readonly VectorEvaluator[] = [
  { fn: 'logE_dem', tolerance: sum, compute: (row) => logEvidenceDemonstrated(numberOf(row, 'x'), numberOf(row, 'n'), numberOf(row, 'q'), betaPriorIn(row)) },
  { fn: 'logE_vio', tolerance: sum, compute: (row) => logEvidenceViolated(numberOf(row, 'x'), numberOf(row, 'n'), numberOf(row, 'q'), betaPriorIn(row)) },
  { fn: 'ub_cs', tolerance: root, compute: (row) => allLooksUpper(numberOf(row, 'x'), numberOf(row, 'n'), tailIn(row), betaPriorIn(row)) },
  { fn: 'lb_cs', tolerance: root, compute: (row) => allLooksLower(numberOf(row, 'x'), numberOf(row, 'n'), tailIn(row), betaPriorIn(row)) },
  { fn: 'n_required_anytime', compute: (row) => smallestUnitsDemonstrated(numberOf(row, 'x'), numberOf(row, 'p0'), tailIn(row), betaPriorIn(row)) },
  { fn: 'logE_dem_pois', tolerance: sum, compute: (row) => logRateEvidenceDemonstrated(numberOf(row, 'X'), numberOf(row, 'T'), numberOf(row, 'l0'), gammaPriorIn(row)) },
  { fn: 'logE_vio_pois', tolerance: sum, compute: (row) => logRateEvidenceViolated(numberOf(row, 'X'), numberOf(row, 'T'), numberOf(row, 'l0'), gammaPriorIn(row)) },
  { fn: 'ub_cs_pois', tolerance: root, compute: (row) => allLooksRateUpper(numberOf(row, 'X'), numberOf(row, 'T'), tailIn(row), gammaPriorIn(row)) },
  { fn: 'lb_cs_pois', tolerance: root, compute: (row) => allLooksRateLower(numberOf(row, 'X'), numberOf(row, 'T'), tailIn(row), gammaPriorIn(row)) },
  { fn: 'logE_norm', tolerance: sum, compute: (row) => logMeanEvidence(numberOf(row, 'S'), numberOf(row, 'V'), numberOf(row, 'rho')) },
  { fn: 'norm_halfwidth_sigma1', tolerance: root, compute: (row) => allLooksMeanDistance(numberOf(row, 'n'), 1, tailIn(row), numberOf(row, 'rho')) },
  { fn: 'best_rho_onesided', compute: (row) => tuningFor(numberOf(row, 'v'), 1, tailIn(row)) },
  { fn: 'logE_t', tolerance: sum, compute: (row) => logMeanEvidenceUnknownSigma(numberOf(row, 'n'), numberOf(row, 'd'), numberOf(row, 'SS'), numberOf(row, 'rho')) },
  { fn: 't_halfwidth_unit_sd', tolerance: root, compute: (row) => allLooksMeanDistanceUnknownSigma(numberOf(row, 'n'), numberOf(row, 'SS'), tailIn(row), numberOf(row, 'rho')) },
  { fn: 'bet_logK', tolerance: sum, compute: (row) => boundedIn(row, numberOf(row, 'm')).logEvidence },
  { fn: 'eb_lower', tolerance: sum, compute: (row) => allLooksBoundedLower(boundedIn(row, 0.5), tailIn(row)) },
  { fn: 'logE_wor_dem', tolerance: sum, compute: (row) => logLotEvidenceBelow(lotIn(row), numberOf(row, 'D0'), betaPriorIn(row)) },
  { fn: 'logE_wor_vio', tolerance: sum, compute: (row) => logLotEvidenceAbove(lotIn(row), numberOf(row, 'D0'), betaPriorIn(row)) },
  { fn: 'ebh_count', compute: (row) => demonstratedTogether(numbersOf(row, 'e').map(Math.log), tailIn(row)).length },
  { fn: 'sr_after_each_nonconforming', compute: detectorLevels },
  { fn: 'cusum_after_each_nonconforming', compute: cusumSums },
  { fn: 'cusum_steps', compute: cusumSteps },
  { fn: 'cusum_lattice_arl', compute: (row) => latticeRunLength({ climb: numberOf(row, 'm'), states: numberOf(row, 'H') }, numberOf(row, 'p'), numberOf(row, 'start')) },
  /* The rate is a difference of two chances near each other, which doubles carry to 1e-16 over that difference. */
  { fn: 'scan_arl_product', tolerance: 1e-10, compute: productForm },
  { fn: 'scan_arl_clump', compute: (row) => clumpRunLength(callIn(row), numberOf(row, 'p')) },
];
