import {
  meanLower,
  meanLowerKnownSigma,
  meanUpper,
  meanUpperKnownSigma,
  mostMeasurements,
  requireFinite,
} from '../bound/mean.ts';
import { lastWhere } from '../numerics/integer-search.ts';
import type { Tail } from '../units.ts';

/** What a window of measurements says about its mean. */
export interface MeanEvidence {
  /** measurements, whole; 2 or more (1 with a known sigma) */
  readonly n: number;
  readonly mean: number;
  /** sample standard deviation, or the known sigma */
  readonly spread: number;
  readonly sigmaKnown: boolean;
}

/** A promise about a mean. */
export interface MeanPromise {
  readonly side: 'at-least' | 'at-most';
  readonly line: number;
}

/** What a person can read off the bound of a mean, at a look fixed in advance. */
export interface MeanMargin {
  /** how far the mean may move towards the line, all else equal, and stay demonstrated; negative when it is not. Unit of measure */
  readonly clearance: number;
  /** times the spread may grow, all else equal, and stay demonstrated; undefined when no spread would do */
  readonly spreadFactor: number | undefined;
  /** measurements more, with the same mean and spread, until demonstrated: 0 when it is, undefined when they cannot bring it */
  readonly untilDemonstrated: number | undefined;
}

/** The bound that a promise asks for. Arguments, errors and coverage as of `meanLower` and `meanLowerKnownSigma`. */
export function meanBound(evidence: MeanEvidence, side: MeanPromise['side'], tail: Tail): number {
  const { n, mean, spread, sigmaKnown } = evidence;
  if (side === 'at-least') return (sigmaKnown ? meanLowerKnownSigma : meanLower)(n, mean, spread, tail);
  return (sigmaKnown ? meanUpperKnownSigma : meanUpper)(n, mean, spread, tail);
}

/**
 * The margin of a mean.
 *
 * @param tail above 0, below 1
 * @throws OutOfDomain naming the argument
 * @source the bound moves with the mean one to one; its width falls as t(tail; n - 1)/sqrt(n)
 */
export function meanMargin(evidence: MeanEvidence, promise: MeanPromise, tail: Tail): MeanMargin {
  requireFinite('line', promise.line);
  const good = promise.side === 'at-least' ? 1 : -1;
  const clearanceAt = (n: number): number => good * (meanBound({ ...evidence, n }, promise.side, tail) - promise.line);
  const clearance = clearanceAt(evidence.n);
  const room = good * (evidence.mean - promise.line);
  const width = room - clearance;
  return {
    clearance,
    spreadFactor: room > 0 && width > 0 ? room / width : undefined,
    untilDemonstrated: untilDemonstrated(evidence.n, clearance >= 0, room, clearanceAt),
  };
}

function untilDemonstrated(n: number, now: boolean, room: number, clearanceAt: (n: number) => number): number | undefined {
  if (now) return 0;
  if (room <= 0) return undefined;
  const last = lastWhere((more) => clearanceAt(more) < 0, n, mostMeasurements, n);
  return last === mostMeasurements ? undefined : last + 1 - n;
}
