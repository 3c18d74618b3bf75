import { fault, ok, type Result } from '../result.ts';
import type { Fraction, Tail } from '../units.ts';
import { fractionBeyondUpper } from './fraction-beyond-limit.ts';
import type { NormalFit } from './normality.ts';

/** The normal model is not used, because the measurements speak against it or are too few to say. */
export interface ModelRefused {
  readonly kind: 'model refused';
  readonly fit: NormalFit;
}

/** A bound by the normal model together with the fit it rests on. */
export interface ModelledFraction {
  readonly bound: Fraction;
  readonly fit: NormalFit;
}

/**
 * Upper bound on the fraction beyond a limit by the normal model, or the refusal to use it. There is no way to the
 * bound past a fit that fails; count the units beyond the limit instead (`fractionUpper`).
 *
 * @param fit  verdict on these measurements, from `normalFit`
 * @param n    as of `fractionBeyondUpper`, likewise k and tail
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage as `fractionBeyondUpper`; a passed test does not prove the model
 * @source as `fractionBeyondUpper`
 */
export function modelledFractionUpper(fit: NormalFit, n: number, k: number, tail: Tail): Result<ModelledFraction, ModelRefused> {
  if (fit.kind !== 'fits') return fault({ kind: 'model refused', fit });
  return ok({ bound: fractionBeyondUpper(n, k, tail), fit });
}
