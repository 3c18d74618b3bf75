import { gammaOfLowerTail, gammaOfUpperTail } from '../numerics/gamma-quantile.ts';
import type { Fraction, Tail } from '../units.ts';
import { OutOfDomain, requireInside, requireWhole } from './out-of-domain.ts';
import { yieldUpper } from './yield.ts';

/** What one station of a chain has seen: only units that reached it count as inspected there. */
export interface StationCount {
  readonly station: string;
  /** whole, 0 to inspected */
  readonly nonconforming: number;
  /** units that reached the station; whole, 1 or more */
  readonly inspected: number;
}

/** The bound on the yield of a chain, and where it comes from. */
export interface ChainedYield {
  /** in [0, 1); 0 when a station let nothing pass */
  readonly lower: Fraction;
  /** product of the stations' yields as seen */
  readonly estimate: Fraction;
  /** the station without which the bound would stand highest */
  readonly limiting: string;
  /** the station with the fewest units; few units alone can hold the bound down */
  readonly scarcest: string;
}

/**
 * Lower bound on the chance that a unit passes every station (rolled throughput yield), by the gamma
 * method on -ln(yield).
 *
 * @param stations one or more, in order of the line; they must judge independently
 * @param tail all of alpha in one tail, above 0, below 1
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage measured at 0.951 or more for 95 % (methods, seven cases), not proved; one look fixed in advance
 * @source M. P. Fay, E. J. Feuer 1997 (abstract) for weighted Poisson sums; on the log scale: own derivation
 */
export function chainedYieldLower(stations: readonly StationCount[], tail: Tail): ChainedYield {
  requireStations(stations, tail);
  const without = stations.map((_, i) => gammaLogLower(stations.filter((_other, j) => j !== i), tail));
  return {
    lower: gammaLogLower(stations, tail) as Fraction,
    estimate: stations.reduce((product, { nonconforming, inspected }) => product * ((inspected - nonconforming) / inspected), 1) as Fraction,
    limiting: nameAtMost(stations, without.map((lower) => -lower)),
    scarcest: nameAtMost(stations, stations.map(({ inspected }) => inspected)),
  };
}

/** The bound of `chainedYieldLower` alone, for the record path: without asking which station limits it. @coverage as there */
export function chainLower(stations: readonly StationCount[], tail: Tail): Fraction {
  requireStations(stations, tail);
  return gammaLogLower(stations, tail) as Fraction;
}

/**
 * Upper bound on the same chance: the gamma method's lower limit of the losses, without the allowance for the next
 * nonconforming unit. A station that let nothing pass bounds the chain by its own exact bound.
 *
 * @returns in (0, 1]; 1 when no unit was nonconforming
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage measured by enumeration (two stations, 36 cases, four levels): never below 1 - tail, not proved; one look fixed in advance
 * @source as `chainedYieldLower`
 */
export function chainUpper(stations: readonly StationCount[], tail: Tail): Fraction {
  requireStations(stations, tail);
  let [loss, variance, most] = [0, 0, 1];
  for (const { nonconforming, inspected } of stations) {
    const left = inspected - nonconforming;
    if (left === 0) most = Math.min(most, yieldUpper(nonconforming, inspected, tail));
    else {
      loss -= Math.log1p(-nonconforming / inspected);
      variance += nonconforming / inspected / left;
    }
  }
  if (loss === 0) return most as Fraction;
  const scale = variance / loss;
  return Math.min(most, Math.exp(-scale * gammaOfLowerTail(loss / scale, tail))) as Fraction;
}

/**
 * The counts of units followed through the chain one by one: what a station rejects does not reach
 * the next one and says nothing about it.
 *
 * @param started units that entered; whole, 1 or more
 * @param losses nonconforming units at each station, in order of the line
 * @throws OutOfDomain when a station rejects more than reached it, or nothing reached it
 */
export function stationsInSeries(
  started: number,
  losses: readonly { readonly station: string; readonly nonconforming: number }[],
): readonly StationCount[] {
  let inspected = started;
  return losses.map(({ station, nonconforming }) => {
    requireWhole(`units reaching ${station}`, inspected, 1);
    requireWhole(`nonconforming at ${station}`, nonconforming, 0, inspected);
    const count = { station, nonconforming, inspected };
    inspected -= nonconforming;
    return count;
  });
}

/** @throws OutOfDomain unless there is a station and each count is possible */
export function requireStations(stations: readonly StationCount[], tail: number): void {
  if (stations.length === 0) throw new OutOfDomain('stations', '(none)', 'one station or more');
  for (const { station, nonconforming, inspected } of stations) {
    requireWhole(`inspected at ${station}`, inspected, 1);
    requireWhole(`nonconforming at ${station}`, nonconforming, 0, inspected);
  }
  requireInside('tail', tail);
}

function gammaLogLower(stations: readonly StationCount[], tail: number): number {
  let [loss, variance, largest] = [0, 0, 0];
  for (const { nonconforming, inspected } of stations) {
    const left = inspected - nonconforming;
    if (left === 0) return 0;
    loss -= Math.log1p(-nonconforming / inspected);
    variance += nonconforming / inspected / left;
    largest = Math.max(largest, 1 / inspected);
  }
  if (largest === 0) return 1;
  const scale = (variance + largest * largest) / (loss + largest);
  return Math.exp(-scale * gammaOfUpperTail((loss + largest) / scale, tail));
}

function nameAtMost(stations: readonly StationCount[], by: readonly number[]): string {
  const least = by.indexOf(Math.min(...by));
  return stations[least]?.station ?? '';
}
