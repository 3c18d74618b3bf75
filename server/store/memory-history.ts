import type { Minute } from './group.ts';
import { historyGrid } from './history-grid.ts';
import { checkHistoryQuery } from './query-check.ts';
import type { HistoryQuery, HistorySteps } from './store.ts';

/** Minutes of a guarantee added up to steps; window figures are those of a step's last minute. */
export function memoryHistory(minutes: Iterable<Minute>, query: HistoryQuery): HistorySteps {
  checkHistoryQuery(query);
  const { from, stepMs } = historyGrid(query);
  const steps = new Map<number, Minute>();
  const wanted = [...minutes].filter(({ guarantee, at }) => guarantee === query.guarantee && at >= from && at < query.to);
  for (const minute of wanted.sort((a, b) => a.at - b.at)) {
    const at = from + Math.floor((minute.at - from) / stepMs) * stepMs;
    const before = steps.get(at);
    steps.set(at, {
      ...minute,
      at,
      inspected: (before?.inspected ?? 0) + minute.inspected,
      nonconforming: (before?.nonconforming ?? 0) + minute.nonconforming,
    });
  }
  const rows = [...steps.values()];
  return {
    guarantee: query.guarantee,
    from,
    to: query.to,
    stepMs,
    at: rows.map(({ at }) => at),
    inspected: rows.map(({ inspected }) => inspected),
    nonconforming: rows.map(({ nonconforming }) => nonconforming),
    estimate: rows.map(({ estimate }) => figureOf(estimate)),
    bound: rows.map(({ bound }) => figureOf(bound)),
    opposite: rows.map(({ opposite }) => figureOf(opposite)),
    state: rows.map(({ state }) => state),
  };
}

const figureOf = (figure: number | undefined): number | null => (figure === undefined || Number.isNaN(figure) ? null : figure);
