import type { Tail } from '../units.ts';
import { fractionLower, fractionUpper } from './nonconforming-fraction.ts';
import { requireTried, type TriedError } from './inspection-error.ts';

/** How a station errs: known, or tried; see `KnownError` and `TriedError`. */
export type ErrorFigures =
  | { readonly kind: 'known'; readonly sensitivity: number; readonly falseReject: number }
  | ({ readonly kind: 'tried' } & TriedError);

/** A guaranteed fraction turned into the reject rate that decides about it, and the tail that is left for the rejects. */
export interface ErrorLines {
  /** The bound on the true fraction is at or below a line exactly if that on the reject rate is at or below this. */
  readonly toDemonstrate: (line: number) => number;
  /** The opposite bound on the true fraction is above a line exactly if that on the reject rate is above this. */
  readonly toViolate: (line: number) => number;
  /** Reject rate that a line at this true fraction would hardly exceed: what a change detector is set against. */
  readonly toDetect: (line: number) => number;
  /** False rejects alone give at least this rate, 0 to 1. */
  readonly leastRejects: number;
  readonly tail: Tail;
  /** True fractions behind a reject rate, unclamped: for the upper bound, the lower bound and the estimate. */
  readonly upper: (rate: number) => number;
  readonly lower: (rate: number) => number;
  readonly estimate: (rate: number) => number;
}

interface Limits {
  readonly sensitivity: number;
  readonly falseReject: number;
}

/**
 * The bounds of `knownErrorUpper`, `triedErrorUpper` and their lower counterparts are straight lines in the bound on
 * the reject rate; so the guarantee can be corrected instead of the data.
 *
 * @param tail of the bound on the true fraction, above 0, below 1
 * @throws OutOfDomain naming the argument
 * @source as `knownErrorUpper` and `triedErrorUpper`, solved for the reject rate
 */
export function errorLines(error: ErrorFigures, tail: Tail): ErrorLines {
  const [low, high, point, left] = error.kind === 'known' ? [error, error, error, tail] as const : tried(error, tail);
  return {
    toDemonstrate: rejectsOf(low),
    toViolate: rejectsOf(high),
    toDetect: rejectsOf({ sensitivity: high.sensitivity, falseReject: high.falseReject }),
    leastRejects: low.falseReject,
    tail: left,
    upper: fractionOf(low),
    lower: fractionOf(high),
    estimate: fractionOf(point),
  };
}

/** Whether the figures show that bad units are rejected more readily than good ones, on both sides of the line. */
export function tellsUnitsApart(error: ErrorFigures, tail: Tail): boolean {
  if (error.kind === 'known') return error.sensitivity > error.falseReject;
  const [low, high, point] = tried(error, tail);
  return low.sensitivity > low.falseReject && high.sensitivity > high.falseReject && point.sensitivity > point.falseReject;
}

function tried(error: TriedError, tail: Tail): readonly [low: Limits, high: Limits, point: Limits, left: Tail] {
  requireTried(error);
  const { seeded, caught, good, rejectedGood } = error;
  const side = (0.2 * tail) as Tail;
  return [
    { sensitivity: fractionLower(caught, seeded, side), falseReject: fractionLower(rejectedGood, good, side) },
    { sensitivity: fractionUpper(caught, seeded, side), falseReject: fractionUpper(rejectedGood, good, side) },
    { sensitivity: caught / seeded, falseReject: rejectedGood / good },
    (0.6 * tail) as Tail,
  ];
}

const rejectsOf = ({ sensitivity, falseReject }: Limits) => (line: number): number => line * sensitivity + (1 - line) * falseReject;
const fractionOf = ({ sensitivity, falseReject }: Limits) => (rate: number): number => (rate - falseReject) / (sensitivity - falseReject);
