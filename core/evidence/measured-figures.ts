import type { MeasuredSum } from './measured-sum.ts';

/** The figures of a window of values by name; mean and standard deviation only where there are any. */
export function measuredFigures({ moments: { count, mean, sd } }: MeasuredSum): Readonly<Record<string, number>> {
  return { values: count, ...(mean === undefined ? {} : { mean }), ...(sd === undefined ? {} : { sd }) };
}
