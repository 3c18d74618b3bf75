import { betaOdds } from '../numerics/beta-quantile.ts';
import { fault, ok, type Result } from '../result.ts';
import type { Fraction, Tail } from '../units.ts';
import { requireRejects, requireTried, type InspectionRefusal, type Rejects, type TriedError } from './inspection-error.ts';
import { fractionOfOdds } from './nonconforming-fraction.ts';

const points = 4096;
/** Fewer points than this beyond the bound would make it a matter of luck. */
const fewestBeyond = 20;

/**
 * Melded upper bound on the true nonconforming fraction behind a station whose errors were tried on
 * seeded units: the tail quantile of (r - Fr)/(Se - Fr) with each figure drawn from the distribution
 * its exact bound comes from. Drawn at 4,096 fixed Halton points, so the same counts always give the
 * same bound; takes some milliseconds.
 *
 * @param tail all of alpha in one tail, 0.005 to 1; smaller ones are refused
 * @returns in [0, 1], or a refusal
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage measured at 0.963 or more for 95 % (methods, five cases), not proved; one look fixed in advance
 * @source D. M. Bayer, M. P. Fay, B. I. Graubard, arXiv 2205.13494 (abstract)
 */
export function meldedErrorUpper(seen: Rejects, error: TriedError, tail: Tail): Result<Fraction, InspectionRefusal> {
  const { rejected, inspected } = seen;
  return melded(seen, error, tail, {
    rate: drawn(rejected + 1, inspected - rejected),
    falseReject: drawn(error.rejectedGood, error.good - error.rejectedGood + 1),
    sensitivity: drawn(error.caught, error.seeded - error.caught + 1),
    beyond: 1,
    rank: Math.ceil((1 - tail) * points) - 1,
  });
}

/** Melded lower bound; all as of `meldedErrorUpper`. @coverage not measured; expected as there */
export function meldedErrorLower(seen: Rejects, error: TriedError, tail: Tail): Result<Fraction, InspectionRefusal> {
  const { rejected, inspected } = seen;
  return melded(seen, error, tail, {
    rate: drawn(rejected, inspected - rejected + 1),
    falseReject: drawn(error.rejectedGood + 1, error.good - error.rejectedGood),
    sensitivity: drawn(error.caught + 1, error.seeded - error.caught),
    beyond: 0,
    rank: Math.floor(tail * points),
  });
}

interface Meld {
  readonly rate: (chance: number) => number;
  readonly falseReject: (chance: number) => number;
  readonly sensitivity: (chance: number) => number;
  /** the fraction believed where a drawn station rejects good units as readily as bad ones */
  readonly beyond: 0 | 1;
  readonly rank: number;
}

function melded(seen: Rejects, error: TriedError, tail: Tail, meld: Meld): Result<Fraction, InspectionRefusal> {
  requireRejects(seen, tail);
  requireTried(error);
  if (tail * points < fewestBeyond) {
    return fault({ kind: 'tail-beyond-points', because: `a tail of ${tail} needs more than ${points} points; take the bound of three exact ones` });
  }
  if (error.caught * error.good <= error.rejectedGood * error.seeded) {
    const because = `${error.caught} of ${error.seeded} seeded and ${error.rejectedGood} of ${error.good} good units were rejected`;
    return fault({ kind: 'station-does-not-tell', because });
  }
  const fractions = new Float64Array(points);
  for (let i = 0; i < points; i++) {
    const falseReject = meld.falseReject(halton(i + 1, 3));
    const told = meld.sensitivity(halton(i + 1, 5)) - falseReject;
    const fraction = told > 0 ? (meld.rate(halton(i + 1, 2)) - falseReject) / told : meld.beyond;
    fractions[i] = Math.min(Math.max(fraction, 0), 1);
  }
  fractions.sort();
  return ok((fractions[meld.rank] ?? NaN) as Fraction);
}

/** Quantiles of Beta(a, b), its ends included: 0 for a = 0, 1 for b = 0. */
function drawn(a: number, b: number): (chance: number) => number {
  if (a === 0) return () => 0;
  if (b === 0) return () => 1;
  return (chance) => fractionOfOdds(betaOdds(a, b, chance));
}

/** The i-th point of van der Corput's sequence in a prime base, above 0, below 1. */
function halton(index: number, base: number): number {
  let value = 0;
  let share = 1 / base;
  for (let left = index; left > 0; left = Math.floor(left / base), share /= base) value += (left % base) * share;
  return value;
}
