import { OutOfDomain, requireWhole } from '../bound/out-of-domain.ts';
import { binomialChances } from './binomial-chances.ts';
import { requireCall, unitsWhileFilling, type WindowCall, windowRunLength } from './window-run-length.ts';

/** A mean run length of a rule looked at once a batch. */
export interface BatchRunLength {
  readonly units: number;
  /** 'at least': too many looks and counts to follow; looked at after every unit it would be this long, so it is no shorter */
  readonly standing: 'close' | 'at least';
}

/** Looks times squared count beyond which following them would take more than a moment. */
const mostSteps = 3e7;
/** Chances smaller than this share of a whole are left out of a step. */
const negligible = 1e-18;

/**
 * Mean run length of a window rule looked at once a batch: two windows are followed batch by batch,
 * exactly; what follows is taken as their last step repeated. Looks one by one (batch 1) belong to
 * `productRunLength`; batches as long as the window come out exactly.
 *
 * @param batch units between looks, whole, a divisor of the window's units
 * @param rate nonconforming fraction, above 0, below 1
 * @returns mean units to the first call from an empty window
 * @throws OutOfDomain
 * @source own derivation, see the comment in the body
 */
export function batchRunLength(call: WindowCall, batch: number, rate: number): BatchRunLength {
  requireCall(call, rate);
  requireWhole('batch', batch, 1, call.units);
  if (call.units % batch !== 0) throw new OutOfDomain('batch', batch, `a divisor of the window's ${call.units} units`);
  const looks = call.units / batch;
  const c = call.count;
  if (looks * c * c > mostSteps) return { units: windowRunLength(call, rate).units, standing: 'at least' };
  /* chance[old * c + fresh]: `old` nonconforming units of the first window are still inside, `fresh` have come since,
   * and no look has called. At each look one old batch leaves (a hypergeometric share of `old`) and one comes. */
  let chance: Float64Array = new Float64Array(c * c);
  binomialChances(call.units, rate, c - 1).exactly.forEach((value, old) => (chance[old * c] = value));
  const comes = binomialChances(batch, rate, 2 * c + 60).exactly;
  let quiet = sumOf(chance);
  let unitsToCall = unitsWhileFilling(call, rate);
  for (let look = looks; look > 0; look--) {
    unitsToCall += batch * quiet;
    const left = afterDepartures(chance, c, batch, look * batch);
    const called = calledAtArrival(left, c, comes);
    chance = afterArrivals(left, c, comes);
    if (look === 1) unitsToCall += (batch * sumOf(chance) * quiet) / called;
    quiet = sumOf(chance);
  }
  return { units: unitsToCall, standing: 'close' };
}

/** The oldest batch leaves: of `old` nonconforming units among `inside` units, those in its `batch` units. */
function afterDepartures(chance: Float64Array, c: number, batch: number, inside: number): Float64Array {
  const after = new Float64Array(c * c);
  for (let old = 0; old < c; old++) {
    const shares = sharesLeaving(old, batch, inside);
    for (let leaving = 0; leaving <= old; leaving++) {
      const share = shares[leaving] as number;
      if (share < negligible) continue;
      const row = (old - leaving) * c;
      for (let fresh = 0; fresh < c - old; fresh++) {
        after[row + fresh] = (after[row + fresh] as number) + share * (chance[old * c + fresh] as number);
      }
    }
  }
  return after;
}

/** Hypergeometric chances that 0, 1, … of `old` nonconforming units lie among `batch` of `inside` units. */
function sharesLeaving(old: number, batch: number, inside: number): Float64Array {
  const shares = new Float64Array(old + 1);
  const staying = inside - batch;
  let share = 1;
  let sum = 0;
  for (let k = Math.max(0, old - staying); k <= Math.min(old, batch); k++) {
    shares[k] = share;
    sum += share;
    share *= ((old - k) * (batch - k)) / ((k + 1) * (staying - old + k + 1));
  }
  return sum > 0 ? shares.map((value) => value / sum) : shares;
}

/** Chance that the batch that comes brings the window to the count. */
function calledAtArrival(chance: Float64Array, c: number, comes: Float64Array): number {
  const atLeast = new Float64Array(comes.length + 1);
  for (let k = comes.length - 1; k >= 0; k--) atLeast[k] = (atLeast[k + 1] as number) + (comes[k] as number);
  let called = 0;
  for (let old = 0; old < c; old++) {
    for (let fresh = 0; fresh < c - old; fresh++) called += (chance[old * c + fresh] as number) * (atLeast[c - old - fresh] as number);
  }
  return called;
}

/** The batch that comes, where it does not bring the window to the count. */
function afterArrivals(chance: Float64Array, c: number, comes: Float64Array): Float64Array {
  const after = new Float64Array(c * c);
  for (let old = 0; old < c; old++) {
    for (let fresh = 0; fresh < c - old; fresh++) {
      const value = chance[old * c + fresh] as number;
      if (value === 0) continue;
      for (let more = 0; more < c - old - fresh; more++) {
        const share = comes[more] as number;
        if (share < negligible && more > 0) break;
        const at = old * c + fresh + more;
        after[at] = (after[at] as number) + share * value;
      }
    }
  }
  return after;
}

function sumOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0);
}
