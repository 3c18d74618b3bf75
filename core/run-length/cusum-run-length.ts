import { OutOfDomain, requireInside, requirePositive } from '../bound/out-of-domain.ts';
import { crossingPoint } from '../sequential/crossing-point.ts';
import type { CusumTuning } from '../sequential/cusum.ts';
import { type CusumLattice, latticeAtRest, latticeFor, latticeRunLength } from './cusum-lattice.ts';

/** A cumulative sum set for a wanted run length, with what its run lengths are computed from. */
export interface CusumPlan {
  /** for the detector itself */
  readonly tuning: CusumTuning;
  readonly baseline: number;
  /** size of change it is tuned to: the wanted one, moved a little so that the steps come out whole */
  readonly ratio: number;
  /** mean units between false calls at the baseline */
  readonly runLength: number;
  readonly lattice: CusumLattice;
  /** the lattice stands for a fraction this many times the real one: run lengths times fraction hardly depend on it */
  readonly scale: number;
}

/** Fractions below this are computed here and scaled: exact to about 0.2 %, and a thousand times faster. */
const leastFraction = 1e-3;
/** States beyond which a wanted run length is refused. */
const mostStates = 40_000;

/**
 * A cumulative sum for a nonconforming fraction with a wanted mean run length at the baseline.
 *
 * @param baseline above 0, below 1/2
 * @param ratio size of change to tune it to, above 1, with ratio * baseline below 1
 * @param wanted units between false calls, above 1 / baseline
 * @throws OutOfDomain, also where the ratio is too near 1 for the wanted run length
 * @source Markov chain on whole steps, M. R. Reynolds, Z. G. Stoumbos 1999 (memory)
 */
export function cusumPlan(baseline: number, ratio: number, wanted: number): CusumPlan {
  requireInside('baseline', baseline);
  requirePositive('wanted', wanted);
  if (!(ratio > 1 && ratio * baseline < 1)) throw new OutOfDomain('ratio', ratio, `a number above 1 and below ${1 / baseline}`);
  const scale = Math.max(1, leastFraction / baseline);
  const fraction = baseline * scale;
  const climb = Math.max(2, Math.round(stepsUp(fraction, ratio)));
  const even = Math.exp(crossingPoint((u) => climb - stepsUp(fraction, Math.exp(u)), Math.log(ratio)));
  const { lattice, units } = latticeFor(climb, fraction, wanted / scale, mostStates);
  if (units < wanted / scale) throw new OutOfDomain('wanted', wanted, `at most ${units * scale} units for a ratio of ${ratio}`);
  const down = stepDown(baseline, even);
  const up = Math.log(even) + down;
  /* Half a step below the last state, so that rounding cannot miss it. */
  const threshold = ((lattice.states - 0.5) / climb) * up;
  return { tuning: { down, up, threshold }, baseline, ratio: even, runLength: units * scale, lattice, scale };
}

/**
 * Mean units from a fresh start to the alarm at any rate.
 *
 * @param rate nonconforming fraction, above 0, below 1 / plan.scale
 * @throws OutOfDomain
 * @source as `cusumPlan`; scaling error about rate * scale
 */
export function cusumRunLength(plan: CusumPlan, rate: number): number {
  return latticeRunLength(plan.lattice, scaled(plan, rate)) * plan.scale;
}

/**
 * Mean units to the alarm after a change, once the line has long run at its normal rate.
 *
 * @param normal nonconforming fraction before the change
 * @param rate and after it; both above 0, below 1 / plan.scale
 * @throws OutOfDomain
 * @source as `cusumPlan`, from the states at rest
 */
export function cusumDelay(plan: CusumPlan, normal: number, rate: number): number {
  const before = latticeAtRest(plan.lattice, scaled(plan, normal));
  return latticeRunLength(plan.lattice, scaled(plan, rate), before) * plan.scale;
}

function scaled(plan: CusumPlan, rate: number): number {
  requireInside('rate', rate);
  const fraction = rate * plan.scale;
  if (!(fraction < 1)) throw new OutOfDomain('rate', rate, `below ${1 / plan.scale}`);
  return fraction;
}

function stepDown(baseline: number, ratio: number): number {
  return Math.log1p(-baseline) - Math.log1p(-ratio * baseline);
}

/** How many conforming units undo one nonconforming unit, and one more. */
function stepsUp(baseline: number, ratio: number): number {
  return 1 + Math.log(ratio) / stepDown(baseline, ratio);
}
