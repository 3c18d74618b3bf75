import { timeAt, type TimeColumn } from '../record/time-column.ts';

/** Length of a time window and of the steps it moves on in. */
export interface TimeSpan {
  /** Milliseconds covered by whole steps; a multiple of the step. */
  readonly spanMs: number;
  /** Whole milliseconds, 1 or more. */
  readonly stepMs: number;
}

/** Steps a window may have; more would cost memory without showing anything. */
export const mostSteps = 100_000;

/**
 * Whole steps in the span; a window covers these and the present step.
 *
 * @throws RangeError for a step that is not whole, a span that is no multiple of it, or more than `mostSteps`
 */
export function wholeSteps({ spanMs, stepMs }: TimeSpan): number {
  const steps = spanMs / stepMs;
  if (!(Number.isSafeInteger(stepMs) && stepMs >= 1 && Number.isSafeInteger(steps) && steps >= 1 && steps <= mostSteps)) {
    throw new RangeError(`spanMs must be 1 to ${mostSteps} whole steps of stepMs (whole, 1 or more), not ${spanMs} in steps of ${stepMs}`);
  }
  return steps;
}

/**
 * Where the records that share a step end: the first index after `from` whose time lies in another step than that of
 * record `from`; `records` if there is none. Steady times cost no search.
 */
export function endOfStep(time: TimeColumn, from: number, records: number, stepMs: number): number {
  const step = Math.floor(timeAt(time, from) / stepMs);
  const inStep = (index: number): boolean => Math.floor(timeAt(time, index) / stepMs) === step;
  let end = from + 1;
  if (time.kind === 'steady') {
    const guess = time.step === 0 ? records : Math.ceil(((step + 1) * stepMs - time.start) / time.step);
    end = Math.min(records, Math.max(end, guess));
    while (end > from + 1 && !inStep(end - 1)) end -= 1;
  }
  while (end < records && inStep(end)) end += 1;
  return end;
}
