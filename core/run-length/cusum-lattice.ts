import { requireInside, requireWhole } from '../bound/out-of-domain.ts';

/**
 * A cumulative sum on whole steps: a conforming unit takes one step down (never below 0), a
 * nonconforming one `climb - 1` steps up, at `states` and above it alarms.
 */
export interface CusumLattice {
  /** whole, 2 or more */
  readonly climb: number;
  /** whole, 1 or more */
  readonly states: number;
}

/**
 * Mean units to the alarm of a cumulative sum on whole steps, exactly.
 *
 * @param rate nonconforming fraction, above 0, below 1
 * @param start step it starts from, whole, 0 to states - 1; or the chance of each of the steps
 * @returns relative error about 1e-16 times the states, however long the run
 * @throws OutOfDomain
 * @source M. R. Reynolds, Z. G. Stoumbos, J. Quality Technology 31 (1999) for the lattice (memory); solution: own
 *   derivation, see `climbFrom`
 */
export function latticeRunLength({ climb, states }: CusumLattice, rate: number, start: number | Float64Array = 0): number {
  requireWhole('climb', climb, 2);
  requireWhole('states', states, 1);
  requireInside('rate', rate);
  if (typeof start === 'number') requireWhole('start', start, 0, states - 1);
  return climbFrom(climb, rate, startingFrom(start, states), () => false).units;
}

/**
 * The fewest states with which the mean run length from 0 is `wanted` units or more, and that length.
 *
 * @param wanted units, above 0
 * @param mostStates where to give up; then the lattice returned has that many states and a shorter run
 * @source as `latticeRunLength`: the sum over record states is the run length for every number of states on the way
 */
export function latticeFor(climb: number, rate: number, wanted: number, mostStates: number): { readonly lattice: CusumLattice; readonly units: number } {
  requireWhole('climb', climb, 2);
  requireInside('rate', rate);
  const { units, states } = climbFrom(climb, rate, startingFrom(0, mostStates), (sum) => sum >= wanted);
  return { lattice: { climb, states }, units };
}

/**
 * Chance of each state after a long time at one rate without an alarm. Reckoned as if alarms took
 * nothing away, which is right where alarms are rare.
 *
 * @param rate above 0, below 1
 * @source own derivation: as often as it passes upwards between two neighbours it passes downwards
 */
export function latticeAtRest({ climb, states }: CusumLattice, rate: number): Float64Array {
  const chances = new Float64Array(states);
  const odds = rate / (1 - rate);
  chances[0] = 1;
  let sum = 1;
  for (let i = 1; i < states; i++) {
    let below = 0;
    for (let j = Math.max(0, i - climb + 1); j < i; j++) below += chances[j] as number;
    const chance = odds * below;
    chances[i] = chance;
    sum += chance;
    if (sum > 1e250) return chances.map((value, k) => (k <= i ? value / sum : 0));
  }
  return chances.map((value) => value / sum);
}

function startingFrom(start: number | Float64Array, states: number): Float64Array {
  if (typeof start !== 'number') return start;
  const chances = new Float64Array(states);
  chances[start] = 1;
  return chances;
}

/**
 * Follows the highest state reached so far. From a record state i the sum stays for `stay` units on
 * average before it rises above i, and lands on i + 1 … i + climb - 1 with chances `next`; both follow
 * from those of i - 1 by additions of positive numbers alone, so nothing cancels. A state's chance to
 * become a record times its stay, added up, is the run length.
 */
function climbFrom(climb: number, rate: number, records: Float64Array, enough: (units: number, states: number) => boolean): { units: number; states: number } {
  const reach = climb - 1;
  const chance = new Float64Array(records.length + reach);
  chance.set(records);
  const next = new Float64Array(chance.length);
  let higher = 0;
  let stay = 0;
  let units = 0;
  for (let i = 0; i < records.length; i++) {
    const leaving = rate + (1 - rate) * higher;
    const keep = (1 - rate) / leaving;
    const record = chance[i] as number;
    stay = 1 / leaving + keep * stay;
    units += record * stay;
    if (enough(units, i + 1)) return { units, states: i + 1 };
    next[i + reach] = rate / (1 - rate);
    higher = 0;
    for (let j = i + reach; j > i; j--) {
      const share = (next[j] as number) * keep;
      next[j] = share;
      chance[j] = (chance[j] as number) + record * share;
      if (j > i + 1) higher += share;
    }
  }
  return { units, states: records.length };
}
