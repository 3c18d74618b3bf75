import { normalFit, type NormalFit } from '../../core/bound/normality.ts';
import { skewAgainstBound } from '../../core/bound/skew-guard.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { RunningMoments } from '../../core/moments/running-moments.ts';
import type { Side } from './given.ts';

/** What a column of measurements says. */
export interface ColumnFigures {
  readonly values: readonly number[];
  readonly n: number;
  readonly mean: number;
  /** undefined for one value */
  readonly sd: number | undefined;
  /** undefined for fewer than three values or without spread */
  readonly skewness: number | undefined;
  readonly fit: NormalFit;
}

/** Chance of calling a normal sample unfit; common practice, no source. */
const fitLevel = 0.05;

/** @param values one or more, finite */
export function columnFigures(values: readonly number[]): ColumnFigures {
  const moments = new RunningMoments(values[0] ?? 0);
  for (const value of values) moments.admit(value);
  const { mean = NaN, sd, skewness } = moments;
  return { values, n: values.length, mean, sd, skewness, fit: normalFit(values, fitLevel) };
}

/** What is to be said of the normal model and of skewness, for a bound on this side. */
export function columnNotes({ fit, n, skewness }: ColumnFigures, side: Side | undefined): readonly string[] {
  const notes = [fitSentence(fit)];
  const skew = side === undefined || skewness === undefined || n < 3 ? undefined : skewAgainstBound(side, skewness, n);
  if (skew !== undefined) {
    notes.push(
      `The measurements are skewed against the bound (skewness ${writtenNumber(skew.skewness, 3)}, called from ${writtenNumber(skew.limit, 3)}): it promises more than it keeps. ` +
        'With --from and --to a bound holds that assumes no distribution.',
    );
  }
  return notes;
}

/** The normality check in words. */
export function fitSentence(fit: NormalFit): string {
  switch (fit.kind) {
    case 'too few values':
      return `Normal model not checked: ${fit.n} values, the Anderson–Darling test needs ${fit.needed}.`;
    case 'fits':
      return `Nothing speaks against the normal model (Anderson–Darling ${writtenNumber(fit.statistic, 3)}, p = ${writtenNumber(fit.pValue, 3)}); that does not prove it.`;
    case 'does not fit':
      return `The measurements speak against the normal model (Anderson–Darling ${Number.isFinite(fit.statistic) ? writtenNumber(fit.statistic, 3) : 'infinite: all values alike'}, ${fit.pValue < 0.001 ? 'p < 0.001' : `p = ${writtenNumber(fit.pValue, 3)}`}).`;
  }
}
