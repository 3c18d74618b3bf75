import { fault, ok, type Result } from '../result.ts';
import type { Fraction, Tail } from '../units.ts';
import { fractionLower, fractionUpper, requireSample } from './nonconforming-fraction.ts';
import { OutOfDomain, requireWhole } from './out-of-domain.ts';

/** How a station errs, known from outside. */
export interface KnownError {
  /** chance that it rejects a nonconforming unit, 0 to 1 */
  readonly sensitivity: number;
  /** chance that it rejects a conforming unit, 0 to 1 */
  readonly falseReject: number;
}

/** How a station erred when it was tried. */
export interface TriedError {
  /** seeded nonconforming units; whole, 1 or more */
  readonly seeded: number;
  /** of these rejected */
  readonly caught: number;
  /** units known to conform; whole, 1 or more */
  readonly good: number;
  /** of these rejected */
  readonly rejectedGood: number;
}

/** What the station rejected in the window, right or wrong. */
export interface Rejects {
  readonly rejected: number;
  readonly inspected: number;
}

/** Why a bound cannot be corrected for the station's errors. */
export interface InspectionRefusal {
  readonly kind: 'station-does-not-tell' | 'rejects-below-false-rejects' | 'tail-beyond-points';
  readonly because: string;
}

/**
 * Upper bound on the true nonconforming fraction behind a station whose errors are known:
 * (U_r - Fr)/(Se - Fr) with the exact bound U_r on the reject rate.
 *
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in [0, 1], or a refusal: when the station rejects good units as readily as bad ones, or
 * when it rejects fewer units than its false rejects alone must give (the figures contradict each other)
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage never below 1 - tail, at one look fixed in advance
 * @source W. J. Rogan, B. Gladen 1978 (seen cited); J. Reiczigel et al. 2010 (opening read)
 */
export function knownErrorUpper(seen: Rejects, error: KnownError, tail: Tail): Result<Fraction, InspectionRefusal> {
  requireKnown(error);
  return corrected(fractionUpper(seen.rejected, seen.inspected, tail), error.falseReject, error.sensitivity, 'upper');
}

/**
 * Lower bound likewise; arguments, errors and source as of `knownErrorUpper`.
 *
 * @returns in [0, 1]; 0 when the rejects can all be false ones
 * @coverage never below 1 - tail, at one look fixed in advance
 */
export function knownErrorLower(seen: Rejects, error: KnownError, tail: Tail): Result<Fraction, InspectionRefusal> {
  requireKnown(error);
  return corrected(fractionLower(seen.rejected, seen.inspected, tail), error.falseReject, error.sensitivity, 'lower');
}

/**
 * Upper bound when the errors were tried on seeded units: three exact bounds that hold together, with
 * 6/10 of the tail for the rejects and 2/10 for each trial. Deterministic and wide.
 *
 * @returns in [0, 1], or a refusal as of `knownErrorUpper`
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage never below 1 - tail, at one look fixed in advance
 * @source C. E. Bonferroni's inequality on the formula of Rogan and Gladen; shares: own choice
 */
export function triedErrorUpper(seen: Rejects, error: TriedError, tail: Tail): Result<Fraction, InspectionRefusal> {
  requireTried(error);
  const [main, side] = shares(tail);
  const falseReject = fractionLower(error.rejectedGood, error.good, side);
  const sensitivity = fractionLower(error.caught, error.seeded, side);
  return corrected(fractionUpper(seen.rejected, seen.inspected, main), falseReject, sensitivity, 'upper');
}

/** Lower bound likewise; all as of `triedErrorUpper`. @coverage as there */
export function triedErrorLower(seen: Rejects, error: TriedError, tail: Tail): Result<Fraction, InspectionRefusal> {
  requireTried(error);
  const [main, side] = shares(tail);
  const falseReject = fractionUpper(error.rejectedGood, error.good, side);
  const sensitivity = fractionUpper(error.caught, error.seeded, side);
  return corrected(fractionLower(seen.rejected, seen.inspected, main), falseReject, sensitivity, 'lower');
}

/**
 * The reject rate that belongs to a guaranteed fraction: for alarms the guarantee is corrected, not
 * the data, and the detector runs on rejects.
 *
 * @param line guaranteed fraction, 0 to 1
 * @source W. J. Rogan, B. Gladen 1978 (seen cited)
 */
export function rejectLine(line: number, error: KnownError): Fraction {
  requireKnown(error);
  return (line * error.sensitivity + (1 - line) * error.falseReject) as Fraction;
}

/** @throws OutOfDomain unless the trial's counts are possible */
export function requireTried({ seeded, caught, good, rejectedGood }: TriedError): void {
  requireWhole('seeded', seeded, 1);
  requireWhole('caught', caught, 0, seeded);
  requireWhole('good', good, 1);
  requireWhole('rejectedGood', rejectedGood, 0, good);
}

/** @throws OutOfDomain unless the rejects are possible */
export function requireRejects({ rejected, inspected }: Rejects, tail: number): void {
  requireSample(rejected, inspected, tail);
}

function corrected(rate: number, falseReject: number, sensitivity: number, side: 'lower' | 'upper'): Result<Fraction, InspectionRefusal> {
  if (!(sensitivity > falseReject)) {
    const because = `of nonconforming units ${sensitivity} are rejected, of conforming ones ${falseReject}`;
    return fault({ kind: 'station-does-not-tell', because });
  }
  const fraction = (rate - falseReject) / (sensitivity - falseReject);
  if (side === 'upper' && fraction < 0) {
    const because = `at most ${rate} of the units are rejected, but false rejects alone must give ${falseReject}`;
    return fault({ kind: 'rejects-below-false-rejects', because });
  }
  return ok(Math.min(Math.max(fraction, 0), 1) as Fraction);
}

function shares(tail: number): readonly [Tail, Tail] {
  return [(0.6 * tail) as Tail, (0.2 * tail) as Tail];
}

function requireKnown({ sensitivity, falseReject }: KnownError): void {
  if (!(sensitivity >= 0 && sensitivity <= 1)) throw new OutOfDomain('sensitivity', sensitivity, 'a number from 0 to 1');
  if (!(falseReject >= 0 && falseReject <= 1)) throw new OutOfDomain('falseReject', falseReject, 'a number from 0 to 1');
}
