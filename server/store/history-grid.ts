import type { HistoryQuery } from './store.ts';

const minuteMs = 60_000;

/** The grid a history is told on: steps of whole minutes from `from`, at most as many as asked. */
export interface HistoryGrid {
  /** Start of the first step: the asked time, back to its whole minute. */
  readonly from: number;
  /** A multiple of 60,000. */
  readonly stepMs: number;
}

export function historyGrid({ from, to, points }: HistoryQuery): HistoryGrid {
  const start = Math.floor(from / minuteMs) * minuteMs;
  return { from: start, stepMs: Math.max(1, Math.ceil((to - start) / points / minuteMs)) * minuteMs };
}
