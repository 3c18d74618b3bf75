import { OutOfDomain } from '../../core/bound/out-of-domain.ts';
import { betaChance, gammaChance, jstatAccuracy, studentChance } from '../../core/numerics/jstat.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import { looksIn, numberIn, optionalNumberIn, type Given } from './given.ts';
import type { ToldRequest } from './told-request.ts';

/** What another library says of a bound: the chance that ought to be the tail. */
export interface SecondComputation {
  readonly chance: number;
  readonly agrees: boolean;
}

/** Below this tail the other library was not measured. */
const leastTail = 1e-6;
/** Nearer to the mean than this share of it, the distance has lost the digits that the comparison needs. */
const leastDistance = 1e-8;
/** Between the two computations: the stated accuracy of the other one, and as much again. */
const tolerance = 2 * jstatAccuracy;

/**
 * Puts an exact bound back into the distribution it was solved from, as another library computes it.
 *
 * @returns undefined where there is no such distribution, or where that library is not good enough to be asked
 */
export function secondComputation({ quantity }: AskedQuantity, { given, tail, side }: ToldRequest, figure: number): SecondComputation | undefined {
  if (!(tail >= leastTail) || (given['method'] ?? 'exact') !== 'exact' || looksIn(given) !== 'one') return undefined;
  try {
    const chance = chanceAt(quantity.name, given, side === 'upper', figure);
    return chance === undefined ? undefined : { chance, agrees: Math.abs(chance / tail - 1) <= tolerance };
  } catch (cause) {
    if (cause instanceof OutOfDomain) return undefined; // Beyond what was measured: no second computation.
    throw cause;
  }
}

function chanceAt(quantity: string, given: Given, upper: boolean, figure: number): number | undefined {
  switch (quantity) {
    case 'nonconforming-fraction':
      return countedChance(numberIn(given, 'nonconforming'), numberIn(given, 'n'), upper, figure);
    case 'yield':
      return countedChance(numberIn(given, 'n') - numberIn(given, 'nonconforming'), numberIn(given, 'n'), upper, figure);
    case 'count': {
      const [count, expected] = [numberIn(given, 'count'), figure * (optionalNumberIn(given, 'exposure') ?? 1)];
      if (upper) return 1 - gammaChance(count + 1, expected);
      return count === 0 ? undefined : gammaChance(count, expected);
    }
    case 'mean': {
      const sd = optionalNumberIn(given, 'sd');
      if (sd === undefined || sd === 0 || given['from'] !== undefined) return undefined;
      const [n, mean] = [numberIn(given, 'n'), numberIn(given, 'mean')];
      const distance = upper ? figure - mean : mean - figure;
      if (Math.abs(distance) < leastDistance * Math.abs(mean)) return undefined;
      return studentChance(-distance / (sd / Math.sqrt(n)), n - 1);
    }
    default:
      return undefined;
  }
}

/** P(X <= x) at an upper bound, P(X >= x) at a lower one; a bound at 0 or 1 is so by definition. */
function countedChance(x: number, n: number, upper: boolean, bound: number): number | undefined {
  if (bound === 0 || bound === 1) return undefined;
  return upper ? betaChance(1 - bound, n - x, x + 1) : betaChance(bound, x, n - x + 1);
}
