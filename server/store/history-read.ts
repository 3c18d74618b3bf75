import type Database from 'better-sqlite3';
import type { EvidenceState } from '../../core/evidence/evidence-state.ts';
import { historyGrid } from './history-grid.ts';
import { checkHistoryQuery } from './query-check.ts';
import type { HistoryQuery, HistorySteps } from './store.ts';

interface StepRow {
  readonly step: number;
  readonly inspected: number;
  readonly nonconforming: number;
  readonly last: number;
  readonly estimate: number | null;
  readonly bound: number | null;
  readonly opposite: number | null;
  readonly state: EvidenceState;
}

/** Minutes of a guarantee added up to steps; SQLite takes the bare columns from the row that has max(at). */
export function readHistory(database: Database.Database, query: HistoryQuery): HistorySteps {
  checkHistoryQuery(query);
  const { from, stepMs } = historyGrid(query);
  const rows = database
    .prepare(
      `SELECT CAST((at - @from) / @stepMs AS INTEGER) AS step, sum(inspected) AS inspected, sum(nonconforming) AS nonconforming,
         max(at) AS last, estimate, bound, opposite, state
       FROM minutes WHERE guarantee = @guarantee AND at >= @from AND at < @to GROUP BY step ORDER BY step`,
    )
    .all({ guarantee: query.guarantee, from: BigInt(from), to: query.to, stepMs: BigInt(stepMs) }) as StepRow[];
  return {
    guarantee: query.guarantee,
    from,
    to: query.to,
    stepMs,
    at: rows.map((row) => from + row.step * stepMs),
    inspected: rows.map((row) => row.inspected),
    nonconforming: rows.map((row) => row.nonconforming),
    estimate: rows.map((row) => row.estimate),
    bound: rows.map((row) => row.bound),
    opposite: rows.map((row) => row.opposite),
    state: rows.map((row) => row.state),
  };
}
