import type { StationId } from '../record/part.ts';

/** What is known of the stream of one characteristic at one station. */
export interface StreamActivity {
  /** When its newest record was taken, by the plant clock, ms. */
  at: number;
  /** Product of that record. */
  product: string;
}

/** What is known of a line from its own records. */
export interface LineCondition {
  /** undefined: never told. */
  running: boolean | undefined;
  /** When that was told, ms. */
  since: number;
  product: string | undefined;
  lot: string | undefined;
  lotSize: number | undefined;
}

/** One stream that a guarantee lives on. */
export interface WatchedStream {
  readonly station: StationId;
  readonly activity: StreamActivity;
}

/**
 * The moment at which a guarantee's streams count as silent (rule S1 to S3): `afterMs` after the newest record of
 * the quietest stream, or after the line was said to run, whichever is later. Infinity while the line is said to
 * stand, before the first record, and while another product runs.
 */
export function silentFrom(streams: readonly WatchedStream[], line: LineCondition, product: string | undefined, afterMs: number): number {
  if (line.running === false) return Infinity;
  let due = Infinity;
  for (const { activity } of streams) {
    if (activity.at === 0) continue;
    const running = line.product ?? activity.product;
    if (product !== undefined && running !== product) continue;
    due = Math.min(due, Math.max(activity.at, line.since) + afterMs);
  }
  return due;
}
