import { OutOfDomain, requireInside, requireWhole } from '../bound/out-of-domain.ts';
import { binomialChance, binomialChances } from './binomial-chances.ts';

/** A rule that calls when the last `units` units hold `count` nonconforming ones or more. */
export interface WindowCall {
  /** whole, 2 or more */
  readonly units: number;
  /** whole, 1 to units */
  readonly count: number;
}

/** How a rule that looks at every unit behaves at one rate, by the product form. */
export interface ProductForm {
  /** chances of no call within one window, two, and three */
  readonly quietOne: number;
  readonly quietTwo: number;
  readonly quietThree: number;
  /** calls a unit in the long run */
  readonly perUnit: number;
  /** mean units to the first call from an empty window */
  readonly runLength: number;
}

/**
 * Mean run length of a window rule looked at after every unit, by the product form: three windows are
 * counted exactly, what follows is taken as their continuation. Close (a few per mille) wherever
 * 1 - quietThree / quietTwo is above about 1e-11; below that doubles lose it, use `clumpRunLength`.
 *
 * @param rate nonconforming fraction, above 0, below 1
 * @throws OutOfDomain
 * @source J. I. Naus, J. Amer. Statist. Assoc. 77 (1982) 177-183 (formula from memory, checked by simulation)
 */
export function productRunLength({ units, count }: WindowCall, rate: number): ProductForm {
  requireCall({ units, count }, rate);
  const c = count;
  const mean = units * rate;
  const whole = binomialChances(units, rate, 2 * c);
  const less = binomialChances(units - 1, rate, c);
  const two = binomialChances(units - 2, rate, c);
  const b = (k: number): number => whole.exactly[k] ?? 0;
  const f = (k: number): number => whole.atMost[k] ?? 0;
  const f1 = (k: number): number => less.atMost[k] ?? 0;
  const f2 = (k: number): number => two.atMost[k] ?? 0;
  const quietTwo = f(c - 1) ** 2 - (c - 1) * b(c) * f(c - 2) + mean * b(c) * f1(c - 3);
  const first = 2 * b(c) * f(c - 1) * ((c - 1) * f(c - 2) - mean * f1(c - 3));
  const pairs = (units - 1) * rate * mean;
  const second = 0.5 * b(c) ** 2 * ((c - 1) * (c - 2) * f(c - 3) - 2 * (c - 2) * mean * f1(c - 4) + pairs * f2(c - 5));
  let third = 0;
  let fourth = 0;
  for (let r = 1; r < c; r++) third += b(2 * c - r) * f(r - 1) ** 2;
  for (let r = 2; r < c; r++) fourth += b(2 * c - r) * b(r) * ((r - 1) * f(r - 2) - mean * f1(r - 3));
  const quietThree = f(c - 1) ** 3 - first + second + third - fourth;
  const perUnit = -Math.log(quietThree / quietTwo) / units;
  const runLength = (units * (1 + 2 * f(c - 1) + quietTwo)) / 2 + quietTwo / perUnit;
  return { quietOne: f(c - 1), quietTwo, quietThree, perUnit, runLength };
}

/**
 * Mean run length of a window rule looked at after every unit, by counting clumps of calls. For rare
 * calls: error about +16 % where one look calls with chance 0.05, 1 % at 0.01, below 0.6 % from 0.001 on.
 *
 * @param rate above 0, below count / units
 * @throws OutOfDomain
 * @source D. Aldous, Probability Approximations via the Poisson Clumping Heuristic 1989 (summary read)
 */
export function clumpRunLength({ units, count }: WindowCall, rate: number): number {
  requireCall({ units, count }, rate);
  if (!(units * rate < count)) throw new OutOfDomain('rate', rate, `below count / units = ${count / units}`);
  return 1 / (rate * (1 - rate) * binomialChance(count - 1, units - 1, rate) * (1 - (units * rate) / count));
}

/** A mean run length and by which form it was had. */
export interface WindowRunLength {
  readonly units: number;
  readonly form: 'product' | 'clump';
}

/** Where 1 - quietThree / quietTwo falls below this, doubles have lost too much of it. */
const leastDifference = 1e-11;

/**
 * Mean units to the first call of a window rule looked at after every unit, from an empty window, by
 * whichever form holds. The units before the window is full are counted exactly, so the figure also
 * holds for rates that bring the count long before that.
 *
 * @param rate nonconforming fraction, above 0, below 1
 * @throws OutOfDomain
 * @source `productRunLength`, `clumpRunLength`; the filling window: own derivation
 */
export function windowRunLength(call: WindowCall, rate: number): WindowRunLength {
  const { quietOne, quietTwo, quietThree, perUnit } = productRunLength(call, rate);
  const lasting = quietTwo > 0 && quietThree > 0;
  if (lasting && !(1 - quietThree / quietTwo > leastDifference)) return { units: clumpRunLength(call, rate), form: 'clump' };
  const afterwards = lasting ? quietTwo / perUnit : 0;
  const units = unitsWhileFilling(call, rate) + (call.units * (quietOne + Math.max(quietTwo, 0))) / 2 + afterwards;
  return { units, form: 'product' };
}

/** Mean units without a call while the window fills: a negative binomial waiting time, cut at the window. */
export function unitsWhileFilling({ units, count }: WindowCall, rate: number): number {
  const { atMost } = binomialChances(units, rate, count - 1);
  return atMost.reduce((sum, chance) => sum + (1 - chance), 0) / rate;
}

/** @throws OutOfDomain unless the rule and the rate make sense */
export function requireCall({ units, count }: WindowCall, rate: number): void {
  requireWhole('units', units, 2);
  requireWhole('count', count, 1, units);
  requireInside('rate', rate);
}
